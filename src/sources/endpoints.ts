/**
 * Coordinates that may be exactly 0 or 1: with `endpoint: left`, with `float32: true` (each coordinate rounded to single
 * precision, IEEE 754 binary32, ties to even, as code does that keeps its uniforms in a float), and with draws from
 * outside. They are exempt from the law 0 < u < 1 and there to show what they cost, so each endpoint that is hit is counted.
 */
import type { Kernels } from "../kernels/instance.js";
import type { EndpointCounter, PointStream } from "./contract.js";

/** The same stream, its coordinates rounded to single precision where asked, its zeros and ones counted. */
export function withEndpoints<S extends PointStream>(
  stream: S,
  float32: boolean,
  kernels: Kernels,
): S & EndpointCounter {
  const fill = stream.fill.bind(stream);
  const { dimension } = stream;
  let hits = 0;
  return Object.assign(stream, {
    fill: (pointer: number, stride: number, count: number): void => {
      fill(pointer, stride, count);
      const rows = kernels.f64(pointer, stride * (dimension - 1) + count);
      for (let j = 0; j < dimension; j++) {
        for (let i = j * stride, end = i + count; i < end; i++) {
          const u = float32 ? Math.fround(rows[i] ?? NaN) : (rows[i] ?? NaN);
          rows[i] = u;
          if (u === 0 || u === 1) hits++;
        }
      }
    },
    endpointsHit: () => hits,
  });
}
