/**
 * From a generator's integers to coordinates in (0, 1).
 *
 * - b output bits give (k + 1/2) / 2^min(b, 52) from the top bits: with 53 the largest would round to 1.
 * - A generator that never is 0 (multiplicative, modulus m up to 2^52) gives k / m, which keeps its lattice exactly;
 *   another modulus m up to 2^52 gives (k + 1/2) / m, the same as the first rule for powers of two.
 * - A larger modulus gives the top 52 bits of floor(2^64 k / m) with the midpoint.
 * - `left` leaves the half out (0 is then hit, and that is what it is there to show); `bits` takes the top or low b
 *   bits of the integer as it is printed, whatever the modulus, and then (k + 1/2) / 2^b.
 */
import type { Kernels } from "../kernels/instance.js";
import type { ToRows } from "../kernels/generator-exports.js";

/** The integers that a kernel writes. */
export interface OutputWords {
  /** Integers lie in 0 ... modulus - 1. */
  readonly modulus: bigint;
  /** How the kernel stores one. */
  readonly bytes: 4 | 8;
  /** True where 0 never appears. */
  readonly zeroless: boolean;
  /** How many published integers make one, the first one lowest. */
  readonly integers: 1 | 2;
}

export type Endpoint = "middle" | "left";

/** Which bits of an integer are used; `count` at most 64. */
export interface Bits {
  readonly end: "top" | "low";
  readonly count: number;
}

export interface ConversionRequest {
  readonly output: OutputWords;
  readonly endpoint: Endpoint;
  /** null for the whole integer. */
  readonly bits: Bits | null;
}

/** Most bits of an integer that a coordinate holds with its midpoint. */
export const COORDINATE_BITS = 52;

/** Number of binary digits of the largest integer below `modulus`. */
export function bitsOf(modulus: bigint): number {
  return (modulus - 1n).toString(2).length;
}

/** The bits of an integer of `length` bits that are used. */
export function takeBits(integer: bigint, { end, count }: Bits, length: number): bigint {
  return (end === "top" ? integer >> BigInt(length - count) : integer) & ((1n << BigInt(count)) - 1n);
}

/** Words in order of generation to rows of coordinates; see `ToRows`. */
export function makeConversion({ output, endpoint, bits }: ConversionRequest, kernels: Kernels): ToRows {
  const { exports } = kernels;
  const { modulus, bytes, zeroless } = output;
  const length = bitsOf(modulus);
  const power = modulus === 1n << BigInt(length);
  const offset = endpoint === "left" ? 0 : 0.5;
  const scaled = bytes === 4 ? exports.rowsScaled32 : exports.rowsScaled64;

  /** `used` bits of the integer from `shift` on, over 2^used. */
  const binary = (shift: number, used: number, added = offset): ToRows => {
    const mask = (1n << BigInt(used)) - 1n;
    const factor = 2 ** -used;
    return (words, dimension, count, out, stride) => {
      scaled(words, dimension, count, out, stride, shift, mask, added, factor);
    };
  };

  if (bits !== null) {
    const lowest = bits.end === "low" ? 0 : length - bits.count;
    const used = Math.min(bits.count, COORDINATE_BITS);
    return binary(lowest + bits.count - used, used);
  }
  const ratio = zeroless && length <= COORDINATE_BITS;
  if (power) {
    if (endpoint === "middle" && bytes === 4 && length === 32) return exports.rowsMidpoint32;
    if (endpoint === "middle" && bytes === 8 && length === 64) return exports.rowsMidpoint64;
    const used = Math.min(length, COORDINATE_BITS);
    return binary(length - used, used, ratio ? 0 : offset);
  }
  if (ratio) return quotient(kernels, 0, Number(modulus));
  if (length <= COORDINATE_BITS) return quotient(kernels, offset, Number(modulus));
  return fraction(kernels, modulus, binary(64 - COORDINATE_BITS, COORDINATE_BITS));
}

function quotient({ exports }: Kernels, offset: number, divisor: number): ToRows {
  return (words, dimension, count, out, stride) => {
    exports.rowsQuotient64(words, dimension, count, out, stride, offset, divisor);
  };
}

function fraction({ exports }: Kernels, modulus: bigint, rows: ToRows): ToRows {
  const { scaled, reciprocal, shift } = divisorOf(modulus);
  return (words, dimension, count, out, stride) => {
    exports.fractionWords(words, dimension * count, scaled, reciprocal, shift);
    rows(words, dimension, count, out, stride);
  };
}

/** A divisor below 2^64 as the wide division of the kernels takes it: its top bit set, and its reciprocal. */
export function divisorOf(modulus: bigint): { scaled: bigint; reciprocal: bigint; shift: bigint } {
  const shift = 64n - BigInt(modulus.toString(2).length);
  const scaled = modulus << shift;
  return { scaled, reciprocal: ((1n << 128n) - 1n) / scaled - (1n << 64n), shift };
}
