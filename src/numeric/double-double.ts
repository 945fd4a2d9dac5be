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

/** ln 2 = 0.69314718055994530941723212145818... */
const LN2: DoubleDouble = { high: 0.6931471805599453, low: 2.3190468138462996e-17 };

export function subtract(a: DoubleDouble, b: DoubleDouble): DoubleDouble {
  return add(a, { high: -b.high, low: -b.low });
}

/** a times a double. */
export function scaled(a: DoubleDouble, factor: number): DoubleDouble {
  return multiply(a, fromNumber(factor));
}

const words = new DataView(new ArrayBuffer(8));

/** 2^exponent for -1022 to 1023, exact. */
export function powerOfTwo(exponent: number): number {
  words.setUint32(0, (exponent + 1023) * 2 ** 20);
  words.setUint32(4, 0);
  return words.getFloat64(0);
}

/** Binary exponent of a positive normal double: 2^e <= x < 2^(e + 1). */
export function exponentOf(x: number): number {
  words.setFloat64(0, x);
  return (words.getUint32(0) >>> 20) - 1023;
}

/** Terms of the exponential series for |r| <= ln 2 / 2^9: the tenth is below 1e-37. */
const EXPONENTIAL_TERMS = 10;

/** e^x: halved 8 times after its powers of two are taken out. Below e^-690 it is 0, above e^690 it stays at that. */
export function exponential(x: DoubleDouble): DoubleDouble {
  if (x.high < -690) return fromNumber(0);
  const from = x.high > 690 ? fromNumber(690) : x;
  const twos = Math.round(from.high / LN2.high);
  const r = scaled(subtract(from, scaled(LN2, twos)), 1 / 256);
  let sum = fromNumber(0);
  for (let k = EXPONENTIAL_TERMS; k >= 1; k--) {
    const next = add(fromNumber(1), sum);
    sum = divide(multiply(r, next), fromNumber(k));
  }
  // e^(2r) - 1 = (e^r - 1)(e^r + 1), so that the small part keeps its digits
  for (let k = 0; k < 8; k++) sum = multiply(sum, add(sum, fromNumber(2)));
  return scaled(add(sum, fromNumber(1)), powerOfTwo(twos));
}

/** Inverse hyperbolic tangent times two for |s| <= 1/3, which is log((1 + s) / (1 - s)). */
function twiceArtanh(s: DoubleDouble): DoubleDouble {
  const square = multiply(s, s);
  let sum = fromNumber(0);
  for (let k = 67; k >= 1; k -= 2) sum = add(divide(fromNumber(1), fromNumber(k)), multiply(sum, square));
  return scaled(multiply(s, sum), 2);
}

/** log(1 + x) for 0 <= x <= 1. */
export function logOnePlus(x: DoubleDouble): DoubleDouble {
  return twiceArtanh(divide(x, add(x, fromNumber(2))));
}

/** log x for a positive normal x. */
export function logarithm(x: DoubleDouble): DoubleDouble {
  const exponent = exponentOf(x.high);
  const m = scaled(x, powerOfTwo(-exponent)); // 1 <= m < 2
  const rest = divide(subtract(m, fromNumber(1)), add(m, fromNumber(1)));
  return add(twiceArtanh(rest), scaled(LN2, exponent));
}
