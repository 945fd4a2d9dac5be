/**
 * Reference values for quasi-random sources, data/qmc.json: computed with SciPy 1.10.1 and 1.17.1, GSL 2.7.1, mpmath
 * 1.2.1 and exact rational arithmetic; each entry of the file says how. Whole numbers that may pass 2^53 are strings.
 */
import { readFileSync } from "node:fs";

interface PointNumbers {
  readonly gray: string[];
  readonly natural: string[];
}

export interface CbcReference {
  readonly n: number;
  readonly d: number;
  readonly gamma: "1" | "1/j^2";
  readonly z: number[];
  readonly P2_weighted_per_dimension: string[];
}

interface LatticeReference {
  readonly id: string;
  readonly n: number;
  readonly z: number[];
  readonly d: number;
  readonly P2: string;
  readonly P2_weights_1_over_j2: string;
  /** Shortest dual vector, squared, and the one of least sum of absolute values. */
  readonly nu2: number;
  readonly shortest_dual_vector: number[];
  readonly l1_min: number;
  readonly l1_vector: number[];
}

interface QmcReference {
  readonly sobol: {
    readonly first16_gray_numerators_2_32_dims1_10: string[][];
    readonly first16_natural_numerators_2_32_dims1_10: string[][];
    readonly at_n_dims1_10: Record<string, PointNumbers>;
    readonly selected_high_dims: Record<
      string,
      { numerators_gray: string[]; at_n: Record<string, { gray: string; natural: string }> }
    >;
    readonly direction_integers_v_k_32bit: Record<string, string[]>;
    /** Keys like "dims1..3", then m: the least t of the first 2^m points. */
    readonly "t_values_first_2^m_points": Record<string, Record<string, number>>;
  };
  readonly niederreiter_base2_gsl: { readonly numerators_2_32: string[][] };
  readonly faure: Record<string, { readonly base: number; readonly first27_fractions: string[][] }>;
  readonly halton: {
    readonly primes: number[];
    readonly first16_fractions: string[][];
    readonly at_n: Record<string, string[]>;
  };
  readonly rank1_lattices: { readonly lattices: LatticeReference[] };
  readonly cbc: CbcReference[];
}

export const reference = JSON.parse(
  readFileSync(new URL("data/qmc.json", import.meta.url), "utf8"),
) as QmcReference;
