/** What the structure of a source predicts for one integrand, and how that compares with what was measured. */
import type { ResolutionLadder } from "./resolution.js";
import type { FullCycleAverage } from "./types.js";

/** A number with the interval that belongs to it. */
export interface Estimated {
  readonly value: number;
  readonly interval: readonly [number, number];
}

/** The point set whose dual vectors carry a bias (of an unrandomised lattice or net: the error of its n points). */
export interface ExplainedStructure {
  /** Of a congruential or recursive generator: the full modulus or the seed-averaged one; a rank-1 lattice; a digital net. */
  readonly kind: "full" | "seed-averaged" | "rank-1" | "net";
  /** Of the dual lattice, decimal digits; of a net its number of points. */
  readonly modulus: string;
  /** Which points these are, in words. */
  readonly what: string;
}

/**
 * A dual vector, with all its copies along the coordinates: h.u takes few values on the points, so they lie on few planes. Of a
 * net: the index k of a Walsh function that is 1 on all points.
 */
export interface Alias {
  /** The base of the Walsh function; null for the plane wave of a lattice. */
  readonly walsh: number | null;
  /** Coordinates (0-based) of the entries, for the copy that contributes most. */
  readonly indices: readonly number[];
  readonly entries: readonly number[];
  /** Copies of the vector along the coordinates that are counted here; 1 where there is no other. */
  readonly copies: number;
  /** Size of the mean of e^(2 pi i h.u) over the points (1: all points lie on the planes), and its phase in turns. */
  readonly size: number;
  readonly phase: number;
  /** Planes h.u = phase + whole number that meet the unit cube; null for a Walsh function. */
  readonly planes: number | null;
  /** Distance of neighbouring planes, 1/|h|; null for a Walsh function. */
  readonly gap: number | null;
  /** What these vectors and their opposites add to the bias, with its standard error; null where it was not estimated. */
  readonly contribution: number | null;
  readonly standardError: number | null;
}

/** The sum of Fourier coefficients at the dual vectors, estimated from points of a sound source. */
export interface PredictedBias extends Estimated {
  readonly standardError: number;
  readonly confidence: number;
  /** Pairs of dual vectors h, -h (of a net: Walsh functions) that were summed. */
  readonly pairs: number;
  /** The same with twice as many pairs, and what the second half adds. */
  readonly doubled: Estimated & { readonly pairs: number };
  readonly tail: Estimated;
  /** Whether the second half adds nothing that matters. */
  readonly stable: boolean;
  /** What the state that the source never takes (the origin) adds; included in the value. */
  readonly origin: number;
  /** Where the coefficients come from. */
  readonly source: string;
  readonly points: number;
  readonly replicates: number;
}

/** The bias that was measured, or the one error of a source without random start. */
export interface MeasuredBias extends Estimated {
  /** null for a deterministic source: one error without an error bar. */
  readonly standardError: number | null;
  readonly n: number;
  readonly replicates: number;
}

/**
 * For the vector at fault, h.u - phase modulo 1 in equal bins, of which number bins / 2 has 0 (the planes) in its middle.
 */
export interface PlaneComb {
  readonly points: number;
  /** How many points of the source, and of a sound one, lie in each bin. */
  readonly source: readonly number[];
  readonly sound: readonly number[];
  readonly soundSource: string;
  /** Mean of the integrand over each bin. */
  readonly profile: readonly number[];
}

export interface Explanation {
  readonly problem: string;
  readonly source: string;
  readonly estimator: string;
  readonly output: string;
  /** null where the source has no structure that a prediction follows from. */
  readonly structure: ExplainedStructure | null;
  /** Why there is no prediction, in words; null where there is one. */
  readonly reason: string | null;
  readonly predicted: PredictedBias | null;
  readonly measured: MeasuredBias | null;
  /** Measured less predicted. */
  readonly difference: Estimated | null;
  /** The difference is 0 within its interval, the prediction is not, and it is stable. */
  readonly explained: boolean;
  /** The vector at fault first; without a prediction the shortest ones. */
  readonly aliases: readonly Alias[];
  readonly comb: PlaneComb | null;
  /** The average over every state, where it was asked for. */
  readonly fullCycle: FullCycleAverage | null;
  /** What the bits of a coordinate cost, the source's own among others; null where it was not asked for. */
  readonly resolution: ResolutionLadder | null;
}
