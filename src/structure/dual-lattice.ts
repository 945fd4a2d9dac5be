/**
 * The lattice of tuples and its dual. Tuples of outputs lie on families of parallel hyperplanes h.u = whole number (plus a
 * constant where the lattice is shifted), one for each h of the dual lattice {h in Z^t : h_1 v_1 + ... + h_t v_t = 0 mod m};
 * the shortest h has the fewest planes, 1/|h| apart (R. R. Coveyou and R. D. MacPherson, "Fourier analysis of uniform random
 * number generators", Journal of the ACM 14 (1967) 100-119; Knuth, The Art of Computer Programming, vol. 2, 3.3.4).
 *
 * - `figure` is S_t = nu_t / (gamma_t^(1/2) D^(1/t)), D the determinant of the dual (P. L'Ecuyer, Mathematics of Computation
 *   68 (1999) 249-260): 1 at best. Exact for t <= 8 and t = 24; beyond with Rogers' bound for gamma_t, as there, which
 *   makes it a lower limit. `figureAtMost` takes the densest lattice known instead (t <= 16).
 * - `hyperplanes` counts those that meet the half-open cube [0, 1)^t for the h of least |h|_1, the lattice through the
 *   origin: |h|_1 - 1 if h has entries of both signs, |h|_1 if not. A shifted lattice meets up to |h|_1.
 * - `marsagliaBound` is the whole part of (t! D)^(1/t): no lattice of this determinant has a least number of planes above it
 *   (G. Marsaglia, "Random numbers fall mainly in the planes", Proceedings of the National Academy of Sciences 61 (1968) 25-28).
 */
import { hermiteConstant, LARGEST_HERMITE } from "../numeric/hermite.js";
import { integerRoot, logOf } from "../numeric/integer-root.js";
import { KernelLattice } from "../numeric/kernel-lattice.js";
import { isMixed, shortestVectors } from "../numeric/lattice-enumeration.js";
import { ReducedBasis, type Row } from "../numeric/lattice-reduction.js";
import type { Tuples } from "./tuples.js";

export interface DualFigures {
  readonly dimension: number;
  /** nu_t^2. */
  readonly squaredLength: bigint;
  /** A shortest vector: the first one in lexicographic order from above, the first non-zero entry positive. */
  readonly vector: Row;
  /** How many shortest vectors there are, of v and -v one. */
  readonly shortestVectors: number;
  readonly l1Length: bigint;
  readonly l1Vector: Row;
  readonly hyperplanes: bigint;
  readonly marsagliaBound: bigint;
  readonly figure: number;
  readonly figureAtMost: number | null;
  /** Knuth's mu_t, the volume of the ball of radius nu_t over D: above 0.1 he calls it passed, above 1 with flying colours. */
  readonly mu: number;
  /** False where an enumeration stopped at its bound: the vector is then the shortest one found. */
  readonly complete: boolean;
  readonly l1Complete: boolean;
}

/** Most candidates that one enumeration looks at. */
export interface Steps {
  readonly squaredLength: number;
  readonly absoluteSum: number;
}

/** About 4 s and 1 s of work: at m = 2^64 enough to 46 dimensions in the Euclidean norm, to 22 in the other. */
export const DEFAULT_STEPS: Steps = { squaredLength: 2 ** 27, absoluteSum: 2 ** 23 };

export const LARGEST_DUAL_DIMENSION = LARGEST_HERMITE;

export interface DualRequest {
  /** The first dimension that is given. */
  readonly from?: number;
  /** The same for all dimensions, or by dimension. */
  readonly steps?: Steps | ((dimension: number) => Steps);
  /** The dimensions that are given; absent for all of them. */
  readonly wanted?: ReadonlySet<number>;
}

/** The dual lattice of the outputs with these indices, dimension after dimension from 1 on (2 at least are of use). */
export function* dualFigures(
  tuples: Tuples,
  indices: readonly number[],
  { from = 2, steps = DEFAULT_STEPS, wanted }: DualRequest = {},
): Generator<DualFigures, void> {
  checkIndices(tuples, indices);
  const lattice = new KernelLattice(tuples.modulus, tuples.residues);
  const basis = new ReducedBasis();
  let known: readonly Row[] = [];
  for (const index of indices) {
    basis.append(lattice.append(tuples.vector(index)));
    // a relation between fewer outputs is one between more
    known = known.map((row) => [...row, 0n]);
    if (!(basis.size >= from && wanted?.has(basis.size) !== false)) continue;
    const most = typeof steps === "function" ? steps(basis.size) : steps;
    const figures = figuresOf(basis, lattice.determinant, most, known);
    known = [figures.vector, figures.l1Vector];
    yield figures;
  }
}

/** The same for one index set alone. */
export function dualFigure(tuples: Tuples, indices: readonly number[], steps = DEFAULT_STEPS): DualFigures {
  const [figures] = dualFigures(tuples, indices, { from: indices.length, steps });
  if (figures === undefined) throw new RangeError("index set: expected at least one index, found none");
  return figures;
}

function figuresOf(
  basis: ReducedBasis,
  determinant: bigint,
  steps: Steps,
  known: readonly Row[],
): DualFigures {
  const dimension = basis.size;
  const short = shortestVectors(basis, "squared-length", steps.squaredLength, known);
  const sparse = shortestVectors(basis, "absolute-sum", steps.absoluteSum, [...known, ...short.vectors]);
  const [vector = [], l1Vector = []] = [short.vectors[0], sparse.vectors[0]];
  const root = integerRoot(factorial(dimension) * determinant, dimension);
  return {
    dimension,
    squaredLength: short.norm,
    vector,
    shortestVectors: short.vectors.length,
    l1Length: sparse.norm,
    l1Vector,
    hyperplanes: isMixed(l1Vector) ? sparse.norm - 1n : sparse.norm,
    marsagliaBound: root,
    ...normalised(short.norm, determinant, dimension),
    complete: short.complete,
    l1Complete: sparse.complete,
  };
}

function normalised(
  squaredLength: bigint,
  determinant: bigint,
  t: number,
): Pick<DualFigures, "figure" | "figureAtMost" | "mu"> {
  const { most, least } = hermiteConstant(t);
  const length = Math.exp(logOf(squaredLength) / 2 - logOf(determinant) / t);
  return {
    figure: length / Math.sqrt(most),
    figureAtMost: least === null ? null : length / Math.sqrt(least),
    mu: unitBall(t) * length ** t,
  };
}

/** Volume of the ball of radius 1 in t dimensions, by V_t = V_(t-2) 2 pi / t. */
function unitBall(t: number): number {
  return t < 2 ? t + 1 : (unitBall(t - 2) * 2 * Math.PI) / t;
}

function factorial(t: number): bigint {
  let product = 1n;
  for (let k = 2; k <= t; k++) product *= BigInt(k);
  return product;
}

function checkIndices({ size }: Tuples, indices: readonly number[]): void {
  if (indices.length > LARGEST_DUAL_DIMENSION) {
    throw new RangeError(
      `dimension: expected at most ${LARGEST_DUAL_DIMENSION} for the dual lattice, found ${indices.length}`,
    );
  }
  const repeated = indices.find((index, j) => indices.indexOf(index) !== j);
  if (repeated !== undefined) {
    throw new RangeError(`index set: expected indices that differ, found ${repeated} twice`);
  }
  const outside = indices.find((index) => !(index >= 0 && (size === null || index < size)));
  if (outside === undefined) return;
  const allowed = size === null ? "whole numbers from 0" : `whole numbers from 0 to ${size - 1}`;
  throw new RangeError(`index set: expected ${allowed}, found ${outside}`);
}
