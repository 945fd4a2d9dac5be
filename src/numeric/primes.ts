/** Prime numbers. */

/** The first `count` primes, by the sieve of Eratosthenes. */
export function firstPrimes(count: number): Uint32Array {
  // p_k < k (ln k + ln ln k) for k >= 6 (J. B. Rosser and L. Schoenfeld, Illinois Journal of Mathematics 6, 1962, 64-94)
  const limit = count < 6 ? 14 : Math.ceil(count * (Math.log(count) + Math.log(Math.log(count))));
  const composite = new Uint8Array(limit);
  const primes = new Uint32Array(count);
  for (let candidate = 2, found = 0; found < count; candidate++) {
    if (composite[candidate] === 1) continue;
    primes[found++] = candidate;
    for (let multiple = candidate * candidate; multiple < limit; multiple += candidate)
      composite[multiple] = 1;
  }
  return primes;
}
