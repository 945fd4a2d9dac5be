/**
 * What output bits cost an integrand. A source of b bits gives the middle of a cell of width 2^-b (or its left end) in
 * place of every point of the cell; the bias that this makes is E f(rounded) - E f, here estimated in pairs: the same
 * points of a trusted 52-bit source with and without rounding, each point beside its reflection in the middle of its
 * cell, so that the linear term cancels and what is left is of the order of the bias itself.
 *
 * Cells at 0 and 1 are rare (2 d 2^-b of all points) and may hold much of the integral: normal inputs run to infinity in
 * them. They are a stratum of their own: points with a coordinate in an outermost cell are drawn inside it, the cell
 * chosen systematically (W. G. Cochran, Sampling Techniques, 3rd ed. (1977), 8.1), and left out of the main estimate.
 * A point with several counts for the first, so the strata are disjoint and the sum is exact.
 */
import { studentFactor } from "../numeric/student.js";
import { deviation } from "../numeric/moments.js";
import { mean } from "../numeric/sums.js";
import type { PairedEstimate, ResolutionCost } from "../record/resolution.js";
import type { OpenStream, PointStream, Source } from "../sources/contract.js";
import { COORDINATE_BITS, type Endpoint } from "../sources/conversion.js";
import { makeKey, type Key } from "../sources/key.js";
import { philox4x64 } from "../sources/philox4x64.js";
import { isPseudoRandom } from "../sources/pseudo-random.js";
import { channelMean } from "../estimators/moments.js";
import { Integrator } from "./integrator.js";
import type { RunnableProblem } from "./runnable.js";

export interface ResolutionRequest {
  readonly seed: number;
  /** Points of each replicate, inside and in the outermost cells each; each is evaluated three times. */
  readonly points: number;
  /** At least 2. */
  readonly replicates: number;
  /** Level of the intervals, in (0, 1); 0.99 if absent. */
  readonly confidence?: number;
  /** Which point stands for a cell; its middle if absent. */
  readonly endpoint?: Endpoint;
}

/** Bits at which a ladder looks, and those of the source itself. */
const LADDER = [8, 12, 16, 24, 32] as const;

/**
 * The cells that a source's coordinates stand for: their bits (52 at most) and which point of a cell it gives. A modulus
 * that is no power of two counts by the bits of its largest integer; float32 by the 24 bits of its significand.
 */
export function cellsOf(source: Source): { readonly bits: number; readonly endpoint: Endpoint } {
  if (!isPseudoRandom(source))
    return { bits: Math.min(source.outputBits, COORDINATE_BITS), endpoint: "middle" };
  const { bits, endpoint, float32 } = source.usage;
  const given = bits?.count ?? source.outputBits;
  return { bits: Math.min(given, float32 ? 24 : COORDINATE_BITS), endpoint };
}

/** The usual bits and `own`, ascending, each once; coordinates hold 52 at most. */
export function bitLadder(own: number): number[] {
  const bits = new Set([...LADDER, Math.min(own, COORDINATE_BITS)]);
  return [...bits].sort((a, b) => a - b);
}

type Version = "fine" | "reflected" | "rounded";
const VERSIONS: readonly Version[] = ["fine", "reflected", "rounded"];

/**
 * What `bits` output bits cost the integrand. Pure: the same request, the same bits. More than 52 bits count as 52 and
 * cost nothing by definition. Throws RangeError for bits below 1, fewer than 2 replicates or no points.
 */
export function resolutionCost(
  problem: RunnableProblem,
  bits: number,
  request: ResolutionRequest,
): ResolutionCost {
  const { seed, points, replicates, confidence = 0.99, endpoint = "middle" } = request;
  check("bits", bits, 1);
  check("points", points, 1);
  check("replicates", replicates, 2);
  const used = Math.min(bits, COORDINATE_BITS);
  const { dimension } = problem.formula;
  const runner = new PairedRunner(problem, used, endpoint, points);
  const inside: number[] = [];
  const tails: number[] = [];
  for (let replicate = 0; replicate < replicates; replicate++) {
    const key = (part: string): Key =>
      makeKey({ seed, purpose: "resolution", problem: problem.id, source: part, replicate });
    inside.push(runner.difference(key("inside"), null));
    const [word = 0n] = key("cells").words64(1);
    const start = Number(word >> 12n) * 2 ** -52;
    tails.push(2 * dimension * 2 ** -used * runner.difference(key("outermost"), start));
  }
  const estimate = (values: readonly number[]): PairedEstimate => {
    const bias = mean(values);
    const standardError = deviation(values) / Math.sqrt(values.length);
    const half = studentFactor(confidence, values.length - 1) * standardError;
    return { bias, standardError, interval: [bias - half, bias + half] };
  };
  const probability = -Math.expm1(dimension * Math.log1p(-(2 ** -used)));
  return {
    bits,
    endpoint,
    confidence,
    ...estimate(inside.map((value, r) => value + (tails[r] ?? 0))),
    unreachableTail: { ...estimate(tails), probability },
    points,
    replicates,
    nonFinite: runner.nonFinite,
  };
}

function check(name: string, value: number, least: number): void {
  if (!(Number.isInteger(value) && value >= least))
    throw new RangeError(`${name}: expected a whole number of at least ${least}, found ${value}`);
}

/** Means of f over the same points, rounded and not. */
class PairedRunner {
  nonFinite = 0;
  readonly #integrator: Integrator;
  readonly #dimension: number;
  readonly #bits: number;
  readonly #endpoint: Endpoint;
  readonly #points: number;

  constructor(problem: RunnableProblem, bits: number, endpoint: Endpoint, points: number) {
    this.#integrator = new Integrator(problem);
    this.#dimension = problem.formula.dimension;
    this.#bits = bits;
    this.#endpoint = endpoint;
    this.#points = points;
  }

  /**
   * Mean of f(rounded) - f over points without a coordinate in an outermost cell (`start` null; others count as 0), or
   * over points drawn in the outermost cells, which are gone through from `start` (in [0, 1)) on.
   */
  difference(key: Key, start: number | null): number {
    const [fine = NaN, reflected = NaN, rounded = NaN] = VERSIONS.map((version) =>
      this.#mean(key, start, version),
    );
    return rounded - (fine + reflected) / 2;
  }

  #mean(key: Key, start: number | null, version: Version): number {
    const { kernels } = this.#integrator;
    const mark = kernels.arena.mark();
    const [dimension, n] = [this.#dimension, this.#points];
    const base = philox4x64.open({ dimension, n, randomisations: [], key }, kernels);
    const stream = this.#versionOf(base, start, version);
    const [size] = this.#integrator.run(stream, [n]).sizes;
    kernels.arena.release(mark);
    if (size === undefined) return NaN;
    this.nonFinite += size.nonFinite;
    return channelMean(size.moments);
  }

  #versionOf(base: OpenStream, start: number | null, version: Version): PointStream {
    const [dimension, n, cells] = [this.#dimension, this.#points, 2 ** this.#bits];
    const inCell = 2 ** (COORDINATE_BITS - this.#bits);
    const shift = this.#endpoint === "left" ? 0 : 0.5;
    const { kernels } = this.#integrator;
    let index = 0;
    return {
      dimension,
      fill(pointer, stride, count) {
        base.fill(pointer, stride, count);
        const rows = kernels.f64(pointer, (dimension - 1) * stride + count);
        for (let i = 0; i < count; i++, index++) {
          // the outermost cell that this point is drawn in: 2 j at 0, 2 j + 1 at 1, and -1 for none
          const drawn = start === null ? -1 : Math.floor(((index + start) / n) * 2 * dimension);
          let counts = true;
          for (let j = 0, at = i; j < dimension; j++, at += stride) {
            let u = rows[at] as number;
            if (drawn >> 1 === j && drawn >= 0) {
              u = (Math.floor(u * inCell) + 0.5) * 2 ** -COORDINATE_BITS;
              if (drawn & 1) u = 1 - u;
            } else {
              const cell = Math.floor(u * cells);
              const outermost = cell === 0 || cell === cells - 1;
              if (outermost && (drawn < 0 || j < drawn >> 1)) counts = false;
            }
            const cell = Math.floor(u * cells);
            if (version === "rounded") u = (cell + shift) / cells;
            if (version === "reflected") u = (2 * cell + 1) / cells - u;
            rows[at] = u;
          }
          if (counts) continue;
          // the same point in every version: its difference is 0
          for (let j = 0, at = i; j < dimension; j++, at += stride) rows[at] = 0.5;
        }
      },
    };
  }
}
