/** Roots and logarithms of whole numbers of any length. */

/** The largest whole number whose k-th power does not exceed n (n at least 0, k at least 1), by Newton's method from above. */
export function integerRoot(n: bigint, k: number): bigint {
  if (n < 2n || k === 1) return n;
  const power = BigInt(k);
  let root = 1n << BigInt(Math.ceil(n.toString(2).length / k));
  for (;;) {
    const next = ((power - 1n) * root + n / root ** (power - 1n)) / power;
    if (next >= root) return root;
    root = next;
  }
}

/** Natural logarithm of n (at least 1), within 2 ulp. */
export function logOf(n: bigint): number {
  const shift = Math.max(0, n.toString(2).length - 64);
  return Math.log(Number(n >> BigInt(shift))) + shift * Math.LN2;
}
