/**
 * How fast the spread of scrambled-net estimates falls with n: the slope of log deviation on log n. For a smooth integrand it
 * goes to -3/2 (A. B. Owen, Annals of Statistics 25 (1997) 1541-1562), for one that jumps off the axes only a little below -1/2
 * (Z. He & X. Wang, SIAM Journal on Numerical Analysis 53 (2015) 2488-2503), for a kink between them; in practice none is reached
 * in many dimensions. So companions of known smoothness, of the same inputs with the weights that matter here, are run at
 * the same sizes: exp(w.x), max(w.x, 0) and w.x > 0, x uniform on (-1/2, 1/2).
 */
import { deviation } from "../numeric/moments.js";
import { fitLine } from "../numeric/least-squares.js";
import { studentFactor } from "../numeric/student.js";
import type { NetOrder, Smoothness } from "../record/sensitivity.js";
import { parseSource } from "../sources/choice.js";
import { makeKey } from "../sources/key.js";
import { Integrator } from "./integrator.js";
import type { RunnableProblem } from "./runnable.js";

export interface SmoothnessRequest {
  readonly seed: number;
  /** Ascending powers of two, at least 3. */
  readonly sizes: readonly number[];
  readonly replicates: number;
  readonly confidence: number;
  /** What each coordinate counts for, in total variance; not all 0. */
  readonly shares: readonly number[];
}

const KINDS = ["integrand", "smooth", "kinked", "jumping"] as const;
type Kind = (typeof KINDS)[number];

/** null where a spread is 0 (an estimate is exact) or a value not finite, or the net has too few coordinates. */
export function measureSmoothness(problem: RunnableProblem, request: SmoothnessRequest): Smoothness | null {
  const { seed, sizes, replicates, confidence } = request;
  const { dimension, blockPoints } = problem.formula;
  const choice = parseSource("sobol+owen");
  if (dimension > choice.source.largestDimension) return null;
  const integrator = new Integrator(problem);
  const { kernels } = integrator;
  const coordinates = kernels.arena.allocate(blockPoints * dimension * 8);
  const weights = weightsOf(request.shares);
  const spreads: Record<Kind, number[]> = { integrand: [], smooth: [], kinked: [], jumping: [] };
  const mark = kernels.arena.mark();
  for (const [at, n] of sizes.entries()) {
    const means: Record<Kind, number[]> = { integrand: [], smooth: [], kinked: [], jumping: [] };
    for (let r = 0; r < replicates; r++) {
      // fresh keys at every size: the fit takes the spreads for independent
      const replicate = at * replicates + r;
      const source = `${choice.id}, smoothness`;
      const key = makeKey({ seed, purpose: "sensitivity", problem: problem.id, source, replicate });
      const stream = choice.open({ dimension, n, key, replicate }, kernels);
      const sums: Record<Kind, number> = { integrand: 0, smooth: 0, kinked: 0, jumping: 0 };
      for (let begin = 0; begin < n; begin += blockPoints) {
        const count = Math.min(blockPoints, n - begin);
        const values = kernels.f64(integrator.evaluate(stream, count, coordinates), count);
        const rows = kernels.f64(coordinates, blockPoints * dimension);
        for (let i = 0; i < count; i++) {
          let level = 0;
          for (const [j, weight] of weights.entries())
            level += weight * ((rows[j * blockPoints + i] as number) - 0.5);
          sums.integrand += values[i] as number;
          sums.smooth += Math.exp(level);
          sums.kinked += Math.max(level, 0);
          sums.jumping += level > 0 ? 1 : 0;
        }
      }
      kernels.arena.release(mark);
      for (const kind of KINDS) means[kind].push(sums[kind] / n);
    }
    for (const kind of KINDS) spreads[kind].push(deviation(means[kind]));
  }
  if (!KINDS.every((kind) => spreads[kind].every((value) => value > 0 && Number.isFinite(value))))
    return null;
  const orderOf = (kind: Kind): NetOrder => netOrder(sizes, spreads[kind], replicates, confidence);
  return {
    source: choice.id,
    sizes,
    replicates,
    integrand: orderOf("integrand"),
    smooth: orderOf("smooth"),
    kinked: orderOf("kinked"),
    jumping: orderOf("jumping"),
  };
}

/** A weighted sum of the coordinates with these shares of its variance, 1/12 in all. */
function weightsOf(shares: readonly number[]): number[] {
  const clipped = shares.map((share) => Math.max(0, share));
  const all = clipped.reduce((total, share) => total + share, 0);
  return clipped.map((share) => Math.sqrt(all > 0 ? share / all : 1 / shares.length));
}

/** The slope with the wider of two intervals: from the spread of log deviations of normal samples, and from the residuals. */
export function netOrder(
  sizes: readonly number[],
  spreads: readonly number[],
  replicates: number,
  confidence: number,
): NetOrder {
  const line = fitLine(sizes.map(Math.log), spreads.map(Math.log));
  const known =
    line.slopeErrorKnown *
    Math.sqrt(1 / (2 * (replicates - 1))) *
    studentFactor(confidence, sizes.length * (replicates - 1));
  const residual = line.slopeError * studentFactor(confidence, sizes.length - 2);
  const half = Math.max(known, residual);
  return { order: line.slope, interval: [line.slope - half, line.slope + half] };
}
