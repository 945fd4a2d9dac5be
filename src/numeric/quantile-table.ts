/**
 * Tables of piecewise polynomials for quantiles (read by kernels/assembly/distributions/pieces.ts). The quantile is
 * carried from far out in each tail to the middle by its Taylor series (quantile-series.ts), one piece after the other;
 * each piece is economised to degree 11. Every piece is held against its series in double-double arithmetic, and the two
 * tails must meet in the middle, where they check each other's mass: a table that misses 5e-13 is made again with finer
 * pieces, or refused.
 */
import {
  add,
  divide,
  exponential,
  fromNumber,
  logarithm,
  powerOfTwo,
  scaled,
  subtract,
} from "./double-double.js";
import type { DoubleDouble } from "./double-double.js";
import { tailPlace } from "./log-law.js";
import type { NormalisedLaw } from "./log-law.js";
import { TERMS, economised, quantileSeries, seriesAt } from "./quantile-series.js";

/** How the polynomial p becomes a value; base, sign: 0: base + sign e^p, 1: 1 / (1 + e^-p), 2: (u - 1/2) e^p. */
export type Form = 0 | 1 | 2;

export interface Side {
  readonly law: NormalisedLaw;
  /** Which mass of the law is the tail's: 1 that above, -1 that below. */
  readonly direction: 1 | -1;
  readonly base: number;
  readonly sign: 1 | -1;
}

export interface QuantileLaw {
  readonly form: Form;
  /** What u below 1/2 reads, and what u above 1/2 does; for form 2 one table serves both. */
  readonly left: Side;
  readonly right: Side;
  readonly location: number;
  readonly scale: number;
  /** The values at u = 0 and u = 1. */
  readonly support: readonly [number, number];
  /** For form 2, with the law in x = log odds: p = x / 2 + half - log(1/2 - t), and two tails share the law's mass. */
  readonly half?: DoubleDouble;
}

/** Largest error of a table, relative, beside that of the exponential in the kernel (below 1e-15). */
export const LARGEST_ERROR = 5e-13;

const HEADER = 24;
const DEGREE = 11;
/** Smallest share of the tails that the tables tell apart: 2^-64 below, 2^-53 (the last double before 1) above. */
const [LEFT_BITS, RIGHT_BITS] = [64, 53];
/** Logarithms of values below the least double: their error does not show. */
const UNDERFLOW = -745;
const CHECKED = [-1, -0.85, -0.45, 0.1, 0.55, 0.9, 1];

/** The polynomial as the kernel evaluates it, even and odd powers apart. */
function polynomial(c: readonly number[], s: number): number {
  const square = s * s;
  let [even, odd] = [c[DEGREE - 1] ?? 0, c[DEGREE] ?? 0];
  for (let k = DEGREE - 3; k >= 0; k -= 2) {
    even = even * square + (c[k] ?? 0);
    odd = odd * square + (c[k + 1] ?? 0);
  }
  return even + s * odd;
}

interface Pieces {
  readonly coefficients: readonly number[];
  readonly error: number;
  /** p at t = 1/2. */
  readonly middle: number;
}

function pieces(side: Side, form: Form, half: DoubleDouble, bits: number, cut: number): Pieces {
  const share = form === 2 ? 2 : 1;
  const { law, direction } = side;
  const start = tailPlace(law, direction, bits + 2);
  let x = start.x;
  let t = scaled(start.share, 1 / share);
  const coefficients: number[] = [];
  let error = 0;
  let middle = 0;
  /** Carries x on to `to` by steps of at most a twelfth of t. */
  const carry = (to: number): void => {
    for (;;) {
      const left = subtract(fromNumber(to), t);
      const most = t.high / 12;
      const last = Math.abs(left.high) <= most;
      const step = last ? left : fromNumber(left.high > 0 ? most : -most);
      x = seriesAt(quantileSeries(law, x, direction, scaled(step, share)), 1);
      t = last ? fromNumber(to) : add(t, step);
      if (last) return;
    }
  };
  let previous: { series: DoubleDouble[]; centre: number; width: number } | null = null;
  for (let octave = -bits; octave < -1; octave++) {
    for (let k = 0; k < 2 ** cut; k++) {
      const width = powerOfTwo(octave - cut - 1);
      const centre = powerOfTwo(octave) + (2 * k + 1) * width;
      if (previous === null) carry(centre);
      else {
        const at = seriesAt(previous.series, (centre - previous.centre) / previous.width);
        x = form === 2 ? scaled(subtract(add(at, logHalfLess(centre)), half), 2) : at;
      }
      let series = quantileSeries(law, x, direction, fromNumber(share * width));
      if (form === 2) series = withoutZero(series, centre, width, half);
      previous = { series, centre, width };
      const c = economised(series, DEGREE);
      if ((c[0] ?? 0) > UNDERFLOW) {
        for (const s of CHECKED) {
          error = Math.max(error, Math.abs(subtract(seriesAt(series, s), fromNumber(polynomial(c, s))).high));
        }
        error = Math.max(error, Math.abs(series[TERMS - 1]?.high ?? Infinity));
      }
      for (let n = DEGREE - 1; n >= 0; n -= 2) coefficients.push(c[n] ?? 0, c[n + 1] ?? 0);
      middle = seriesAt(series, 1).high;
    }
  }
  return { coefficients, error: Number.isNaN(error) ? Infinity : error, middle };
}

const logHalfLess = (t: number): DoubleDouble => logarithm(fromNumber(0.5 - t));

/** x / 2 + half - log(1/2 - t) as a series: the zero of the quantile at t = 1/2 is taken out. */
function withoutZero(
  series: readonly DoubleDouble[],
  centre: number,
  width: number,
  half: DoubleDouble,
): DoubleDouble[] {
  const ratio = divide(fromNumber(width), fromNumber(0.5 - centre)).high; // 1 / (odd number): its rounding is part of the check
  let power = fromNumber(1);
  return series.map((c, n) => {
    const own = scaled(c, 0.5);
    if (n === 0) return subtract(add(own, half), logHalfLess(centre));
    power = scaled(power, ratio);
    return add(own, divide(power, fromNumber(n)));
  });
}

export interface QuantileTable {
  readonly table: Float64Array<ArrayBuffer>;
  /** Largest relative error found in making it. */
  readonly error: number;
}

/** The table of a law. Throws RangeError where no table within LARGEST_ERROR is found. */
export function quantileTable(of: QuantileLaw): QuantileTable {
  const half = of.half ?? fromNumber(0);
  let least = Infinity;
  for (let cut = 2; cut <= 5; cut++) {
    const left = pieces(of.left, of.form, half, LEFT_BITS, cut);
    const right = of.form === 2 ? left : pieces(of.right, of.form, half, RIGHT_BITS, cut);
    const error = Math.max(left.error, right.error, meeting(of, left.middle, right.middle));
    if (error <= LARGEST_ERROR) return { table: assemble(of, cut, left, right), error };
    least = Math.min(least, error);
  }
  throw new RangeError(
    `no table within ${LARGEST_ERROR} relative was found for these parameters (best ${least.toExponential(1)})`,
  );
}

/** How far the two tails disagree in the middle, relative to the value. */
function meeting({ form, left, right }: QuantileLaw, p: number, q: number): number {
  if (form === 2) return 0;
  if (left.base === right.base && left.sign === right.sign) return Math.abs(p - q);
  const value = (side: Side, at: number): number => side.base + side.sign * exponential(fromNumber(at)).high;
  const [a, b] = [value(left, p), value(right, q)];
  return Math.abs(a - b) / Math.max(Math.abs(a), 1e-3 * Math.abs(left.base - right.base));
}

function assemble(of: QuantileLaw, cut: number, left: Pieces, right: Pieces): Float64Array<ArrayBuffer> {
  const same = left === right;
  const size = HEADER + left.coefficients.length + (same ? 0 : right.coefficients.length);
  const table = new Float64Array(size);
  const rightBits = same ? LEFT_BITS : RIGHT_BITS;
  const side = ({ base, sign }: Side, bits: number, at: number): number[] => [
    base,
    sign,
    powerOfTwo(-bits),
    (1023 - bits) * 2 ** cut,
    at,
  ];
  table.set([of.form, of.location, of.scale, cut, ...of.support]);
  table.set(side(of.left, LEFT_BITS, HEADER), 6);
  table.set(side(of.right, rightBits, same ? HEADER : HEADER + left.coefficients.length), 11);
  table.set(left.coefficients, HEADER);
  if (!same) table.set(right.coefficients, HEADER + left.coefficients.length);
  return table;
}
