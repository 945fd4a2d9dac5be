/**
 * The exact period of a linear recurrence and why it is what it is: the conditions of Hull and Dobell one by one, the
 * primitive-root test, the order from the factorisation (T. E. Hull and A. R. Dobell, SIAM Review 4 (1962) 230-254; Knuth, The
 * Art of Computer Programming, vol. 2, 3.2.1.2 and 3.2.2), the periods of the low bits, and the cycle from one given state.
 */
import type { Affine } from "../numeric/affine.js";
import {
  congruentialCycle,
  congruentialPeriod,
  hullDobell,
  type Cycle,
} from "../numeric/congruential-period.js";
import { coprime, factorise, isPrime, powerMod, UnfinishedFactorisation } from "../numeric/factor.js";

export interface Reason {
  readonly condition: string;
  readonly holds: boolean;
}

export interface PeriodReport {
  /** What all valid states share; null where they do not, or where it was not found. */
  readonly period: bigint | null;
  /** Which states it holds for. */
  readonly states: string;
  readonly reasons: readonly Reason[];
  /** The cycle from one state, where states differ or one was asked for. */
  readonly from: (Cycle & { readonly state: bigint }) | null;
  /** Period of x mod 2^k, k = 1 ... e, for a modulus 2^e; null for others. */
  readonly lowBits: readonly bigint[] | null;
  /** Why a period is missing; null where none is. */
  readonly missing: string | null;
}

/** Steps of the rho method: a few seconds of work, enough for a second largest prime factor up to about 2^44. */
export const FACTOR_STEPS = 2 ** 23;

/** `state` is a state that the cycle is wanted from; null for none in particular. */
export function periodOf(map: Affine, state: bigint | null, steps = FACTOR_STEPS): PeriodReport {
  const { increment, modulus } = map;
  const exponent = modulus.toString(2).length - 1;
  const binary = modulus === 1n << BigInt(exponent);
  const lowBits = binary ? lowBitPeriods(map, exponent) : null;
  try {
    const reasons =
      increment === 0n ? multiplicativeReasons(map, exponent, steps) : affineReasons(map, steps);
    const period = congruentialPeriod(map, steps);
    const start = state ?? (period === null ? (increment === 0n ? 1n : 0n) : null);
    const from = start === null ? null : { ...congruentialCycle(map, start, steps), state: start };
    return {
      period,
      states: statesOf(map, period),
      reasons,
      from,
      lowBits,
      missing: missingWhy(map, period),
    };
  } catch (error) {
    if (!(error instanceof UnfinishedFactorisation)) throw error;
    const missing = `not found: ${error.message}; lattice and low bits do not need it`;
    return { period: null, states: "", reasons: [], from: null, lowBits, missing };
  }
}

function statesOf({ increment, modulus }: Affine, period: bigint | null): string {
  if (period === null) return "";
  if (increment !== 0n) return "every state";
  return isPrime(modulus) ? "every state but 0" : "every state coprime to the modulus";
}

function missingWhy({ increment }: Affine, period: bigint | null): string | null {
  if (period !== null) return null;
  return increment === 0n
    ? "the multiplier has a factor in common with the modulus: states fall into shorter and shorter cycles"
    : "the conditions for the full period do not all hold: cycles differ from state to state";
}

function affineReasons(map: Affine, steps: number): Reason[] {
  const { incrementCoprime, primesDivide, fourDivides } = hullDobell(map, steps);
  return [
    { condition: "the increment is coprime to the modulus", holds: incrementCoprime },
    { condition: "every prime of the modulus divides a - 1", holds: primesDivide },
    { condition: "4 divides a - 1 if it divides the modulus", holds: fourDivides },
  ];
}

function multiplicativeReasons({ multiplier, modulus }: Affine, exponent: number, steps: number): Reason[] {
  if (!coprime(multiplier, modulus)) return [{ condition: "a is coprime to the modulus", holds: false }];
  if (isPrime(modulus)) {
    const primes = [...factorise(modulus - 1n, steps).keys()];
    return [
      { condition: "the modulus is prime: the longest period is m - 1", holds: true },
      ...primes.map((q) => ({
        condition: `a^((m - 1)/${q}) is not 1 modulo m (${q} is a prime factor of m - 1)`,
        holds: powerMod(multiplier, (modulus - 1n) / q, modulus) !== 1n,
      })),
    ];
  }
  if (modulus === 1n << BigInt(exponent) && exponent >= 3) {
    const residue = multiplier % 8n;
    return [
      {
        condition: `a mod 8 is 3 or 5 (it is ${residue}): the longest period, m / 4, is reached`,
        holds: residue === 3n || residue === 5n,
      },
    ];
  }
  const factors = [...factorise(modulus, steps)]
    .map(([p, k]) => (k === 1 ? `${p}` : `${p}^${k}`))
    .join(" × ");
  return [{ condition: `the period is the order of a modulo ${factors}`, holds: true }];
}

/** From an odd state where there is no increment. */
function lowBitPeriods({ multiplier, increment }: Affine, exponent: number): bigint[] {
  const start = increment === 0n ? 1n : 0n;
  return Array.from({ length: exponent }, (_, k) => {
    const modulus = 1n << BigInt(k + 1);
    const map = { multiplier: multiplier % modulus, increment: increment % modulus, modulus };
    return congruentialCycle(map, start % modulus).period;
  });
}

export interface Usage {
  /** Outputs that one run takes. */
  readonly draws: bigint;
  /** Of the period. */
  readonly share: number;
  /** Chance that any two of the runs have outputs in common; null for a single run. */
  readonly overlap: number | null;
}

/**
 * Runs of `draws` outputs that start independently and uniformly on a cycle: they are disjoint with probability
 * (1 - R L / rho)^(R - 1), for large rho (P. L'Ecuyer, D. Munger, B. Oreshkin and R. Simard, "Random numbers for parallel
 * computers", Mathematics and Computers in Simulation 135 (2017) 3-17, section 4), so they overlap with about R^2 L / rho.
 */
export function usageOf(period: bigint, draws: bigint, streams: number): Usage {
  const share = quotient(draws, period);
  const used = share * streams;
  const overlap = streams < 2 ? null : used >= 1 ? 1 : -Math.expm1((streams - 1) * Math.log1p(-used));
  return { draws, share, overlap };
}

/** a / b as a double, however long they are (0 below 1e-308). */
function quotient(a: bigint, b: bigint): number {
  const shift = BigInt(Math.max(0, b.toString(2).length - 1000));
  return shift === 0n ? Number(a) / Number(b) : Number(a) / Number(b >> shift) / 2 ** Number(shift);
}
