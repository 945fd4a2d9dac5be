/**
 * Normal cut off at one or both ends. Each finite end reads its tail in the logarithm of the distance from it, so that
 * values near an end keep their digits; an infinite end is read from the other.
 */
import {
  add,
  exponential,
  fromNumber,
  logarithm,
  multiply,
  scaled,
  subtract,
} from "../../numeric/double-double.js";
import type { DoubleDouble } from "../../numeric/double-double.js";
import { logLaw, normalise, withMass } from "../../numeric/log-law.js";
import type { LogLaw, NormalisedLaw } from "../../numeric/log-law.js";
import type { QuantileLaw, Side } from "../../numeric/quantile-table.js";
import { normalCdf } from "../../numeric/normal.js";
import type { Distribution, Pass } from "./contract.js";
import { JOHNSON_1, PIECES_ACCURACY, numberAt, positive, real } from "./parts.js";
import { normal } from "./normal.js";
import { piecesPass } from "./tables.js";

/** Ends farther out than this beyond the rest of the law hold less than e^-800 of it and are left away. */
const FAR = 40;

/** Distance w above `end` in standard units: density e^(-end w - w^2 / 2). */
const distance = (end: number): LogLaw => logLaw({ a: 1, b: -end, c: -1 });

function logMass({ mass, reference }: NormalisedLaw): DoubleDouble {
  return add(logarithm(mass), reference);
}

/** Logarithm of the mass between two ends in units of the density at the lower one, which is the nearer to the mean. */
function logMassBetween(low: number, high: number): DoubleDouble {
  const whole = logMass(normalise(distance(low)));
  const beyond = logMass(normalise(distance(high)));
  const share = exponential(subtract(subtract(beyond, whole), logDrop(low, high)));
  return add(whole, logarithm(subtract(fromNumber(1), share)));
}

/** Logarithm of the density at `low` over that at `high`, (high^2 - low^2) / 2. */
function logDrop(low: number, high: number): DoubleDouble {
  const [sum, width] = [add(fromNumber(high), fromNumber(low)), subtract(fromNumber(high), fromNumber(low))];
  return scaled(multiply(width, sum), 0.5);
}

/** The laws of the distances above `low` and below `high`. The nearer end to the mean gives the mass: nothing cancels. */
function cut(low: number, high: number): readonly [NormalisedLaw, NormalisedLaw] {
  const atLow = low + high >= 0;
  const mass = atLow ? logMassBetween(low, high) : logMassBetween(-high, -low);
  const drop = logDrop(low, high);
  return [
    withMass(distance(low), atLow ? mass : subtract(mass, drop)),
    withMass(distance(-high), atLow ? add(mass, drop) : mass),
  ];
}

function sides(low: number, high: number): readonly [Side, Side] {
  const lowFar = Math.min(high, 0) - low > FAR;
  const highFar = high - Math.max(low, 0) > FAR;
  if (highFar) {
    const law = normalise(distance(low));
    return [
      { law, direction: -1, base: low, sign: 1 },
      { law, direction: 1, base: low, sign: 1 },
    ];
  }
  if (lowFar) {
    const law = normalise(distance(-high));
    return [
      { law, direction: 1, base: high, sign: -1 },
      { law, direction: -1, base: high, sign: -1 },
    ];
  }
  const [above, below] = cut(low, high);
  return [
    { law: above, direction: -1, base: low, sign: 1 },
    { law: below, direction: -1, base: high, sign: -1 },
  ];
}

const normalPdf = (z: number): number => Math.exp(-0.5 * z * z) / Math.sqrt(2 * Math.PI);

/** Mean and variance, with the tails of the nearer side so that nothing cancels far out. */
function moments(low: number, high: number): readonly [number, number] {
  const mass = low > 0 ? normalCdf(-low) - normalCdf(-high) : normalCdf(high) - normalCdf(low);
  const [p, q] = [normalPdf(low) / mass, normalPdf(high) / mass];
  const mean = p - q;
  const ends = (low === -Infinity ? 0 : low * p) - (high === Infinity ? 0 : high * q);
  return [mean, 1 + ends - mean ** 2];
}

export const truncatedNormal: Distribution = {
  title: "Truncated normal",
  citation: `${JOHNSON_1}, ch. 13.10`,
  discrete: false,
  accuracy: `${PIECES_ACCURACY}, of the distance from the end`,
  parameters: {
    mean: real("Mean before truncation.", 0),
    deviation: positive("Standard deviation before truncation.", 1),
    from: real("Lower end.", -Infinity),
    to: real("Upper end.", Infinity),
  },
  check(values) {
    const [mean, deviation] = [numberAt(values, "mean"), numberAt(values, "deviation")];
    const [low, high] = [
      (numberAt(values, "from") - mean) / deviation,
      (numberAt(values, "to") - mean) / deviation,
    ];
    if (!(low < high)) return "expected from below to; exchange or change them";
    if (!(high - low >= 1e-6))
      return "expected from and to at least 1e-6 deviations apart; take a uniform instead";
    return low <= 30 && high >= -30
      ? null
      : "expected an interval that begins within 30 deviations of the mean; move it";
  },
  law(values) {
    const [mean, deviation] = [numberAt(values, "mean"), numberAt(values, "deviation")];
    const [from, to] = [numberAt(values, "from"), numberAt(values, "to")];
    const [low, high] = [(from - mean) / deviation, (to - mean) / deviation];
    const [m, v] = moments(low, high);
    const mass = low > 0 ? normalCdf(-low) - normalCdf(-high) : normalCdf(high) - normalCdf(low);
    const passes = (): readonly Pass[] => {
      if (low < -FAR && high > FAR) return normal.law({ mean, deviation }).passes();
      return piecesPass(`truncated-normal ${mean} ${deviation} ${from} ${to}`, (): QuantileLaw => {
        const [left, right] = sides(low, high);
        return { form: 0, left, right, location: mean, scale: deviation, support: [from, to] };
      });
    };
    return {
      mean: mean + deviation * m,
      variance: deviation ** 2 * v,
      support: [from, to],
      density: (x) => normalPdf((x - mean) / deviation) / (mass * deviation),
      passes,
    };
  },
};
