/**
 * Powers of x modulo a characteristic polynomial x^k - a1 x^(k-1) - ... - ak over the integers modulo m. The coefficients
 * of x^n say what x(n) is made of for x(n) = a1 x(n-1) + ... + ak x(n-k): x(n) = r_0 x(0) + ... + r_(k-1) x(k-1) (Knuth, The Art
 * of Computer Programming, vol. 2, 3.2.2). Repeated squaring: O(k^2 log n).
 */

/** r_0 ... r_(k-1) of x^n, n at least 0. */
export function polynomialPower(multipliers: readonly bigint[], n: bigint, modulus: bigint): bigint[] {
  let result: bigint[] = multipliers.map((_, k) => (k === 0 ? 1n : 0n));
  for (const bit of n.toString(2)) {
    result = reduce(square(result), multipliers, modulus);
    if (bit === "1") result = reduce([0n, ...result], multipliers, modulus);
  }
  return result;
}

function square(a: readonly bigint[]): bigint[] {
  const result = Array.from({ length: 2 * a.length - 1 }, () => 0n);
  a.forEach((p, i) => {
    if (p !== 0n) a.forEach((q, j) => (result[i + j] = (result[i + j] ?? 0n) + p * q));
  });
  return result;
}

/** The remainder, with coefficients from 0 to m - 1. */
function reduce(polynomial: bigint[], multipliers: readonly bigint[], modulus: bigint): bigint[] {
  const order = multipliers.length;
  for (let top = polynomial.length - 1; top >= order; top--) {
    const leading = (polynomial[top] ?? 0n) % modulus;
    if (leading === 0n) continue;
    multipliers.forEach((a, k) => {
      polynomial[top - 1 - k] = (polynomial[top - 1 - k] ?? 0n) + leading * a;
    });
  }
  return Array.from({ length: order }, (_, k) => (polynomial[k] ?? 0n) % modulus);
}
