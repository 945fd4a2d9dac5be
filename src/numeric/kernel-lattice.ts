/**
 * The lattice {h in Z^t : h_1 v_1 + ... + h_t v_t = 0 mod m} of integer relations between vectors v_1 ... v_t of k residues,
 * built one vector at a time. The dual lattices of congruential generators (v_j = a^(j-1), k = 1), of multiple recursive ones
 * (v_j what output j makes of the k words of state) and of rank-1 lattices (v_j = z_j) are of this form (J. H. Conway and
 * N. J. A. Sloane, Sphere Packings, Lattices and Groups, 3rd ed. (1999), 1.1; P. L'Ecuyer and R. Couture, "An implementation
 * of the lattice and spectral tests for multiple recursive linear random number generators", INFORMS Journal on Computing 9
 * (1997) 206-217).
 *
 * Rows (residues | combination) are kept in Hermite form: k pivot rows, at first (m e_r | 0). A new row (v | e_(t+1)) is
 * taken through the pivots by unimodular steps; what comes out has no residues left, and its combination completes a
 * basis of the relations of t + 1 vectors from a basis of those of t.
 */
import { extendedGcd } from "./factor.js";

type Vector = readonly bigint[];

interface Row {
  readonly residues: bigint[];
  readonly combination: bigint[];
}

export class KernelLattice {
  readonly #modulus: bigint;
  readonly #pivots: Row[];
  #size = 0;
  /** What the basis so far spans: the product of its new coordinates, which is the determinant of the lattice. */
  #determinant = 1n;

  /** Relations modulo `modulus` (at least 1) between vectors of `residues` components. */
  constructor(modulus: bigint, residues: number) {
    this.#modulus = modulus;
    this.#pivots = Array.from({ length: residues }, (_, r) => ({
      residues: Array.from({ length: residues }, (_, s) => (s === r ? modulus : 0n)),
      combination: [],
    }));
  }

  get determinant(): bigint {
    return this.#determinant;
  }

  /** Takes one more vector; gives the basis vector (of one more coordinate, which is above 0) that completes the basis. */
  append(vector: Vector): bigint[] {
    const m = this.#modulus;
    const row: Row = {
      residues: vector.map((v) => mod(v, m)),
      combination: [...Array.from({ length: this.#size }, () => 0n), 1n],
    };
    this.#size++;
    for (const [r, pivot] of this.#pivots.entries()) {
      pivot.combination.push(0n);
      this.#eliminate(pivot, row, r);
    }
    const last = this.#size - 1;
    // every m e_j is a relation, so coordinates before the last are residues; the last one is unique up to its sign
    const coordinate = row.combination[last] ?? 0n;
    const sign = coordinate < 0n ? -1n : 1n;
    this.#determinant *= sign * coordinate;
    return row.combination.map((h, j) => (j === last ? sign * h : centred(sign * h, m)));
  }

  /** Makes residue r of `row` 0 and that of `pivot` their greatest common divisor. */
  #eliminate(pivot: Row, row: Row, r: number): void {
    const [p, q] = [pivot.residues[r] ?? 0n, row.residues[r] ?? 0n];
    if (q === 0n) return;
    const { gcd, x, y } = q % p === 0n ? { gcd: p, x: 1n, y: 0n } : extendedGcd(p, q);
    const [s, t] = [-q / gcd, p / gcd];
    const mix = (left: bigint[], right: bigint[], from: number, to: number): void => {
      for (let j = from; j < to; j++) {
        const [a, b] = [left[j] ?? 0n, right[j] ?? 0n];
        left[j] = x * a + y * b;
        right[j] = s * a + t * b;
      }
    };
    mix(pivot.residues, row.residues, r, pivot.residues.length);
    mix(pivot.combination, row.combination, 0, this.#size);
    // keep numbers below m: a multiple of m in a later residue is a multiple of a later start row (m e_s | 0), which the
    // module holds; in an earlier coordinate of a combination it is a relation
    for (let j = 0; j < this.#size - 1; j++) {
      pivot.combination[j] = mod(pivot.combination[j] ?? 0n, this.#modulus);
      row.combination[j] = mod(row.combination[j] ?? 0n, this.#modulus);
    }
    for (let j = r + 1; j < pivot.residues.length; j++) {
      pivot.residues[j] = mod(pivot.residues[j] ?? 0n, this.#modulus);
      row.residues[j] = mod(row.residues[j] ?? 0n, this.#modulus);
    }
  }
}

function mod(value: bigint, modulus: bigint): bigint {
  const rest = value % modulus;
  return rest < 0n ? rest + modulus : rest;
}

/** The residue nearest to 0. */
function centred(value: bigint, modulus: bigint): bigint {
  const rest = mod(value, modulus);
  return 2n * rest > modulus ? rest - modulus : rest;
}
