/**
 * Stratified samples, built for one n:
 * - `latin-hypercube` (M. D. McKay, R. J. Beckman and W. J. Conover, "A comparison of three methods for selecting values of
 *   input variables in the analysis of output from a computer code", Technometrics 21, 1979, 239-245): every coordinate has
 *   one point in each of n equal intervals, in random order, at random inside it. Good for: integrands that are nearly sums
 *   of functions of one coordinate. Bad for: the rest, where it is as good as plain sampling.
 * - `stratified`, the jittered grid (S. Haber, "A modified Monte-Carlo quadrature", Mathematics of Computation 20, 1966,
 *   361-368): one random point in each of n = 2^m equal boxes, of which coordinate j is cut into 2^(m_j) parts, the m_j as
 *   equal as can be. Good for: few coordinates. Bad for: more than m, of which the later ones are not stratified.
 *
 * The uniform numbers come from Philox4x32-10 (philox4x32), 32 bits inside a cell.
 */
import type { Kernels } from "../kernels/instance.js";
import type { OpenRequest, PointStream, Seekable, Source, SourceDescription } from "./contract.js";
import type { Key } from "./key.js";
import { philox4x32 } from "./philox4x32.js";
import { checkOpening, nearestPowerOfTwo } from "./quasi-random.js";

/** More cells in a coordinate would leave fewer than 32 of the 52 bits inside one. */
const LARGEST_SIZE = 2 ** 20;
/** Permutations are held in memory, 4 bytes an entry. */
const LARGEST_TABLE = 2 ** 28;

const about = {
  family: "stratified",
  method: "stratified sample",
  outputBits: 52,
  period: null,
  nesting: "per-size",
  randomisations: [],
  knownStructure: null,
} satisfies Partial<SourceDescription>;

export const latinHypercube: Source = {
  ...about,
  id: "latin-hypercube",
  title: "Latin hypercube sample",
  citation:
    "M. D. McKay, R. J. Beckman and W. J. Conover, A comparison of three methods for selecting values of input variables in the analysis of output from a computer code, Technometrics 21 (1979) 239-245",
  largestDimension: 10_000,
  nearestSize: (n) => Math.min(n, LARGEST_SIZE),
  open: openLatinHypercube,
};

export const stratified: Source = {
  ...about,
  id: "stratified",
  title: "Stratified (jittered) grid",
  citation: "S. Haber, A modified Monte-Carlo quadrature, Mathematics of Computation 20 (1966) 361-368",
  largestDimension: 10_000,
  nearestSize: (n) => nearestPowerOfTwo(n, LARGEST_SIZE),
  open: openStratified,
};

function openLatinHypercube(request: OpenRequest, kernels: Kernels): PointStream & Seekable {
  const { key, uniforms } = openUniforms(latinHypercube, request, kernels);
  const { dimension, n } = request;
  if (n * dimension > LARGEST_TABLE) {
    throw new RangeError(
      `n: source "latin-hypercube" holds n permuted numbers for every coordinate, at most 2^28 in all; found ${n} for each of ${dimension}`,
    );
  }
  const { arena, exports } = kernels;
  const permutations = arena.allocate(n * dimension * 4 + 8);
  const mark = arena.mark();
  const seeds = arena.allocate(dimension * 32);
  kernels.u64(seeds, dimension * 4).set(key.derive("permutations").words64(dimension * 4));
  exports.latinPrepare(permutations, n, dimension, seeds);
  arena.release(mark);
  return overUniforms(latinHypercube, uniforms, n, (index, pointer, stride, count) => {
    exports.latinPass(permutations, n, dimension, index, pointer, stride, count);
  });
}

function openStratified(request: OpenRequest, kernels: Kernels): PointStream & Seekable {
  const { uniforms } = openUniforms(stratified, request, kernels);
  const { dimension, n } = request;
  const layout = kernels.arena.allocate(dimension * 8);
  const words = kernels.u32(layout, dimension * 2);
  const bits = Math.log2(n);
  for (let j = 0, first = 0; j < dimension; j++) {
    const own = Math.floor(bits / dimension) + (j < bits % dimension ? 1 : 0);
    words.set([first, own], 2 * j);
    first += own;
  }
  return overUniforms(stratified, uniforms, n, (index, pointer, stride, count) => {
    kernels.exports.boxesPass(layout, dimension, index, pointer, stride, count);
  });
}

function openUniforms(
  source: Source,
  request: OpenRequest,
  kernels: Kernels,
): { key: Key; uniforms: PointStream & Partial<Seekable> } {
  checkOpening(source, request);
  const { dimension, n, key } = request;
  if (key === null) throw new TypeError(`source "${source.id}" cannot be opened without a key`);
  const uniforms = philox4x32.open({ dimension, n, randomisations: [], key: key.derive("jitter") }, kernels);
  return { key, uniforms };
}

/** A stream that turns the points of `uniforms` into its own by a pass in place. */
function overUniforms(
  source: Source,
  uniforms: PointStream & Partial<Seekable>,
  n: number,
  pass: (index: number, pointer: number, stride: number, count: number) => void,
): PointStream & Seekable {
  let index = 0;
  return {
    dimension: uniforms.dimension,
    seek(to) {
      if (!(Number.isInteger(to) && to >= 0 && to < n)) {
        throw new RangeError(
          `index: expected a point from 0 to ${n - 1} of source "${source.id}", found ${to}`,
        );
      }
      uniforms.seek?.(to);
      index = to;
    },
    fill(pointer, stride, count) {
      if (index + count > n) {
        throw new RangeError(`source "${source.id}" was opened for ${n} points and has no point ${n}`);
      }
      uniforms.fill(pointer, stride, count);
      pass(index, pointer, stride, count);
      index += count;
    },
  };
}
