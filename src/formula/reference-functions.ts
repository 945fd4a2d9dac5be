/**
 * Functions that mathjs lacks or defines otherwise than the language does, for the interpreter. Plain JavaScript on
 * numbers, by other methods than the kernels use, so that the two can be held against each other.
 */
import type { MathJsInstance } from "mathjs";

type Numeric = (...args: number[]) => number;

const SQRT_HALF = Math.SQRT1_2;

/** Functions of numbers, applied element by element by the interpreter; all others of that kind come from mathjs. */
export function numberFunctions(math: MathJsInstance): Readonly<Record<string, Numeric>> {
  const erf = (a: number): number => Number(math.erf(a));
  const erfc = (a: number): number => complementaryError(a, erf);
  const normalCdf = (a: number): number => erfc(-a * SQRT_HALF) / 2;
  return {
    floor: Math.floor,
    ceil: Math.ceil,
    fix: Math.trunc,
    round: (a = NaN) => (Math.abs(a - Math.trunc(a)) >= 0.5 ? Math.trunc(a) + Math.sign(a) : Math.trunc(a)),
    mod: (a = NaN, b = NaN) => (b === 0 ? a : a - b * Math.floor(a / b)),
    min: Math.min,
    max: Math.max,
    erfc: (a = NaN) => erfc(a),
    lgamma: (a = NaN) => (a === 1 || a === 2 ? 0 : toReal(math.lgamma(a))), // -4e-16 for mathjs
    normalPdf: (a = NaN) => Math.exp((-a * a) / 2) / Math.sqrt(2 * Math.PI),
    normalCdf: (a = NaN) => normalCdf(a),
    normalQuantile: (a = NaN) => normalQuantile(a, normalCdf),
  };
}

/**
 * erfc by its continued fraction, A&S 26.2.14 in the form erfc(x) = exp(-x^2) / sqrt(pi) * 1/(x + (1/2)/(x + (2/2)/(x + ...)))
 * (M. Abramowitz and I. A. Stegun, Handbook of Mathematical Functions, 7.1.14), from the far end; below 2 from erf.
 */
function complementaryError(a: number, erf: (a: number) => number): number {
  if (a < 2) return 1 - erf(a);
  let tail = 0;
  for (let k = 120; k >= 1; k--) tail = k / 2 / (a + tail);
  return Math.exp(-a * a) / Math.sqrt(Math.PI) / (a + tail);
}

/** Root of normalCdf by bisection, on the side where the probability is small. */
function normalQuantile(p: number, normalCdf: (a: number) => number): number {
  if (!(p >= 0 && p <= 1)) return NaN;
  if (p === 0 || p === 1) return p === 0 ? -Infinity : Infinity;
  if (p > 0.5) return -normalQuantile(1 - p, normalCdf);
  let [low, high] = [-40, 0];
  for (;;) {
    const middle = (low + high) / 2;
    if (middle === low || middle === high) return middle;
    if (normalCdf(middle) < p) low = middle;
    else high = middle;
  }
}

type Vector = readonly number[];

/** Functions of vectors that mathjs lacks or defines otherwise. */
export const VECTOR_FUNCTIONS: Readonly<Record<string, (of: Vector) => number | Vector>> = {
  length: (of) => of.length,
  norm: (of) => Math.sqrt(of.reduce((sum, value) => sum + value * value, 0)), // complex for mathjs if one is NaN
  // Where an element is NaN there is no order.
  sort: (of) => (of.some(Number.isNaN) ? of.map(() => NaN) : [...of].sort((a, b) => a - b)),
  cumprod: (of) => {
    let product = 1;
    return of.map((value) => (product *= value));
  },
};

function toReal(value: unknown): number {
  return typeof value === "number" ? value : NaN;
}
