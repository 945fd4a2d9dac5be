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
  readonly P4: string;
  readonly P6: string;
  readonly zaremba_rho: number;
  readonly zaremba_vector: number[];
}

export interface DiscrepancyReference {
  readonly n: number;
  readonly d: number;
  /** Squares to 25 digits from exact rational arithmetic, and their roots. */
  readonly centered_L2_squared: string;
  readonly centered_L2: string;
  readonly wraparound_L2_squared: string;
  readonly wraparound_L2: string;
  readonly mixture_L2_squared: string;
  readonly mixture_L2: string;
  readonly L2_star_squared_warnock: string;
  readonly L2_star_warnock: string;
  readonly modified_L2_star_squared_hickernell: string;
  readonly modified_L2_star_hickernell: string;
  /** As SciPy gives them: squares, of star L2 the root. */
  readonly scipy_CD: number;
  readonly scipy_WD: number;
  readonly scipy_MD: number;
  readonly "scipy_L2-star": number;
  /** Exact, for sets small enough. */
  readonly star_discrepancy?: string;
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
    /** Keys like "27,32", then m. */
    readonly t_values_2d_projections: Record<string, Record<string, number>>;
  };
  readonly niederreiter_base2_gsl: { readonly numerators_2_32: string[][] };
  readonly faure: Record<string, { readonly base: number; readonly first27_fractions: string[][] }>;
  readonly halton: {
    readonly primes: number[];
    readonly first16_fractions: string[][];
    readonly at_n: Record<string, string[]>;
  };
  readonly rank1_lattices: {
    readonly lattices: LatticeReference[];
    readonly fibonacci_rho_check: Record<string, number>;
  };
  readonly discrepancy: {
    readonly sets: Record<string, DiscrepancyReference>;
    readonly one_dimensional: Record<string, { star: string; extreme: string }>;
  };
  readonly cbc: CbcReference[];
}

export const reference = JSON.parse(
  readFileSync(new URL("data/qmc.json", import.meta.url), "utf8"),
) as QmcReference;
