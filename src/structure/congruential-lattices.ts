/**
 * Which lattice the tuples of a congruential generator fill. Beside that of the full modulus there are, for
 * x <- a x mod 2^e from odd states, others:
 *
 * - `knuth`: modulus 2^(e-2) for a mod 8 = 3 or 5, as table 1 of Knuth, The Art of Computer Programming, vol. 2, 3.3.4 has it.
 * - `orbit`: what one run fills. If 2^j is the largest power of two in a - 1, j >= 2, the powers of a are all of 1 + 2^j Z, and
 *   the run all states that agree with the first modulo 2^j: one shifted lattice of modulus 2^(e-j) (2^(e-2) for a mod 8 = 5).
 *   If a mod 4 = 3, the even powers of a are 1 + 2^j Z with 2^j the largest power of two in a^2 - 1: two shifted lattices of
 *   modulus 2^(e-j) (2^(e-3) for a mod 8 = 3, RANDU among them).
 * - `seed-averaged`: all odd states together, as random seeds take them: one shifted lattice of modulus 2^(e-1). Biases
 *   over random seeds come from this one.
 *
 * Every other congruential generator is described by the full modulus alone; where the run is only a part of it and no
 * lattice, `orbit` says so.
 */
import { isPrime, powerMod } from "../numeric/factor.js";
import type { LinearRecurrence } from "../sources/linear.js";

export type LatticeKind = "full" | "knuth" | "orbit" | "seed-averaged";

export interface TupleLattice {
  readonly kind: LatticeKind;
  readonly modulus: bigint;
  /** How many shifted copies of the lattice the tuples fill. */
  readonly copies: number;
  /** In words, for tables and notes. */
  readonly what: string;
}

/** The lattices of tuples of every `stride`-th output, the full modulus first; others only where they differ from it. */
export function congruentialLattices(recurrence: LinearRecurrence, stride: number): TupleLattice[] {
  const { multipliers, increment, modulus } = recurrence;
  const full = (what: string): TupleLattice => ({ kind: "full", modulus, copies: 1, what });
  const [a = 0n] = multipliers;
  if (increment !== 0n) return [full("all states, one shifted lattice")];
  if (isPrime(modulus)) return [full("all states and 0")];
  const exponent = modulus.toString(2).length - 1;
  if (modulus !== 1n << BigInt(exponent) || a % 2n === 0n || exponent < 4) return [full("all residues")];
  const lattices = [full("all residues, even ones too, which the generator never takes")];
  const power = powerMod(a, BigInt(stride), modulus);
  const residue = power % 8n;
  if (residue === 3n || residue === 5n) {
    const what = "modulus m / 4 as in Knuth's table";
    lattices.push({ kind: "knuth", modulus: modulus / 4n, copies: 1, what });
  }
  const one = power % 4n === 1n;
  const j = twos((one ? power : power * power) - 1n, exponent);
  if (j < exponent - 1) {
    const orbit = modulus >> BigInt(j);
    const agreeing = `states that agree modulo ${1n << BigInt(j)}`;
    lattices.push(
      one
        ? { kind: "orbit", modulus: orbit, copies: 1, what: `one run: ${agreeing}, one shifted lattice` }
        : {
            kind: "orbit",
            modulus: orbit,
            copies: 2,
            what: `one run: two classes of ${agreeing}, two shifted lattices`,
          },
    );
  }
  const what = "all odd states, one shifted lattice";
  lattices.push({ kind: "seed-averaged", modulus: modulus / 2n, copies: 1, what });
  return lattices;
}

/** The exponent of 2 in n, at most `most`. */
function twos(n: bigint, most: number): number {
  let count = 0;
  for (let rest = n; count < most && rest % 2n === 0n; rest /= 2n) count++;
  return count;
}
