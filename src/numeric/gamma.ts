/**
 * Logarithm of the gamma function, and the two pieces that let the density of a gamma, beta or binomial law with large parameters be written without
 * cancellation: Stirling's error, by Stirling's series (Abramowitz & Stegun 1964, 6.1.41; DLMF 5.11.1), and the deviance
 * part (Loader, "Fast and accurate computation of binomial probabilities", 2000). Absolute error below 4e-15.
 */

// B_2k / (2k (2k - 1)), Abramowitz & Stegun 6.1.41 with the Bernoulli numbers of their table 23.2.
const STIRLING = [1 / 12, -1 / 360, 1 / 1260, -1 / 1680, 1 / 1188, -691 / 360360, 1 / 156];

/**
 * Stirling's error ln Gamma(x + 1) - (x + 1/2) ln x + x - ln(2 pi)/2 for x > 0. Below 15 it climbs by
 * d(x) = d(x + 1) + (x + 1/2) ln(1 + 1/x) - 1; from 15 on the eighth term of the series is below 1e-17.
 */
export function stirlingError(x: number): number {
  let climbed = 0;
  let at = x;
  while (at < 15) {
    climbed += (at + 0.5) * Math.log1p(1 / at) - 1;
    at += 1;
  }
  const square = 1 / (at * at);
  let series = 0;
  for (let k = STIRLING.length - 1; k >= 0; k--) series = series * square + (STIRLING[k] ?? 0);
  return climbed + series / at;
}

/** x ln(x/m) + m - x for x, m > 0: half the deviance, exact near x = m where the plain form cancels (Loader 2000). */
export function deviancePart(x: number, m: number): number {
  const difference = x - m;
  if (Math.abs(difference) >= 0.1 * (x + m)) return x * Math.log(x / m) - difference;
  // With v = (x - m)/(x + m): ln(x/m) = 2 artanh(v), so the sum is (x - m) v + 2 x v^3 (1/3 + v^2/5 + ...).
  const v = difference / (x + m);
  let power = 2 * x * v;
  let total = difference * v;
  for (let j = 3; ; j += 2) {
    power *= v * v;
    const next = total + power / j;
    if (next === total) return total;
    total = next;
  }
}

const HALF_LOG_TWO_PI = 0.9189385332046727;

/** ln Gamma(x) for x > 0, to about 1e-14 of the larger of 1 and the result: Stirling's formula with its error above. */
export function logGamma(x: number): number {
  return stirlingError(x) + (x - 0.5) * Math.log(x) - x + HALF_LOG_TWO_PI;
}
