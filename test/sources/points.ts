/** Points of a source as plain numbers, for tests. */
import { instantiateKernels } from "../../src/kernels/instance.js";
import type { Randomisation, Source } from "../../src/sources/contract.js";
import { Key } from "../../src/sources/key.js";

export interface PointsRequest {
  readonly dimension: number;
  readonly count: number;
  readonly first?: number;
  readonly n?: number;
  readonly randomisations?: readonly Randomisation[];
  readonly key?: string;
  /** Points per call of `fill`; all of them at once by default. */
  readonly block?: number;
}

/** points[i][j]: coordinate j of the i-th point asked for. */
export function pointsOf(source: Source, request: PointsRequest): number[][] {
  const { dimension, count, first = 0, randomisations = [], key, block = count } = request;
  const kernels = instantiateKernels();
  const stream = source.open(
    {
      dimension,
      n: request.n ?? first + count,
      randomisations,
      key: key === undefined ? null : new Key(key),
    },
    kernels,
  );
  if (first > 0) {
    if (stream.seek === undefined) throw new Error(`${source.id} cannot seek`);
    stream.seek(first);
  }
  const stride = Math.ceil(block / 8) * 8;
  const pointer = kernels.arena.allocate(stride * dimension * 8);
  const points: number[][] = [];
  for (let done = 0; done < count; done += block) {
    const size = Math.min(block, count - done);
    stream.fill(pointer, stride, size);
    const rows = kernels.f64(pointer, stride * dimension);
    for (let i = 0; i < size; i++) {
      points.push(Array.from({ length: dimension }, (_, j) => rows[j * stride + i] ?? NaN));
    }
  }
  return points;
}

/** The 52 digits of a coordinate (k + 1/2) / 2^52, as the whole number k. */
export function digitsOf(u: number): bigint {
  return (BigInt(u * 2 ** 53) - 1n) / 2n;
}
