/**
 * The standard normal law for statistics. Distribution: the all-positive series of Marsaglia ("Evaluating the normal
 * distribution", J. Stat. Software 11 (2004) no. 4) below |z| = 2, the continued fraction of Mills' ratio above
 * (Abramowitz & Stegun 26.2.14). Quantile: Newton's method on the logarithm of the tail from the start of Abramowitz &
 * Stegun 26.2.23. Relative error about 1e-14 in both tails, down to the smallest double. Not for points in bulk: the
 * kernels have their own.
 */

const ROOT_TWO_PI = 2.5066282746310002;

/** Density; the square is split (Cody 1969) so that far tails keep their digits. */
function normalDensity(z: number): number {
  const head = Math.trunc(z * 16) / 16;
  return (Math.exp(-0.5 * head * head) * Math.exp(-0.5 * (z - head) * (z + head))) / ROOT_TWO_PI;
}

/** P(0 < Z < z) for moderate z, odd in z. */
function centralPart(z: number): number {
  let term = z;
  let total = z;
  for (let k = 3; Math.abs(term) > Math.abs(total) * 1e-17; k += 2) {
    term *= (z * z) / k;
    total += term;
  }
  return total * normalDensity(z);
}

/** Mills' ratio (1 - Phi(z)) / phi(z) for z >= 2. */
function millsRatio(z: number): number {
  // Backward evaluation; 12 + 1200/z^2 steps leave an error below 1e-16 from z = 2 on.
  let tail = z;
  for (let k = Math.ceil(12 + 1200 / (z * z)); k >= 1; k--) tail = z + k / tail;
  return 1 / tail;
}

/** P(Z > z). */
export function normalUpper(z: number): number {
  if (Number.isNaN(z)) return NaN;
  if (z === Infinity) return 0;
  if (z === -Infinity) return 1;
  if (z >= 2) return normalDensity(z) * millsRatio(z);
  if (z <= -2) return 1 - normalUpper(-z);
  return 0.5 - centralPart(z);
}

/** P(Z <= z). */
export function normalCdf(z: number): number {
  return normalUpper(-z);
}

/** The z with P(Z > z) = q, for q in [0, 1]. */
export function normalUpperQuantile(q: number): number {
  if (!(q >= 0) || !(q <= 1)) throw new RangeError(`normal quantile: expected p in [0, 1], found ${q}`);
  if (q === 0) return Infinity;
  if (q === 1) return -Infinity;
  if (q > 0.5) return -normalUpperQuantile(1 - q);
  if (q > 0.4) {
    let z = (0.5 - q) * ROOT_TWO_PI;
    for (let i = 0; i < 5; i++) z += (0.5 - q - centralPart(z)) / normalDensity(z);
    return z;
  }
  const target = Math.log(q);
  const t = Math.sqrt(-2 * target);
  let z =
    t -
    (2.515517 + 0.802853 * t + 0.010328 * t * t) /
      (1 + 1.432788 * t + 0.189269 * t * t + 0.001308 * t * t * t);
  for (let i = 0; i < 4; i++) {
    const ratio = z >= 2 ? millsRatio(z) : normalUpper(z) / normalDensity(z);
    // ln of the tail as ln(phi) + ln(ratio): phi itself may underflow.
    const logTail = -0.5 * z * z - Math.log(ROOT_TWO_PI) + Math.log(ratio);
    z += (logTail - target) * ratio;
  }
  return z;
}

/** The z with P(Z <= z) = p, for p in [0, 1]. */
export function normalQuantile(p: number): number {
  return -normalUpperQuantile(p);
}
