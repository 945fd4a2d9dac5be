/**
 * Arithmetic on unevaluated sums of two doubles, some 31 digits: T. J. Dekker, "A floating-point technique for extending the
 * available precision", Numerische Mathematik 18 (1971) 224-242; Y. Hida, X. S. Li and D. H. Bailey, "Algorithms for quad-double
 * precision floating point arithmetic", ARITH 15 (2001) 155-162. Relative errors are a few 2^-104; no overflow handling.
 */

export interface DoubleDouble {
  readonly high: number;
  readonly low: number;
}

/** pi = 3.14159265358979323846264338327950... */
export const PI: DoubleDouble = { high: 3.141592653589793, low: 1.2246467991473532e-16 };

export function fromNumber(value: number): DoubleDouble {
  return { high: value, low: 0 };
}

export function add(a: DoubleDouble, b: DoubleDouble): DoubleDouble {
  const high = a.high + b.high;
  const part = high - a.high;
  const low = a.high - (high - part) + (b.high - part) + a.low + b.low;
  return renormalise(high, low);
}

export function multiply(a: DoubleDouble, b: DoubleDouble): DoubleDouble {
  const high = a.high * b.high;
  return renormalise(high, productError(a.high, b.high, high) + a.high * b.low + a.low * b.high);
}

export function divide(a: DoubleDouble, b: DoubleDouble): DoubleDouble {
  const first = a.high / b.high;
  const rest = add(a, multiply(fromNumber(-first), b));
  const second = rest.high / b.high;
  const left = add(rest, multiply(fromNumber(-second), b));
  return add(renormalise(first, second), fromNumber(left.high / b.high));
}

function renormalise(high: number, low: number): DoubleDouble {
  const sum = high + low;
  return { high: sum, low: low - (sum - high) };
}

/** 2^27 + 1 */
const SPLITTER = 134217729;

/** a b - product, exact. */
function productError(a: number, b: number, product: number): number {
  const aScaled = SPLITTER * a;
  const aHigh = aScaled - (aScaled - a);
  const aLow = a - aHigh;
  const bScaled = SPLITTER * b;
  const bHigh = bScaled - (bScaled - b);
  const bLow = b - bHigh;
  return aLow * bLow - (product - aHigh * bHigh - aLow * bHigh - aHigh * bLow);
}
