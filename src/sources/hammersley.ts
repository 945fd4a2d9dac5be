/**
 * Hammersley's points (J. M. Hammersley, "Monte Carlo methods for solving multivariable problems", Annals of the New York
 * Academy of Sciences 86, 1960, 844-874): i/n and the radical inverses of i in the first primes, for one n, the origin kept.
 * Randomised by `permuted`: the digits of the radical inverses as in `halton`, the first coordinate shifted modulo 1.
 *
 * Good for: few coordinates and a size fixed beforehand, one coordinate better than Halton's sequence. Bad for: high
 * coordinates, as Halton's sequence.
 */
import { firstPrimes } from "../numeric/primes.js";
import type { Kernels } from "../kernels/instance.js";
import type { OpenRequest, PointStream, RadicalInverse, Seekable } from "./contract.js";
import { halton } from "./halton.js";
import { checkOpening } from "./quasi-random.js";
import { openRotation } from "./rotation.js";

export const hammersley: RadicalInverse = {
  ...halton,
  id: "hammersley",
  title: "Hammersley points",
  citation:
    "J. M. Hammersley, Monte Carlo methods for solving multivariable problems, Annals of the New York Academy of Sciences 86 (1960) 844-874",
  largestDimension: halton.largestDimension + 1,
  nesting: "per-size",
  bases: (dimension) => [null, ...firstPrimes(dimension - 1)],
  open: openHammersley,
};

function openHammersley(request: OpenRequest, kernels: Kernels): PointStream & Seekable {
  checkOpening(hammersley, request);
  const { dimension, n } = request;
  const reciprocal = ((1n << 128n) + BigInt(n) - 1n) / BigInt(n);
  const first = openRotation(hammersley, () => [reciprocal], { ...request, dimension: 1 }, kernels);
  const others = dimension === 1 ? null : halton.open({ ...request, dimension: dimension - 1 }, kernels);
  return {
    dimension,
    seek(to) {
      first.seek(to);
      others?.seek?.(to);
    },
    fill(pointer, stride, count) {
      first.fill(pointer, stride, count);
      others?.fill(pointer + stride * 8, stride, count);
    },
  };
}
