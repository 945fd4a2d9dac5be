/** What PCG64 and PCG64 DXSM share: a congruential state modulo 2^128 with an increment, and its published forms. */
import { applyAffine, type Affine } from "../numeric/affine.js";
import type { Key } from "./key.js";
import type { State } from "./pseudo-random.js";

const SIZE = 1n << 128n;
const WORD = (1n << 64n) - 1n;

/** The kernel's layout: low and high half of the state, low and high half of the increment. */
export function pack(state: bigint, increment: bigint): State {
  return [state & WORD, state >> 64n, increment & WORD, increment >> 64n];
}

export function stateOf([low = 0n, high = 0n]: State): bigint {
  return (high << 64n) | low;
}

export function mapOf([, , low = 0n, high = 0n]: State, multiplier: bigint): Affine {
  return { multiplier, increment: (high << 64n) | low, modulus: SIZE };
}

/** State uniform below 2^128, increment uniform over the odd numbers below it. */
export function fromKey(key: Key): State {
  const [a = 0n, b = 0n, c = 0n, d = 0n] = key.words64(4);
  return [a, b, c | 1n, d];
}

/** "initstate,initseq" (from state 0 one step, add `initstate`, one more step) or "state=...,inc=...". */
export function fromText(text: string, id: string, multiplier: bigint): State {
  const [, seed, sequence] = /^(\d+)\s*,\s*(\d+)$/.exec(text) ?? [];
  if (seed !== undefined && sequence !== undefined && BigInt(seed) < SIZE && BigInt(sequence) < SIZE) {
    const increment = (2n * BigInt(sequence) + 1n) % SIZE;
    const map = { multiplier, increment, modulus: SIZE };
    return pack(applyAffine(map, (increment + BigInt(seed)) % SIZE), increment);
  }
  const [, words, inc] = /^state=(\d+)\s*,\s*inc=(\d+)$/.exec(text) ?? [];
  if (words !== undefined && inc !== undefined) {
    const [state, increment] = [BigInt(words), BigInt(inc)];
    if (state < SIZE && increment < SIZE && increment % 2n === 1n) return pack(state, increment);
  }
  throw new RangeError(
    `state: expected "initstate,initseq" or "state=...,inc=..." (inc odd), numbers below 2^128, for source "${id}", found "${text}"`,
  );
}
