/** The first n points of a source, held in memory, for figures that need them all. */
import { instantiateKernels } from "../kernels/instance.js";
import type { ChoiceRequest, SourceChoice } from "../sources/choice.js";

export interface PointSet {
  readonly n: number;
  readonly dimension: number;
  /** Coordinate j of point i at j * n + i; in [0, 1]. */
  readonly coordinates: Float64Array;
}

const BLOCK = 1024;

/** Throws where the dimension or n is out of the source's range, or a key is missing. */
export function firstPoints(choice: SourceChoice, request: ChoiceRequest): PointSet {
  const { dimension, n } = request;
  const kernels = instantiateKernels();
  const stream = choice.open(request, kernels);
  try {
    const coordinates = new Float64Array(n * dimension);
    const block = kernels.arena.allocate(BLOCK * dimension * 8);
    for (let done = 0; done < n; done += BLOCK) {
      const count = Math.min(BLOCK, n - done);
      stream.fill(block, BLOCK, count);
      for (let j = 0; j < dimension; j++) {
        coordinates.set(kernels.f64(block + j * BLOCK * 8, count), j * n + done);
      }
    }
    return { n, dimension, coordinates };
  } finally {
    stream.close?.();
  }
}

/** Points given one by one. Throws RangeError for none, for points of different lengths, and for coordinates outside [0, 1]. */
export function pointSet(points: readonly (readonly number[])[]): PointSet {
  const n = points.length;
  const dimension = points[0]?.length ?? 0;
  if (dimension === 0) throw new RangeError("points: expected at least one point of at least one coordinate");
  const coordinates = new Float64Array(n * dimension);
  for (const [i, point] of points.entries()) {
    if (point.length !== dimension) {
      throw new RangeError(
        `points[${i + 1}]: expected ${dimension} coordinates as in the first point, found ${point.length}`,
      );
    }
    for (const [j, x] of point.entries()) {
      if (!(x >= 0 && x <= 1))
        throw new RangeError(`points[${i + 1}]: expected coordinates from 0 to 1, found ${x}`);
      coordinates[j * n + i] = x;
    }
  }
  return { n, dimension, coordinates };
}
