/**
 * The family of tests of a study: one of bias per problem x source x estimator x output (bias.ts), and one of spread per
 * problem x pseudo-random source (spread-test.ts), all at the largest n. Stage 1 holds them in one Holm family at level
 * sqrt(falseAlarms). Stage 2 runs each candidate again on fresh keys; its level falseAlarms is shared between the two kinds
 * in proportion to their numbers, so that the most severe step of each is falseAlarms divided by the size of the family,
 * and the chance that a study confirms anything falsely stays at falseAlarms or below.
 */
import type { BiasTest, SpreadTest } from "../record/types.js";
import {
  adjustTogether,
  biasRows,
  confirmCandidates,
  screenBiases,
  screeningLevel,
  type Confirmation,
} from "./bias.js";
import type { Context } from "./cells.js";
import { namesOf, seriesKey, type Series } from "./series.js";
import {
  claimsIndependence,
  noSpreadTest,
  ratioInterval,
  testSpread,
  type SpreadOutcome,
} from "./spread-test.js";

export interface Family {
  readonly tests: readonly BiasTest[];
  readonly spreadTests: readonly SpreadTest[];
  /** Tests with a p-value. */
  readonly size: number;
}

/** Stage 1. */
export function screenFamily(series: readonly Series[], context: Context, falseAlarms: number): Family {
  const biases = screenBiases(series, context);
  const subjects = series.filter((one) => isSubject(one, context));
  const spreads = subjects.map(({ last, cells, problem }): SpreadOutcome => {
    const divergent = context.divergent.get(problem);
    if (divergent !== undefined) return noSpreadTest(divergent);
    if (cells.some((cell) => cell.nonFinite !== null))
      return noSpreadTest("non-finite values of the integrand");
    if (last.finiteBias !== undefined)
      return noSpreadTest("the variance within a replicate is approximate for this quantity");
    return testSpread(last, false);
  });
  const pValues = [...biases, ...spreads].map((outcome) => outcome.pValue);
  const size = pValues.filter((value) => value !== null).length;
  const adjusted = adjustTogether(pValues, size);
  const level = screeningLevel(falseAlarms);
  const spreadTests = subjects.map((one, i): SpreadTest => {
    const { pValue, ratio, reason } = spreads[i] ?? noSpreadTest("not tested");
    const pValueAdjusted = adjusted[biases.length + i] ?? null;
    return {
      ...namesOf(one),
      n: one.last.n,
      ratio,
      pValue,
      pValueAdjusted,
      candidate: pValueAdjusted !== null && pValueAdjusted <= level,
      confirmation: null,
      confirmed: false,
      reason,
    };
  });
  return { tests: biasRows(series, biases, adjusted, size, context, falseAlarms), spreadTests, size };
}

/** Crude estimates of sources whose points should behave as independent ones, with an error bar. */
function isSubject(one: Series, context: Context): boolean {
  const source = context.sources.get(one.source);
  return (
    source !== undefined && claimsIndependence(source) && !source.deterministic && one.estimator === "crude"
  );
}

/** Stage 2: completes the candidates; one without fresh estimates stays unconfirmed. */
export function confirmFamily(
  family: Family,
  confirmations: readonly Confirmation[],
  series: readonly Series[],
  context: Context,
  falseAlarms: number,
): Family {
  const tested = family.tests.filter((test) => test.pValue !== null).length;
  const level = (count: number) => (falseAlarms * count) / Math.max(1, family.size);
  return {
    tests: confirmCandidates(family.tests, confirmations, series, context, level(tested)),
    spreadTests: confirmSpreads(family.spreadTests, confirmations, series, level(family.size - tested)),
    size: family.size,
  };
}

function confirmSpreads(
  tests: readonly SpreadTest[],
  confirmations: readonly Confirmation[],
  series: readonly Series[],
  level: number,
): SpreadTest[] {
  const fresh = new Map(confirmations.map((one) => [seriesKey(one), one]));
  const indicators = new Map(series.map((one) => [seriesKey(one), one.last.indicator]));
  const candidates = tests.filter((test) => test.candidate);
  const outcomes = candidates.map((test): SpreadOutcome => {
    const again = fresh.get(seriesKey(test));
    if (again?.withinVariances === undefined)
      return noSpreadTest("not confirmed: there are no fresh replicates");
    const { n, estimates, withinVariances } = again;
    const indicator = indicators.get(seriesKey(test)) ?? false;
    return testSpread({ n, estimates, withinVariances, indicator }, true);
  });
  const adjusted = adjustTogether(
    outcomes.map((outcome) => outcome.pValue),
    candidates.length,
  );
  return tests.map((test) => {
    const at = candidates.indexOf(test);
    const outcome = outcomes[at];
    if (outcome === undefined) return test;
    const again = fresh.get(seriesKey(test));
    const { pValue, ratio } = outcome;
    if (again?.withinVariances === undefined || pValue === null || ratio === null) {
      return { ...test, reason: outcome.reason };
    }
    const sameSide = Math.sign(ratio - 1) === Math.sign((test.ratio ?? NaN) - 1);
    const { estimates, withinVariances, n } = again;
    return {
      ...test,
      confirmation: {
        replicates: estimates.length,
        estimates,
        withinVariances,
        ratio,
        interval: ratioInterval(n, estimates, withinVariances),
        pValue,
      },
      confirmed: sameSide && (adjusted[at] ?? 1) <= level,
    };
  });
}
