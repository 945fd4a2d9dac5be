/**
 * Independent streams of a pseudo-random source. Where the method can jump, stream k of N begins k times 2^64 outputs into
 * the one sequence, or k times the largest odd number of outputs that N streams leave room for, so that no two share an
 * output; where it cannot, each stream starts from a keyed state of its own, and two overlap with a probability of about
 * N^2 L / period for streams of L outputs (P. L'Ecuyer, D. Munger, B. Oreshkin and R. Simard, Random numbers for parallel
 * computers: requirements and methods, Mathematics and Computers in Simulation 135 (2017) 3-17, bounds it so).
 */
import type { Key } from "./key.js";
import { isPseudoRandom } from "./pseudo-random.js";
import type { Source } from "./contract.js";

/** Distance of streams where the period has room for it. */
const USUAL_DISTANCE = 1n << 64n;

export interface StreamRequest {
  readonly source: Source;
  /** 1...count. */
  readonly index: number;
  readonly count: number;
  /** Outputs that the stream will be asked for. */
  readonly outputs: bigint;
  /** Whether the source starts from a given state. */
  readonly state: boolean;
}

export interface StreamPlan {
  /** Outputs to pass over from the start of the sequence; null where the stream has a key of its own. */
  readonly jump: bigint | null;
  /** How the streams were made, and how safe that is. */
  readonly note: string;
}

/** Throws a RangeError where a source has no streams, or none of this length. */
export function planStream({ source, index, count, outputs, state }: StreamRequest): StreamPlan {
  const { id, period } = source;
  if (!isPseudoRandom(source)) {
    throw new RangeError(
      `stream: expected a pseudo-random source for streams, found "${id}"; take another --seed for other points`,
    );
  }
  if (source.recurrence.advance === undefined || period === null) {
    if (state) {
      throw new RangeError(
        `stream: source "${id}" cannot jump, so its streams start from keys, found a state; leave the state out`,
      );
    }
    const chance =
      period === null ? "is not known, as its period is not" : `is ${overlap(count, outputs, period)}`;
    return {
      jump: null,
      note: `stream ${index} of ${count}: ${id} starts each stream from a keyed state; the probability that two of them overlap within ${outputs} outputs ${chance}`,
    };
  }
  const distance = distanceOf(period, BigInt(count));
  if (distance < outputs) {
    throw new RangeError(
      `stream: ${count} streams of source "${id}" have room for ${distance} outputs each, found ${outputs}; take fewer streams or points`,
    );
  }
  const jump = BigInt(index - 1) * distance;
  const far = distance === USUAL_DISTANCE ? "2^64" : String(distance);
  const caution =
    source.method === "congruential" ? "; distant streams of a congruential generator are correlated" : "";
  return {
    jump,
    note: `stream ${index} of ${count}: ${id} begins ${index - 1} times ${far} outputs into its sequence; no two streams share an output${caution}`,
  };
}

function distanceOf(period: bigint, count: bigint): bigint {
  if (period >= count * USUAL_DISTANCE) return USUAL_DISTANCE;
  const room = period / count;
  // an even distance would repeat the low bits of a power-of-two modulus from stream to stream
  return room > 1n && room % 2n === 0n ? room - 1n : room;
}

/** N^2 L / period as text; at most 1. */
function overlap(count: number, outputs: bigint, period: bigint): string {
  const pairs = BigInt(count) * BigInt(count) * outputs;
  if (pairs >= period) return "about 1";
  const exponent = Math.ceil(log10(pairs) - log10(period));
  return exponent >= -1 ? (Number(pairs) / Number(period)).toPrecision(2) : `below 1e${exponent}`;
}

function log10(value: bigint): number {
  const digits = value.toString();
  return digits.length - 1 + Math.log10(Number(`${digits[0] ?? "0"}.${digits.slice(1, 17)}`));
}

/** The key of a stream that starts from a state of its own. */
export function streamKey(key: Key, index: number, count: number): Key {
  return key.derive(`stream ${index} of ${count}`);
}
