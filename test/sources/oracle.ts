/** What a coordinate must be, worked out in exact integers from the published output and the rules of the method. */
import type { Recurrence, Usage } from "../../src/sources/pseudo-random.js";

/** Kernel words as the definition gives them: published integers, joined first one lowest where two make a word. */
export function* wordsOf(recurrence: Recurrence, state: readonly bigint[]): Generator<bigint, never> {
  const integers = recurrence.integers(state);
  const { modulus, integers: parts } = recurrence.output;
  const width = BigInt((modulus - 1n).toString(2).length / parts);
  for (;;) {
    let word = 0n;
    for (let part = 0n; part < BigInt(parts); part++) word |= integers.next().value << (part * width);
    yield word;
  }
}

/** The double that a word must become. */
export function coordinateOf(word: bigint, recurrence: Recurrence, usage: Usage): number {
  const u = doubleOf(word, recurrence, usage);
  return usage.float32 ? Math.fround(u) : u;
}

function doubleOf(word: bigint, { output }: Recurrence, { bits, endpoint }: Usage): number {
  const { modulus, zeroless } = output;
  const length = (modulus - 1n).toString(2).length;
  const half = endpoint === "left" ? 0 : 0.5;
  const topOf = (integer: bigint, width: number): number => {
    const used = Math.min(width, 52);
    return (Number(integer >> BigInt(width - used)) + half) / 2 ** used;
  };
  if (bits !== null) {
    const cut = bits.end === "top" ? word >> BigInt(length - bits.count) : word;
    return topOf(cut & ((1n << BigInt(bits.count)) - 1n), bits.count);
  }
  if (zeroless && modulus <= 1n << 52n) return Number(word) / Number(modulus);
  if (modulus === 1n << BigInt(length)) return topOf(word, length);
  if (modulus <= 1n << 52n) return (Number(word) + half) / Number(modulus);
  return topOf((word << 64n) / modulus, 64);
}
