/**
 * Laws of a positive variate y by the density of its logarithm x = log y, up to a constant factor:
 *
 *     log g(x) = a x + b y + c y^2 / 2 - d / y + e log(1 + y).
 *
 * Gamma (a, b = -1), the odds of a beta (a, e = -alpha - beta), inverse Gaussian and cut-off normal laws are of this form,
 * and with them chi-squared, Student's t and F. The slope of log g is a + b y + c y^2 + d / y + e y / (1 + y), a rational
 * function of y, which is what the series of quantile-table.ts live on. Everything is done in double-double arithmetic with
 * +, -, * and / alone, so the bits are the same everywhere.
 */
import {
  add,
  divide,
  exponential,
  fromNumber,
  logOnePlus,
  logarithm,
  multiply,
  scaled,
  subtract,
} from "./double-double.js";
import type { DoubleDouble } from "./double-double.js";

export interface LogLaw {
  readonly a: DoubleDouble;
  readonly b: number;
  readonly c: number;
  readonly d: number;
  readonly e: DoubleDouble;
}

const ONE = fromNumber(1);
const ZERO = fromNumber(0);

/** The law with the parts that are given; the others are 0. */
export function logLaw(parts: {
  readonly a: DoubleDouble | number;
  readonly b?: number;
  readonly c?: number;
  readonly d?: number;
  readonly e?: DoubleDouble;
}): LogLaw {
  const a = typeof parts.a === "number" ? fromNumber(parts.a) : parts.a;
  return { a, b: parts.b ?? 0, c: parts.c ?? 0, d: parts.d ?? 0, e: parts.e ?? ZERO };
}

/** log(1 + e^x). */
function softPlus(x: DoubleDouble): DoubleDouble {
  if (x.high > 0) return add(x, logOnePlus(exponential({ high: -x.high, low: -x.low })));
  return logOnePlus(exponential(x));
}

/** e^x / (1 + e^x). */
export function logisticOf(x: DoubleDouble): DoubleDouble {
  if (x.high > 0) return divide(ONE, add(ONE, exponential({ high: -x.high, low: -x.low })));
  const y = exponential(x);
  return divide(y, add(ONE, y));
}

export function logDensity(law: LogLaw, x: DoubleDouble): DoubleDouble {
  let sum = multiply(law.a, x);
  if (law.b !== 0 || law.c !== 0) {
    const y = exponential(x);
    if (law.b !== 0) sum = add(sum, scaled(y, law.b));
    if (law.c !== 0) sum = add(sum, scaled(multiply(y, y), law.c / 2));
  }
  if (law.d !== 0) sum = subtract(sum, scaled(exponential({ high: -x.high, low: -x.low }), law.d));
  if (law.e.high !== 0) sum = add(sum, multiply(law.e, softPlus(x)));
  return sum;
}

/** Slope of log g and its own slope, as doubles: for finding places, not for values. */
function slopes(law: LogLaw, at: number): readonly [number, number] {
  const x = fromNumber(at);
  const y = exponential(x).high;
  const z = exponential(fromNumber(-at)).high;
  const p = logisticOf(x).high;
  const first = law.a.high + law.b * y + law.c * y * y + (law.d === 0 ? 0 : law.d * z) + law.e.high * p;
  const second = law.b * y + 2 * law.c * y * y - (law.d === 0 ? 0 : law.d * z) + law.e.high * p * (1 - p);
  return [first, second];
}

/** Nodes w = exp(t - e^-t) and weights dw of the double exponential rule, at t = k / 2^level; made once. */
const nodes: { readonly w: DoubleDouble; readonly weight: DoubleDouble; readonly t: number }[][] = [];

function nodesOf(level: number): (typeof nodes)[number] {
  let list = nodes[level];
  if (list !== undefined) return list;
  list = [];
  const step = 1 / 2 ** level;
  for (let t = -4.5; t <= 16; t += step) {
    const e = exponential(fromNumber(-t));
    const w = exponential(subtract(fromNumber(t), e));
    list.push({ w, weight: scaled(multiply(w, add(ONE, e)), step), t });
  }
  nodes[level] = list;
  return list;
}

/**
 * Integral of g / e^reference from `from` outwards (direction 1 up, -1 down), by the double exponential rule for
 * half-lines (H. Takahasi and M. Mori, Publications of RIMS 9 (1974) 721-741), its step halved until two agree
 * to 1e-17; the finer one is then good to about the square of that.
 */
function massBeyond(
  law: LogLaw,
  from: DoubleDouble,
  direction: number,
  scale: number,
  reference: DoubleDouble,
): DoubleDouble {
  let before: DoubleDouble | null = null;
  for (let level = 3; level <= 7; level++) {
    let sum = ZERO;
    for (const { w, weight, t } of nodesOf(level)) {
      const x = add(from, scaled(w, direction * scale));
      const term = multiply(weight, exponential(subtract(logDensity(law, x), reference)));
      sum = add(sum, term);
      if (t > 0 && term.high < 1e-36 * sum.high) break;
    }
    const value = scaled(sum, scale);
    if (before !== null && Math.abs(subtract(value, before).high) <= 1e-17 * value.high) return value;
    before = value;
  }
  throw new RangeError("the mass of the distribution cannot be integrated with these parameters");
}

/** A law with its total mass known. */
export interface NormalisedLaw {
  readonly law: LogLaw;
  /** Place of the largest density of the logarithm. */
  readonly mode: number;
  readonly scale: number;
  /** log g at the mode; g is counted in units of its exponential. */
  readonly reference: DoubleDouble;
  readonly mass: DoubleDouble;
}

export interface ModeOfLaw {
  readonly law: LogLaw;
  readonly mode: number;
  readonly scale: number;
  readonly reference: DoubleDouble;
}

/** Mode by bisection on the slope, which falls from above 0 to below 0. Throws RangeError where there is none. */
function modeOf(law: LogLaw): ModeOfLaw {
  let [low, high] = [-680, 680];
  if (!(slopes(law, low)[0] > 0 && slopes(law, high)[0] < 0)) {
    throw new RangeError("the distribution is too far from 1 in scale for double precision");
  }
  for (let k = 0; k < 60; k++) {
    const middle = (low + high) / 2;
    if (slopes(law, middle)[0] > 0) low = middle;
    else high = middle;
  }
  // the density of a logarithm changes on a scale of 1 at most, however long its tails
  const scale = Math.min(1, 1 / Math.sqrt(-slopes(law, low)[1]));
  if (!(scale > 0 && scale < Infinity)) throw new RangeError("the distribution has no single peak");
  return { law, mode: low, scale, reference: logDensity(law, fromNumber(low)) };
}

/** Mass on one side of the mode, in units of e^reference. */
function half({ law, mode, scale, reference }: ModeOfLaw, direction: number): DoubleDouble {
  return massBeyond(law, fromNumber(mode), direction, scale, reference);
}

export function normalise(law: LogLaw): NormalisedLaw {
  const found = modeOf(law);
  return { ...found, mass: add(half(found, 1), half(found, -1)) };
}

/** The law with its mass given as a multiple of e^0: for laws that are cut off, whose mass comes from elsewhere. */
export function withMass(law: LogLaw, logMass: DoubleDouble): NormalisedLaw {
  const found = modeOf(law);
  return { ...found, mass: exponential(subtract(logMass, found.reference)) };
}

/** A place far out in a tail: x, and the share of the mass beyond it. */
export interface TailPlace {
  readonly x: DoubleDouble;
  readonly share: DoubleDouble;
}

/** The place beyond which about a share of 2^-bits is left (at most that where log g is concave). */
export function tailPlace(of: NormalisedLaw, direction: number, bits: number): TailPlace {
  const { law, mode, scale, reference, mass } = of;
  const goal = logarithm(mass).high - bits * 0.6931471805599453;
  const beyond = (x: number): boolean => {
    const slope = -direction * slopes(law, x)[0];
    if (!(slope > 0)) return false;
    const level = subtract(logDensity(law, fromNumber(x)), reference).high;
    return level - logarithm(fromNumber(slope)).high < goal;
  };
  let step = scale;
  while (!beyond(mode + direction * step)) {
    step *= 2;
    if (step > 1e9) throw new RangeError("the tail of the distribution does not end within reach");
  }
  let [inner, outer] = [step / 2, step];
  for (let k = 0; k < 30; k++) {
    const middle = (inner + outer) / 2;
    if (beyond(mode + direction * middle)) outer = middle;
    else inner = middle;
  }
  const x = fromNumber(mode + direction * outer);
  const slope = Math.abs(slopes(law, x.high)[0]);
  return { x, share: divide(massBeyond(law, x, direction, 1 / slope, reference), mass) };
}
