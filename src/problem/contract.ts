/** A problem as the program holds it after parsing and checking: plain data, JSON-serialisable, no functions. */

import type { DistributionId } from "./distributions/registry.js";
import type { Construction } from "./gaussian/constructions.js";
import type { ProcessId } from "./gaussian/paths.js";
import type { ParameterValues, Pass } from "./distributions/contract.js";

/** How inputs hang together: through correlated normals, or a common factor that has the first coordinate. */
export type Dependence =
  | {
      readonly inputs: readonly string[];
      readonly kind: "cholesky" | "principal-components";
      /** Of the components of all inputs, or of the inputs index by index. */
      readonly correlation: readonly (readonly number[])[];
    }
  | {
      readonly inputs: readonly string[];
      readonly kind: "one-factor";
      /** Share of the factor in the variance of each component. */
      readonly shares: readonly number[];
    };

/** Inputs take their coordinates in order; a scalar has length null and takes one coordinate. */
export interface Input {
  readonly name: string;
  /** A distribution of independent coordinates, or a process whose path the input is. */
  readonly distribution: DistributionId | ProcessId;
  /** How a path is made from its normals; present for processes only. */
  readonly construction?: Construction;
  /** Parameters that the file gives; absent where all have their defaults. */
  readonly parameters?: ParameterValues;
  readonly length: number | null;
  /** Index of its first coordinate, 0-based. */
  readonly first: number;
}

/** A constant: a number, a vector or a matrix (rows). */
export type Constant = number | readonly number[] | readonly (readonly number[])[];

/** What is asked of the integrand (problem/quantity.ts); levels in (0, 1). */
export type Quantity =
  | "mean"
  | "probability"
  | "ratio"
  | "variance"
  | { readonly quantile: number }
  | { readonly shortfall: number };

/** The exact value that estimates are held against. */
export interface Reference {
  readonly value: number;
  /** The value as it was written: digits or a formula of constants. */
  readonly text: string;
  /** Absolute standard uncertainty of the value; 0 where it is exact to double precision. */
  readonly uncertainty: number;
  /** The published source or the derivation. */
  readonly basis: string;
}

export interface Tolerance {
  /** Absolute tolerance on the quantity, > 0; null where it is relative to a value that is not known before the run. */
  readonly absolute: number | null;
  /** Relative tolerance, > 0, or null. */
  readonly relative: number | null;
  /** What `relative` is relative to: the reference, or a named constant. */
  readonly to: string;
  /** In (0.5, 1). */
  readonly confidence: number;
}

export interface InUse {
  readonly source: string;
  readonly points: number;
  readonly secondsPerPoint: number | null;
}

/** A weighted sum of the problems of a suite, with one tolerance on it. */
export interface SuiteTotal {
  /** By problem id; finite, not 0. */
  readonly weights: Readonly<Record<string, number>>;
  /** Absolute, > 0. */
  readonly tolerance: number;
  /** In (0.5, 1). */
  readonly confidence: number;
}

/** A contribution to the error that the user declares: a bound of a bias, or a standard deviation. */
export interface Declared {
  readonly line: string;
  readonly kind: "bias" | "random";
  /** Absolute, >= 0: the bound, or the standard deviation. */
  readonly value: number;
  readonly basis: string;
}

/** The user's own source or a registry id with randomisations; the same form in files and on the command line. */
export type SourceSpec = string | Readonly<Record<string, unknown>>;

/** Settings of a study, all optional here; settings.ts resolves them (flag > problem > suite > default). */
export interface StudySettings {
  readonly sources?: readonly SourceSpec[];
  readonly sizes?: readonly number[];
  readonly replicates?: number;
  readonly estimators?: readonly string[];
  readonly falseAlarms?: number;
  readonly seed?: number;
}

export interface Problem {
  /** The problem's declared name: its file name without extension, unique in a suite. Part of every key. */
  readonly id: string;
  readonly title: string;
  readonly about: string;
  readonly dimension: number;
  readonly inputs: readonly Input[];
  /** Absent where all inputs are independent. */
  readonly dependence?: Dependence;
  readonly constants: Readonly<Record<string, Constant>>;
  /** Source text in the formula language. */
  readonly integrand: string;
  readonly quantity: Quantity;
  readonly reference: Reference | null;
  readonly tolerance: Tolerance;
  /** Absent where nothing is declared. */
  readonly declared?: readonly Declared[];
  readonly inUse: InUse | null;
  readonly study: StudySettings;
}

/** A change of uniform coordinates into inputs, done block by block before the integrand. */
export type Transform = Pass & {
  /** First coordinate, 0-based, and how many follow it. */
  readonly first: number;
  readonly rows: number;
};
