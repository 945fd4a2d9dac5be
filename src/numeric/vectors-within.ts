/**
 * All vectors of a lattice up to a length, of v and -v one: depth-first through the coefficients of a reduced basis, the
 * last one first, each confined by what the orthogonal parts leave (U. Fincke and M. Pohst, "Improved methods for calculating
 * vectors of short length in a lattice, including a complexity analysis", Mathematics of Computation 44 (1985) 463-471).
 * Bounds come from doubles with a margin; what is reported has been measured in whole numbers. Good for a few
 * dimensions and lengths up to 2^20; bad where the ball holds more vectors than anyone will look at, hence `most`.
 */
import type { ReducedBasis } from "./lattice-reduction.js";

/** Margin on squared lengths; far above the rounding of a few sums, and squares below 2^53 stay exact. */
const MARGIN = 1 + 1e-9;

/** The vectors v with 0 < |v|^2 <= `squared`, or null where there are more than `most`. */
export function vectorsWithin(basis: ReducedBasis, squared: number, most: number): number[][] | null {
  const { lengths, mu } = basis.orthogonal();
  const t = basis.size;
  const rows = basis.rows.map((row) => row.map(Number));
  const found: number[][] = [];
  const x = new Float64Array(t);

  /** Coefficient i, those behind it being set; `rest` is what is left of the squared length. */
  const descend = (i: number, rest: number, zero: boolean): boolean => {
    if (i < 0) return zero || report();
    let centre = 0;
    for (let j = i + 1; j < t; j++) centre -= (x[j] ?? 0) * (mu[j * t + i] ?? 0);
    const length = lengths[i] ?? 1;
    const reach = Math.sqrt(rest / length);
    // of v and -v the one whose last coefficient that is not 0 is positive
    const first = zero ? 0 : Math.ceil(centre - reach);
    for (let c = first; c <= centre + reach; c++) {
      x[i] = c;
      if (!descend(i - 1, rest - (c - centre) ** 2 * length, zero && c === 0)) return false;
    }
    x[i] = 0;
    return true;
  };
  const report = (): boolean => {
    const v = Array.from({ length: t }, (_, j) =>
      rows.reduce((sum, row, i) => sum + (x[i] ?? 0) * (row[j] ?? 0), 0),
    );
    if (v.reduce((sum, entry) => sum + entry * entry, 0) <= squared) found.push(v);
    return found.length <= most;
  };
  return descend(t - 1, squared * MARGIN, true) ? found : null;
}
