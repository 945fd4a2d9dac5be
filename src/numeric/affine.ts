/**
 * Powers of the map x -> a x + c mod m in O(log n) products, exact in BigInt (repeated squaring of the affine map;
 * F. B. Brown, "Random number generation with arbitrary strides", Transactions of the American Nuclear Society 71
 * (1994) 202-203). The way to jump ahead in every generator whose state moves by such a map.
 */

/** The map x -> multiplier x + increment mod modulus. */
export interface Affine {
  readonly multiplier: bigint;
  readonly increment: bigint;
  readonly modulus: bigint;
}

/** The map applied `steps` (at least 0) times in a row. */
export function affinePower({ multiplier, increment, modulus }: Affine, steps: bigint): Affine {
  let [a, c] = [multiplier % modulus, increment % modulus];
  let [resultA, resultC] = [1n % modulus, 0n];
  for (let left = steps; left > 0n; left >>= 1n) {
    if (left & 1n) [resultA, resultC] = [(a * resultA) % modulus, (a * resultC + c) % modulus];
    [a, c] = [(a * a) % modulus, (a * c + c) % modulus];
  }
  return { multiplier: resultA, increment: resultC, modulus };
}

export function applyAffine({ multiplier, increment, modulus }: Affine, x: bigint): bigint {
  return (multiplier * x + increment) % modulus;
}
