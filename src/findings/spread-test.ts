/**
 * The test of a pseudo-random source's spread: do its replicates differ as much as those of n independent points would?
 * A generator that is equidistributed over all its seeds has no bias averaged over them; correlations among its points
 * show here only.
 *
 * The statistic is the variance ratio of the one-way analysis of variance (Fisher 1925), n s^2 / w: s^2 the variance of
 * the R estimates, w the mean of the variances within the replicates. It needs no value from another source, so that a
 * confirmation on fresh keys shares nothing with the screen. For independent points its mean is 1 and, for any integrand
 * of finite variance, n (e - mean)^2 - w of one replicate is a sum of products of different points, whose variance
 * depends on sigma^2 alone: the ratio is robust against non-normal integrands in groups of equal size (Box & Andersen,
 * J. R. Statist. Soc. B 17 (1955) 1-34; Scheffé, The Analysis of Variance (1959), section 10.2). Stage 1 compares it with
 * F with R - 1 and R (n - 1) degrees of freedom, two-sided. Stage 2 takes the larger of that p-value and that of the mean
 * of n (e - mean)^2 - w by Hall's transformation, which allows for the few large products of a rare event.
 */
import { fisherTwoSided } from "../numeric/fisher.js";
import { skewedTwoSided } from "../numeric/comparison.js";
import { deviation, skewness, variance } from "../numeric/moments.js";
import { jackknife } from "../numeric/resampling.js";
import { mean, sum } from "../numeric/sums.js";
import type { RawCell, RecordSource } from "../record/types.js";
import { ROUNDING } from "./cells.js";

export interface SpreadOutcome {
  readonly pValue: number | null;
  /** n s^2 / w, 1 for independent points; null where there is no test. */
  readonly ratio: number | null;
  /** Why there is no test; null where there is one. */
  readonly reason: string | null;
}

export function noSpreadTest(reason: string): SpreadOutcome {
  return { pValue: null, ratio: null, reason };
}

/** Methods of the user's own sources whose points are more even than independent ones by design. */
const EVEN_METHODS: ReadonlySet<string> = new Set(["digital net", "rank-1 lattice"]);

/** True for sources whose points should behave as independent ones: generators, and draws from outside. */
export function claimsIndependence({ family, method }: RecordSource): boolean {
  return family === "pseudo-random" || (family === "own" && !EVEN_METHODS.has(method));
}

/** Fewest expected hits (and misses) among all points for a test of an indicator, as for its bias. */
const FEWEST_HITS = 100;

/** The variances within the replicates, all of them known and finite; null otherwise. */
function knownVariances(cell: Pick<RawCell, "withinVariances" | "estimates">): number[] | null {
  const known = cell.withinVariances.filter((value) => value !== null && Number.isFinite(value));
  return known.length === cell.estimates.length ? (known as number[]) : null;
}

/** The test of one cell; `confirming` at stage 2. */
export function testSpread(
  cell: Pick<RawCell, "n" | "estimates" | "withinVariances" | "indicator">,
  confirming: boolean,
): SpreadOutcome {
  const { n, estimates, indicator } = cell;
  const within = knownVariances(cell);
  if (n < 2 || estimates.length < 3 || within === null || !estimates.every(Number.isFinite)) {
    return noSpreadTest("the variances within the replicates are not known");
  }
  const centre = mean(estimates);
  const inside = mean(within);
  if (indicator) {
    const hits = Math.min(centre, 1 - centre) * n * estimates.length;
    if (!(hits >= FEWEST_HITS)) return noSpreadTest(`fewer than ${FEWEST_HITS} hits or misses`);
  }
  // Where the integrand hardly varies within a replicate, both variances are rounding.
  const rounding = (ROUNDING * Math.abs(centre)) ** 2;
  if (!(inside > rounding)) return noSpreadTest("the integrand does not vary within a replicate");
  const ratio = (n * variance(estimates)) / inside;
  const plain = fisherTwoSided(ratio, estimates.length - 1, estimates.length * (n - 1));
  return {
    pValue: confirming ? Math.max(plain, byExcess(cell.n, estimates, within)) : plain,
    ratio,
    reason: null,
  };
}

/** p-value of a mean of n (e - mean)^2 - w of 0, by Hall's transformation. */
function byExcess(n: number, estimates: readonly number[], within: readonly number[]): number {
  const centre = mean(estimates);
  const count = estimates.length;
  const excess = estimates.map(
    (estimate, r) => ((n * count) / (count - 1)) * (estimate - centre) ** 2 - (within[r] ?? NaN),
  );
  const spread = deviation(excess);
  // All replicates alike: nothing for Hall's transformation to allow for.
  if (!(spread > 0)) return 0;
  return skewedTwoSided((mean(excess) / spread) * Math.sqrt(count), skewness(excess), count);
}

/** 95 % interval of the ratio: jackknife of its logarithm over the replicates; null where it has none. */
export function ratioInterval(
  n: number,
  estimates: readonly number[],
  withinVariances: readonly (number | null)[],
): readonly [number, number] | null {
  const within = knownVariances({ estimates, withinVariances });
  if (within === null) return null;
  const count = estimates.length;
  const centre = mean(estimates);
  const squares = sum(estimates.map((value) => (value - centre) ** 2));
  const inside = sum(within);
  const all = Math.log((n * squares * count) / (count - 1) / inside);
  const without = estimates.map((value, r) => {
    const rest = squares - ((value - centre) ** 2 * count) / (count - 1);
    return Math.log((n * rest * (count - 1)) / (count - 2) / (inside - (within[r] ?? NaN)));
  });
  const interval = jackknife(all, without)?.interval ?? null;
  return interval === null ? null : [Math.exp(interval[0]), Math.exp(interval[1])];
}
