/**
 * Jackknife (Quenouille 1956; Tukey 1958) and bootstrap (Efron, Annals of Statistics 7 (1979) 1-26). The bootstrap has a
 * keyed generator of its own, so that the same data give the same interval.
 */
import { createHash } from "node:crypto";
import { studentFactor } from "./student.js";
import { mean, sum } from "./sums.js";

export interface Jackknife {
  readonly value: number;
  readonly standardError: number;
  /** value +/- t_{count - 1} standard errors. */
  readonly interval: readonly [number, number];
}

/**
 * Jackknife of a statistic of exchangeable parts: `value` uses all, `without[r]` all but part r. Null where any of them is
 * not finite or there are fewer than two parts.
 */
export function jackknife(value: number, without: readonly number[], confidence = 0.95): Jackknife | null {
  const count = without.length;
  if (count < 2 || !Number.isFinite(value) || !without.every(Number.isFinite)) return null;
  const centre = mean(without);
  const standardError = Math.sqrt(((count - 1) / count) * sum(without.map((part) => (part - centre) ** 2)));
  const half = studentFactor(confidence, count - 1) * standardError;
  return { value, standardError, interval: [value - half, value + half] };
}

/**
 * Indices 0...count - 1 drawn with replacement: xoshiro128++ (Blackman & Vigna, ACM TOMS 47 (2021) article 36) keyed by
 * SHA-256 of a text; multiply-and-shift reduction (its bias, count / 2^32, is far below the bootstrap's own noise).
 */
export function keyedIndices(key: string): (count: number) => number {
  const digest = createHash("sha256").update(key).digest();
  const s = new Uint32Array([0, 4, 8, 12].map((at) => digest.readUInt32LE(at)));
  const rotate = (x: number, k: number) => (x << k) | (x >>> (32 - k));
  return (count) => {
    const [a, b, c, d] = [s[0] ?? 0, s[1] ?? 0, s[2] ?? 0, s[3] ?? 0];
    const word = (rotate((a + d) | 0, 7) + a) >>> 0;
    const c1 = c ^ a;
    const d1 = d ^ b;
    s[1] = b ^ c1;
    s[0] = a ^ d1;
    s[2] = c1 ^ (b << 9);
    s[3] = rotate(d1, 11);
    return Math.floor((word / 2 ** 32) * count);
  };
}

/**
 * Percentile interval of a statistic of one or more independent samples over `rounds` bootstrap rounds drawn under `key`;
 * in each round every sample is drawn again from itself.
 */
export function bootstrapInterval(
  samples: readonly (readonly number[])[],
  statistic: (drawn: readonly (readonly number[])[]) => number,
  key: string,
  rounds: number,
  confidence = 0.95,
): [number, number] {
  const draw = keyedIndices(key);
  const again = (sample: readonly number[]) => sample.map(() => sample[draw(sample.length)] ?? NaN);
  const results = Array.from({ length: rounds }, () => statistic(samples.map(again))).sort((a, b) => a - b);
  return [quantileOf(results, (1 - confidence) / 2), quantileOf(results, (1 + confidence) / 2)];
}

/** Quantile of a sorted list with linear interpolation (type 7 of Hyndman & Fan, American Statistician 50 (1996)). */
export function quantileOf(sorted: readonly number[], p: number): number {
  const at = p * (sorted.length - 1);
  const below = Math.floor(at);
  const low = sorted[below] ?? NaN;
  const high = sorted[Math.min(below + 1, sorted.length - 1)] ?? NaN;
  return low + (at - below) * (high - low);
}
