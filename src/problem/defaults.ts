/**
 * What holds where a problem file, its suite and the command line say nothing, and the bounds of what a file may ask
 * for. One table each; the documentation and the messages are made from them.
 */
import type { SourceSpec } from "./contract.js";

/** Settings of a study with nothing left open. */
export interface FullSettings {
  readonly sources: readonly SourceSpec[];
  /** Points per replicate, ascending. */
  readonly sizes: readonly number[];
  readonly replicates: number;
  readonly estimators: readonly string[];
  /** Probability of any false finding of bias in the study. */
  readonly falseAlarms: number;
  readonly seed: number;
}

/**
 * Sources: one sound generator of each of three families that share no arithmetic (counter-based, multiplicative with
 * permuted output, linear over GF(2)), and the two quasi-random methods with randomisations that make a mean unbiased.
 * Sizes double from 256 to 65,536: enough for a slope, seconds of work in ten dimensions. 32 replicates give a
 * standard error of the error bar of 13 % (common practice, no single source).
 */
export const DEFAULT_SETTINGS: FullSettings = {
  sources: ["philox4x32", "pcg64", "mt19937", "sobol+owen", "lattice+shift"],
  sizes: [256, 512, 1024, 2048, 4096, 8192, 16384, 32768, 65536],
  replicates: 32,
  estimators: ["crude"],
  falseAlarms: 0.01,
  seed: 20260401,
};

/** As a problem file would write the default sizes. */
export const DEFAULT_SIZES_TEXT = "2^8..2^16";

export const DEFAULT_CONFIDENCE = 0.99;

/** Bounds that keep a study's memory and time finite; each is named in the message of what exceeds it. */
export const LIMITS = {
  /** Coordinates of a problem: above the largest source of the registry. */
  dimension: 65_536,
  /** Numbers in a constant. */
  elements: 65_536,
  /** Points per replicate: 2^40, about a day at 10^7 points a second. */
  points: 2 ** 40,
  /** Different sizes in a study. */
  sizes: 64,
  replicates: 100_000,
} as const;

/** Estimators that a study may name. */
export const ESTIMATORS: readonly string[] = ["crude"];
