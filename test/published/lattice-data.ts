/**
 * Reference values for lattices of tuples, data/dual-lattices.json, dual-lattices-lagged.json, lattice-planes.json and
 * period-reasons.json: computed with fplll 5.4.4, PARI/GP 2.15.2 and mpmath 1.2.1, and by running small generators. Vectors
 * are texts of numbers with blanks between, whole numbers texts.
 */
import { readFileSync } from "node:fs";

/** One dimension: what is known of its dual lattice. */
export interface DualReference {
  readonly nu2: string;
  readonly vector: string;
  /** Shortest vectors up to their sign. */
  readonly count?: number;
  readonly l1?: string;
  readonly l1Vector?: string;
  readonly l1Count?: number;
  /** Hyperplanes that meet the half-open cube, and the open one. */
  readonly planes?: string;
  readonly planesOpen?: string;
  readonly marsaglia?: string;
  readonly nu?: string;
  readonly gap?: string;
  readonly mu?: string;
  readonly S?: string;
  readonly SDensest?: string;
}

type Dimensions = Readonly<Record<string, DualReference>>;

interface DualLattices {
  readonly lcgs: readonly {
    readonly id: string;
    readonly a: string;
    readonly c: string;
    readonly m: string;
    readonly dims: Dimensions;
    /** The same for the modulus m / 4. */
    readonly quarter?: { readonly m: string; readonly dims: Dimensions };
  }[];
  readonly recursive: readonly {
    readonly id: string;
    readonly m: string;
    readonly coefficients: readonly string[];
    readonly dims: Dimensions;
  }[];
}

interface Lagged {
  readonly rows: readonly {
    readonly generator: string;
    readonly m: string;
    readonly leap?: string;
    readonly multiplier?: string;
    readonly lags?: readonly number[];
    readonly multipliers?: readonly string[];
    readonly dims: Dimensions;
  }[];
}

interface Planes {
  readonly allPoints: readonly {
    readonly id: string;
    readonly t: number;
    readonly planes_half_open_cube: string;
  }[];
  readonly orbits: readonly {
    readonly id: string;
    readonly t: number;
    readonly l1: number;
    readonly planes_hit_by_overlapping_tuples_of_one_full_period: number;
    readonly common_residue_h_dot_x_mod_m: readonly number[];
  }[];
  readonly knuthTable1: readonly { readonly id: string; readonly from_memory: readonly string[] }[];
  readonly published: readonly {
    readonly claim: string;
    readonly value_from_memory: number | readonly string[];
  }[];
}

interface Periods {
  readonly rows: readonly {
    readonly id: string;
    readonly a: string;
    readonly c: string;
    readonly m: string;
    readonly m_factors: readonly (readonly [string, number])[];
    readonly hull_dobell: {
      readonly c_coprime_m: boolean;
      readonly a_minus_1_divisible_by_every_prime_of_m: boolean;
      readonly a_minus_1_divisible_by_4_if_m_is: boolean;
      readonly full_period_m: boolean;
    };
    readonly order_of_a?: string;
    readonly period?: string;
    readonly preperiod_from_seed_0?: number;
    readonly primitive_root?: boolean;
    readonly primitive_root_check?: readonly (readonly [string, string])[];
    readonly period_of_low_k_bits_k_1_to_e?: readonly (string | null)[];
  }[];
}

function read<T>(name: string): T {
  const data: unknown = JSON.parse(readFileSync(new URL(`./data/${name}`, import.meta.url), "utf8"));
  return data as T;
}

export const dualLattices = read<DualLattices>("dual-lattices.json");
export const lagged = read<Lagged>("dual-lattices-lagged.json");
export const planes = read<Planes>("lattice-planes.json");
export const periods = read<Periods>("period-reasons.json");
