/** What the lines of a budget need beside a study's estimates, measured once per problem, as plain data. */
import type { ResolutionCost } from "./resolution.js";

/** A mean of paired differences. */
export interface PairedMean {
  readonly points: number;
  readonly bias: number;
  readonly standardError: number;
  /** Points where the two differ. */
  readonly changed: number;
}

/** Inverse distribution functions of the inputs against more exact ones, carried through the integrand. */
export interface TransformMeasurement extends PairedMean {
  /** By which the error of each input was multiplied before f was taken, and the difference divided afterwards. */
  readonly amplification: number;
}

export interface ArithmeticMeasurement {
  /** The compiled formula against the same one in `digits` decimal digits; null where it has functions that are listed. */
  readonly formula: (PairedMean & { readonly digits: number }) | null;
  readonly missing: readonly string[];
  /** A condition at inputs moved by `amplification` units in the last place; null where f is no condition. */
  readonly flips: (PairedMean & { readonly amplification: number }) | null;
  /** The tree of plain sums less a compensated sum of the same values, divided by the number of points. */
  readonly summation: { readonly points: number; readonly difference: number };
}

/** The largest values of |f| among so many points. */
export interface TailMeasurement {
  readonly points: number;
  /** Values used by the estimate of the tail index. */
  readonly order: number;
  /** Hill's estimate; null where the largest values are equal, or none. */
  readonly index: number | null;
  /** The same from a quarter of them; well above `index` where the tail ends. */
  readonly further: number | null;
  /** True where f had one value at all points. */
  readonly constant: boolean;
}

export interface ProblemMeasurements {
  readonly problem: string;
  /** One per number of output bits below 52, with the sources (ids) that have them. */
  readonly resolution: readonly { readonly sources: readonly string[]; readonly cost: ResolutionCost }[];
  /** null where all inputs are uniform. */
  readonly transform: TransformMeasurement | null;
  /** null where values were not finite. */
  readonly arithmetic: ArithmeticMeasurement | null;
  readonly tail: TailMeasurement | null;
}
