/**
 * Polynomials over GF(2) as BigInts (bit k is the coefficient of x^k), and jumps of linear recurrences by them: the
 * state n steps on is g(T) times the state, where T is one step and g = x^n mod the minimal polynomial of T
 * (H. Haramoto, M. Matsumoto, T. Nishimura, F. Panneton and P. L'Ecuyer, "Efficient jump ahead for F2-linear random
 * number generators", INFORMS Journal on Computing 20 (2008) 385-390). O(log n) squarings and `degree` steps.
 */

function degree(polynomial: bigint): number {
  return polynomial === 0n ? -1 : polynomial.toString(2).length - 1;
}

/** The square: bit k moves to bit 2k, a hexadecimal digit at a time. */
function square(polynomial: bigint): bigint {
  const spread = "00 01 04 05 10 11 14 15 40 41 44 45 50 51 54 55".split(" ");
  let digits = "0x";
  for (const digit of polynomial.toString(16)) digits += spread[parseInt(digit, 16)] ?? "";
  return BigInt(digits);
}

function reduce(polynomial: bigint, modulus: bigint): bigint {
  const size = degree(modulus);
  let rest = polynomial;
  for (let k = degree(rest); k >= size; k = degree(rest)) rest ^= modulus << BigInt(k - size);
  return rest;
}

/** x^exponent mod modulus. */
export function powerOfX(exponent: bigint, modulus: bigint): bigint {
  let result = 1n;
  for (const bit of exponent.toString(2)) {
    result = reduce(square(result), modulus);
    if (bit === "1") result = reduce(result << 1n, modulus);
  }
  return result;
}

/**
 * The shortest linear recurrence of a bit sequence, as its characteristic polynomial (J. L. Massey, "Shift-register
 * synthesis and BCH decoding", IEEE Transactions on Information Theory 15 (1969) 122-127). At least twice as many
 * bits are needed as the recurrence is long.
 */
export function berlekampMassey(bits: readonly (0 | 1)[]): bigint {
  let [connection, previous] = [1n, 1n];
  let [length, gap] = [0, 1];
  // bit k of `recent` is the bit k places back
  let recent = 0n;
  bits.forEach((bit, i) => {
    recent = (recent << 1n) | BigInt(bit);
    if (!parity(connection & recent)) {
      gap++;
      return;
    }
    const next = connection ^ (previous << BigInt(gap));
    if (2 * length <= i) {
      previous = connection;
      length = i + 1 - length;
      gap = 1;
    } else {
      gap++;
    }
    connection = next;
  });
  return reversed(connection, length);
}

/** Whether an odd number of bits are set; halves are folded onto each other, which keeps that. */
function parity(word: bigint): boolean {
  let rest = word;
  let size = 32;
  while (rest >> BigInt(size) > 0n) size *= 2;
  for (; size >= 32; size /= 2) rest = BigInt.asUintN(size, rest) ^ (rest >> BigInt(size));
  let low = Number(rest);
  for (let by = 16; by > 0; by >>= 1) low ^= low >>> by;
  return (low & 1) === 1;
}

/** x^length p(1/x). */
function reversed(polynomial: bigint, length: number): bigint {
  return BigInt(`0b${[...polynomial.toString(2).padStart(length + 1, "0")].reverse().join("")}`);
}

/** A linear map of state words. */
export type LinearStep = (state: readonly bigint[]) => readonly bigint[];

/**
 * Minimal polynomial of the sequence of lowest bits of the words' sum over GF(2), from `start`: that of `step` itself
 * where every part of the state shows in that bit, as it does for full-period generators and combinations of them.
 * `size` is at least the degree.
 */
export function characteristicPolynomial(step: LinearStep, start: readonly bigint[], size: number): bigint {
  const bits: (0 | 1)[] = [];
  let state = start;
  for (let i = 0; i < 2 * size; i++) {
    const sum = state.reduce((total, word) => total ^ word, 0n);
    bits.push(sum & 1n ? 1 : 0);
    state = step(state);
  }
  return berlekampMassey(bits);
}

/** g(T) applied to a state. */
export function applyPolynomial(polynomial: bigint, step: LinearStep, start: readonly bigint[]): bigint[] {
  const sum = start.map(() => 0n);
  let state = start;
  for (let rest = polynomial; rest > 0n; rest >>= 1n) {
    if (rest & 1n) state.forEach((word, k) => (sum[k] = (sum[k] ?? 0n) ^ word));
    state = step(state);
  }
  return sum;
}
