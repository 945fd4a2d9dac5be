/**
 * The binomial law: probabilities by Loader's saddle-point form (2000), tails by the incomplete beta function
 * (Abramowitz & Stegun 26.5.24), the exact two-sided test by the method of small probabilities (all outcomes no likelier
 * than the one seen; Sterne, Biometrika 41 (1954) 275-278), and the interval of Clopper & Pearson (Biometrika 26 (1934)
 * 404-413). Trials may be some 1e9.
 */
import { betaQuantile, betaWeight, incompleteBeta } from "./incomplete-beta.js";

function check(hits: number, trials: number): void {
  if (!Number.isInteger(hits) || !Number.isInteger(trials) || !(hits >= 0) || !(hits <= trials)) {
    throw new RangeError(`binomial: expected whole numbers 0 <= hits <= trials, found ${hits} of ${trials}`);
  }
}

/** P(K = hits). */
function binomialProbability(hits: number, trials: number, p: number): number {
  check(hits, trials);
  if (hits === 0) return Math.exp(trials * Math.log1p(-p));
  if (hits === trials) return Math.exp(trials * Math.log(p));
  return betaWeight(hits, trials - hits, p, 1 - p);
}

/** P(K <= hits). */
export function binomialLower(hits: number, trials: number, p: number): number {
  check(hits, trials);
  return hits === trials ? 1 : incompleteBeta(hits + 1, trials - hits, p).upper;
}

/** P(K >= hits). */
export function binomialUpper(hits: number, trials: number, p: number): number {
  check(hits, trials);
  return hits === 0 ? 1 : incompleteBeta(hits, trials - hits + 1, p).lower;
}

/** Exact two-sided p-value of `hits` against the probability p in (0, 1). */
export function binomialTwoSided(hits: number, trials: number, p: number): number {
  if (!(p > 0) || !(p < 1)) throw new RangeError(`binomial test: expected p in (0, 1), found ${p}`);
  // A relative allowance for rounding, so that the mirror image of `hits` counts as equally likely.
  const limit = binomialProbability(hits, trials, p) * (1 + 1e-7);
  const mode = Math.floor((trials + 1) * p);
  if (hits === mode) return 1;
  if (hits < mode) {
    const other = firstWhere(mode, trials + 1, (k) => binomialProbability(k, trials, p) <= limit);
    return Math.min(
      1,
      binomialLower(hits, trials, p) + (other > trials ? 0 : binomialUpper(other, trials, p)),
    );
  }
  const above = firstWhere(0, mode + 1, (k) => binomialProbability(k, trials, p) > limit);
  return Math.min(
    1,
    binomialUpper(hits, trials, p) + (above === 0 ? 0 : binomialLower(above - 1, trials, p)),
  );
}

/** The first whole number in [low, high) for which `holds` is true, given that it stays true; `high` if none. */
function firstWhere(low: number, high: number, holds: (k: number) => boolean): number {
  let [a, b] = [low, high];
  while (a < b) {
    const middle = Math.floor((a + b) / 2);
    if (holds(middle)) b = middle;
    else a = middle + 1;
  }
  return a;
}

/** Clopper-Pearson interval of a probability at `confidence` in (0, 1). */
export function clopperPearson(hits: number, trials: number, confidence: number): [number, number] {
  check(hits, trials);
  const tail = (1 - confidence) / 2;
  const low = hits === 0 ? 0 : betaQuantile(tail, hits, trials - hits + 1);
  // The upper limit as 1 minus a lower one, so that its own small tail is what is solved for.
  const high = hits === trials ? 1 : 1 - betaQuantile(tail, trials - hits, hits + 1);
  return [low, high];
}
