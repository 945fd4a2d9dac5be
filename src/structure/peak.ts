/**
 * Smooth peaks that stand between the planes of a source's lattice, where it puts no point.
 *
 * - A Gaussian of width 0.3 of the distance between planes, half-way between two of them near the middle of the cube:
 *   its integral is a product of normal probabilities, and the error over all starts is the sum of its Fourier
 *   coefficients at dual vectors (Poisson's formula), relative to the integral
 *   sum over h of w(h) cos 2 pi (phase(h) - h.c) exp(-2 pi^2 s^2 |h|^2).
 * - Where the planes are so close that no run of usual length would hit a peak of that width, a ridge between every two
 *   neighbouring planes instead: Gaussians of width 0.2 in h.u, repeated with period 1. Its integral is 0.2 sqrt(2 pi),
 *   and its value the same at every tuple of the source.
 */
import { KernelLattice } from "../numeric/kernel-lattice.js";
import { ReducedBasis } from "../numeric/lattice-reduction.js";
import { vectorsWithin } from "../numeric/vectors-within.js";
import { sparse, type Probe } from "./probe.js";

export interface Peak {
  readonly kind: "peak";
  readonly centre: readonly number[];
  readonly width: number;
  /** Expected error over random starts, relative to the integral. */
  readonly relativeError: number;
  /** Variance of one point over the square of the integral, about. */
  readonly relativeVariance: number;
}

export interface Ridges {
  readonly kind: "ridges";
  /** Of one ridge, in units of the distance between planes. */
  readonly width: number;
  /** Error of every estimate, relative to the integral. */
  readonly relativeError: number;
}

const PEAK_WIDTH = 0.3;
const RIDGE_WIDTH = 0.2;
const WIDEST = 0.1;
/** Widths between a peak and the faces of the cube, which then hold all but 3e-5 of it. */
const MARGIN = 4;
/** A run of 2^20 points then knows the integral to 3 %. */
const MOST_VARIANCE = 1200;
/** Dual vectors looked at for the expected error. */
const MOST_VECTORS = 20_000;

/** Places that are tried: short dual vectors beside the first one favour some. */
const PLACES = 64;
/** How far from the middle of the cube they reach in each coordinate. */
const REACH = 0.15;

export function peakOf(probe: Probe): Peak | Ridges {
  const width = Math.min(PEAK_WIDTH * probe.gap, WIDEST);
  const relativeVariance = (2 * Math.sqrt(Math.PI) * width) ** -probe.dimension;
  const errorAt = relativeVariance > MOST_VARIANCE ? null : aliasing(probe, width);
  if (errorAt === null) return ridges();
  let best: Peak | null = null;
  for (let k = 0; k < PLACES; k++) {
    const centre = between(probe, k);
    if (Math.min(...centre.map((c) => Math.min(c, 1 - c))) < MARGIN * width) continue;
    const relativeError = errorAt(centre);
    if (best !== null && relativeError >= best.relativeError) continue;
    best = { kind: "peak", centre, width, relativeError, relativeVariance };
  }
  return best ?? ridges();
}

/** The k-th of points about the middle of the cube that are half-way between two planes. */
function between({ vector, phase, squaredLength }: Probe, k: number): number[] {
  // multiples of the golden ratio spread evenly (Kronecker's theorem)
  const spread = vector.map((_, j) => (k * (j + 1) * 0.6180339887498949) % 1);
  const place = spread.map((s) => 0.5 + (k === 0 ? 0 : REACH * (2 * s - 1)));
  const off = vector.reduce((sum, entry, j) => sum + entry * (place[j] ?? 0), 0) - phase - 0.5;
  const along = Math.round(off) - off;
  return vector.map((entry, j) => (place[j] ?? 0) + (along * entry) / squaredLength);
}

function ridges(): Ridges {
  let value = 0;
  for (let k = -3; k <= 3; k++) value += Math.exp(-((0.5 - k) ** 2) / (2 * RIDGE_WIDTH ** 2));
  const integral = RIDGE_WIDTH * Math.sqrt(2 * Math.PI);
  return { kind: "ridges", width: RIDGE_WIDTH, relativeError: value / integral - 1 };
}

/** The sum over all dual vectors that matter, as a function of the centre; null where they are too many. */
function aliasing({ set, dimension }: Probe, width: number): ((centre: readonly number[]) => number) | null {
  const lattice = new KernelLattice(set.modulus, set.tuples.residues);
  const basis = new ReducedBasis();
  for (let j = 0; j < dimension; j++) basis.append(lattice.append(set.tuples.vector(j)));
  const decay = 2 * Math.PI ** 2 * width ** 2;
  // beyond, coefficients are below 1e-6 of the integral
  const vectors = vectorsWithin(basis, Math.log(1e6) / decay, MOST_VECTORS);
  if (vectors === null) return null;
  const terms = vectors.map((h) => {
    const { size, phase } = set.weight(sparse(h));
    const squared = h.reduce((total, entry) => total + entry * entry, 0);
    return { h, phase, size: 2 * size * Math.exp(-decay * squared) };
  });
  // the origin that the source never takes would have added nothing to a peak in the middle
  const share = set.states === null ? 1 : set.states / (set.states - 1);
  return (centre) => {
    let sum = 0;
    for (const { h, phase, size } of terms) {
      const at = h.reduce((total, entry, j) => total + entry * (centre[j] ?? 0), 0);
      sum += size * Math.cos(2 * Math.PI * (phase - at));
    }
    return (1 + sum) * share - 1;
  };
}
