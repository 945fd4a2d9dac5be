/**
 * Primes, factors and multiplicative orders of whole numbers up to 2^128, exact in BigInt. Primality by the
 * Miller-Rabin test with the first twelve primes as bases, which is a proof below 3.3e24 (J. Sorenson and
 * J. Webster, "Strong pseudoprimes to twelve prime bases", Mathematics of Computation 86 (2017) 985-1003; beyond it no
 * composite number is known to pass, and none can be ruled out); factors by
 * trial division and J. M. Pollard's rho method with R. P. Brent's cycle finding ("An improved Monte Carlo
 * factorization algorithm", BIT 20 (1980) 176-184).
 */

const BASES = [2n, 3n, 5n, 7n, 11n, 13n, 17n, 19n, 23n, 29n, 31n, 37n];

export function gcd(a: bigint, b: bigint): bigint {
  while (b !== 0n) [a, b] = [b, a % b];
  return a < 0n ? -a : a;
}

/** The greatest common divisor g of a and b (a above 0), and x, y with x a + y b = g. */
export function extendedGcd(a: bigint, b: bigint): { gcd: bigint; x: bigint; y: bigint } {
  let [r, s, t] = [a, 1n, 0n];
  let [nextR, nextS, nextT] = [b, 0n, 1n];
  while (nextR !== 0n) {
    const q = r / nextR;
    [r, s, t, nextR, nextS, nextT] = [nextR, nextS, nextT, r - q * nextR, s - q * nextS, t - q * nextT];
  }
  return r < 0n ? { gcd: -r, x: -s, y: -t } : { gcd: r, x: s, y: t };
}

/** The inverse of a modulo m (above 0), both coprime. */
export function inverseMod(a: bigint, m: bigint): bigint {
  const { x } = extendedGcd(a, m);
  return ((x % m) + m) % m;
}

export function coprime(a: bigint, b: bigint): boolean {
  return gcd(a, b) === 1n;
}

/** base^exponent mod modulus, exponent at least 0. */
export function powerMod(base: bigint, exponent: bigint, modulus: bigint): bigint {
  let result = 1n % modulus;
  let square = base % modulus;
  for (let left = exponent; left > 0n; left >>= 1n) {
    if (left & 1n) result = (result * square) % modulus;
    square = (square * square) % modulus;
  }
  return result;
}

/** Whether n (0 or more) is prime. */
export function isPrime(n: bigint): boolean {
  if (n < 2n) return false;
  for (const p of BASES) if (n % p === 0n) return n === p;
  let odd = n - 1n;
  let twos = 0;
  for (; odd % 2n === 0n; odd /= 2n) twos++;
  return BASES.every((base) => {
    let x = powerMod(base, odd, n);
    if (x === 1n || x === n - 1n) return true;
    for (let k = 1; k < twos; k++) {
      x = (x * x) % n;
      if (x === n - 1n) return true;
    }
    return false;
  });
}

/** A factorisation that was given up. */
export class UnfinishedFactorisation extends RangeError {}

/** Steps of the rho method: a factor p takes about sqrt(p) of them, some 2 million a second at 64 bits. */
interface Allowance {
  left: number;
}

/**
 * Prime factors of n (1 or more) with their exponents. Throws UnfinishedFactorisation where `steps` of the rho method do
 * not find them.
 */
export function factorise(n: bigint, steps = Infinity): Map<bigint, number> {
  const allowance = { left: steps };
  const factors = new Map<bigint, number>();
  const found = (p: bigint): void => void factors.set(p, (factors.get(p) ?? 0) + 1);
  let rest = n;
  for (let p = 2n; p < 1000n && p * p <= rest; p += p === 2n ? 1n : 2n) {
    for (; rest % p === 0n; rest /= p) found(p);
  }
  const split = (m: bigint): void => {
    if (m === 1n) return;
    if (isPrime(m)) return found(m);
    const divisor = divisorOfComposite(m, allowance);
    split(divisor);
    split(m / divisor);
  };
  split(rest);
  return factors;
}

/** A proper divisor of a composite number without small factors. */
function divisorOfComposite(n: bigint, allowance: Allowance): bigint {
  for (let c = 1n; ; c++) {
    const divisor = rho(n, c, allowance);
    if (divisor < n) return divisor;
  }
}

/** Differences that are multiplied together before one gcd is taken. */
const BATCH = 128;

/** A divisor above 1 by the sequence x <- x^2 + c mod n; n itself where this c fails. */
function rho(n: bigint, c: bigint, allowance: Allowance): bigint {
  let fast = 2n;
  for (let lap = 1; ; lap *= 2) {
    const slow = fast;
    for (let done = 0; done < lap; done += BATCH) {
      allowance.left -= BATCH;
      if (allowance.left < 0) {
        throw new UnfinishedFactorisation(`no factor of ${n} was found within the steps allowed`);
      }
      const before = fast;
      let product = 1n;
      for (let k = Math.min(BATCH, lap - done); k > 0; k--) {
        fast = (fast * fast + c) % n;
        product = (product * (fast > slow ? fast - slow : slow - fast)) % n;
      }
      if (gcd(product, n) > 1n) return firstDivisor(n, c, slow, before);
    }
  }
}

/** Steps one by one from `fast` until a difference shares a factor with n (n itself where the cycle is missed). */
function firstDivisor(n: bigint, c: bigint, slow: bigint, fast: bigint): bigint {
  for (;;) {
    fast = (fast * fast + c) % n;
    const divisor = gcd(fast - slow, n);
    if (divisor > 1n) return divisor;
  }
}

/**
 * Smallest k > 0 with a^k = 1 mod m; null where a and m have a common factor. Throws UnfinishedFactorisation where a
 * factorisation takes more than `steps` steps.
 */
export function multiplicativeOrder(a: bigint, m: bigint, steps = Infinity): bigint | null {
  if (!coprime(a, m)) return null;
  // Euler's function is a multiple of the order; its primes are taken out while the power stays 1
  let order = 1n;
  for (const [p, exponent] of factorise(m, steps)) order *= (p - 1n) * p ** BigInt(exponent - 1);
  for (const [p, exponent] of factorise(order, steps)) {
    for (let k = 0; k < exponent && powerMod(a, order / p, m) === 1n % m; k++) order /= p;
  }
  return order;
}
