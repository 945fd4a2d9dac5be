/** Simulated error curves with a known RMSE, deviation and order, for the coverage of the intervals that findings state. */
import { assembleRecord } from "../../src/findings/assemble.js";
import { toCells } from "../../src/findings/cells.js";
import { makeContext } from "../../src/findings/context.js";
import { spreadOf } from "../../src/findings/spread.js";
import { seriesOf } from "../../src/findings/series.js";
import { makeAssembly, makeCell, makeProblem, makeSource, normals, uniforms } from "../findings/make.js";
import { seedOf } from "./integrands.js";

const SIZES = [256, 512, 1024, 2048, 4096, 8192, 16384];

/** Draws of mean 0 and variance 1 in the shape of the errors. */
const SHAPES = {
  normal: (seed: number) => normals(seed),
  /** Exponential, less its mean: skewness 2, kurtosis 9. */
  skewed: (seed: number) => {
    const uniform = uniforms(seed);
    return () => -Math.log(uniform()) - 1;
  },
  /** Laplace over sqrt 2: kurtosis 6. */
  heavy: (seed: number) => {
    const uniform = uniforms(seed);
    return () => {
      const u = uniform() - 0.5;
      return (-Math.sign(u) * Math.log(1 - 2 * Math.abs(u))) / Math.SQRT2;
    };
  },
} as const;

/** Errors of R replicates at all sizes. Nested: running means of one stream, so that sizes are correlated; order 1/2. */
function nestedErrors(shape: keyof typeof SHAPES, seed: number, replicates: number): number[][] {
  const draw = SHAPES[shape](seed);
  const sums = new Array<number>(replicates).fill(0);
  let before = 0;
  return SIZES.map((n) => {
    for (let r = 0; r < replicates; r++) sums[r] = (sums[r] ?? 0) + Math.sqrt(n - before) * draw();
    before = n;
    return sums.map((value) => value / n);
  });
}

/** Independent errors at each size, falling as n^-1.5, as a scrambled net's on a smooth integrand. */
function steepErrors(shape: keyof typeof SHAPES, seed: number, replicates: number): number[][] {
  const draw = SHAPES[shape](seed);
  return SIZES.map((n) => Array.from({ length: replicates }, () => n ** -1.5 * draw()));
}

export interface Coverage {
  readonly rmse: number;
  readonly order: number;
  readonly deviation: number;
  readonly reach: number;
  readonly trials: number;
}

/** How often the 95 % intervals held the truth: RMSE at the largest n, order, s at 4 times that n, n to a tolerance. */
export function coverageOf(
  kind: "nested" | "steep",
  shape: keyof typeof SHAPES,
  replicates: number,
  trials: number,
): Coverage {
  const steep = kind === "steep";
  const order = steep ? 1.5 : 0.5;
  const [largest, smallest] = [SIZES.at(-1) ?? 0, SIZES[0] ?? 0];
  const problems = [makeProblem("p")];
  const source = steep
    ? makeSource("sobol+owen", { family: "quasi-random", randomisations: ["owen"] })
    : makeSource("philox4x32");
  const held = { rmse: 0, order: 0, deviation: 0, reach: 0 };
  const within = (interval: readonly [number, number] | null | undefined, truth: number) =>
    interval !== null && interval !== undefined && interval[0] <= truth && truth <= interval[1] ? 1 : 0;
  for (let trial = 0; trial < trials; trial++) {
    const seed = seedOf([kind, shape, replicates, trial]);
    const errors = steep ? steepErrors(shape, seed, replicates) : nestedErrors(shape, seed, replicates);
    const rawCells = SIZES.map((n, i) =>
      makeCell({ source: source.id, n, estimates: (errors[i] ?? []).map((error) => 1 + error) }),
    );
    const record = assembleRecord(makeAssembly(rawCells, { problems, sources: [source] }));
    const [series] = seriesOf(record.cells);
    const spread = series === undefined ? null : spreadOf(series, !steep);
    const far = steep ? largest : 4 * largest;
    const middle = Math.sqrt(largest * smallest);
    held.rmse += within(record.cells.at(-1)?.rmseInterval, largest ** -order);
    held.order += within(record.convergence[0]?.orderInterval, -order);
    held.deviation += within(spread?.at(far)?.interval, far ** -order);
    held.reach += within(spread?.reach(middle ** -order)?.interval, middle);
  }
  const { rmse, order: slope, deviation, reach } = held;
  return {
    rmse: rmse / trials,
    order: slope / trials,
    deviation: deviation / trials,
    reach: reach / trials,
    trials,
  };
}

/**
 * Verdicts on a sound source whose errors are normal, when the tolerance is exactly `multiple` times the one that is kept
 * with 99 % probability.
 */
export function verdictsAt(multiple: number, replicates: number, trials: number): Record<string, number> {
  const largest = SIZES.at(-1) ?? 0;
  // 2.5758 standard deviations hold 99 % of a normal law (Abramowitz & Stegun, table 26.5).
  const absolute = (multiple * 2.5758293035489004) / Math.sqrt(largest);
  const tolerance = { absolute, relative: null, to: "reference", confidence: 0.99 };
  const problems = [makeProblem("p", { tolerance })];
  const counts: Record<string, number> = { within: 0, outside: 0, undecided: 0, none: 0 };
  for (let trial = 0; trial < trials; trial++) {
    const errors = nestedErrors("normal", seedOf(["verdict", replicates, trial]), replicates);
    const rawCells = SIZES.map((n, i) =>
      makeCell({ n, estimates: (errors[i] ?? []).map((error) => 1 + error) }),
    );
    const verdict = assembleRecord(makeAssembly(rawCells, { problems })).budgets[0]?.verdict ?? "none";
    counts[verdict] = (counts[verdict] ?? 0) + 1;
  }
  return counts;
}

/** How often the bootstrap interval of s^2 n / sigma^2 held 1, normal estimates of independent points. */
export function spreadCoverage(replicates: number, trials: number): number {
  const context = makeContext([makeProblem("p")], [makeSource("philox4x32")], []);
  let held = 0;
  for (let trial = 0; trial < trials; trial++) {
    const normal = normals(seedOf(["spread", replicates, trial]));
    const estimates = Array.from({ length: replicates }, () => 1 + normal() / 16);
    const withinVariances = estimates.map(() => 1 + normal() / 12);
    const [cell] = toCells([makeCell({ n: 256, estimates, withinVariances })], context);
    const interval = cell?.varianceAgainstCrudeInterval ?? [1, 0];
    if (interval[0] <= 1 && 1 <= interval[1]) held++;
  }
  return held / trials;
}
