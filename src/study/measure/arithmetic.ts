/**
 * What doubles cost: the compiled formula against itself in 64 digits on a subsample, at the same inputs; a condition also
 * at inputs moved by 2^24 units in the last place up or down, since its own rounding would need some 10^15 points to be
 * seen; and the tree of sums against a compensated sum of the same values (Neumaier 1974).
 */
import { DIGITS, highPrecision } from "../../formula/high-precision.js";
import { channelMean } from "../../estimators/moments.js";
import { mean } from "../../numeric/sums.js";
import { scopeOf } from "../../problem/compile.js";
import type { Problem } from "../../problem/contract.js";
import type { ArithmeticMeasurement } from "../../record/measurements.js";
import { makeKey } from "../../sources/key.js";
import { philox4x64 } from "../../sources/philox4x64.js";
import { Integrator } from "../integrator.js";
import type { RunnableProblem } from "../runnable.js";
import { pairedMean, samplePoints, valuesAt } from "./points.js";

/** Coordinates evaluated in many digits for a problem, and fewest and most points; some 0.1 ms each. */
const COORDINATES = 1024;
const FEWEST = 8;
const MOST = 128;

const FLIP_POINTS = 2 ** 14;
const FLIP_COORDINATES = 2 ** 18;
const FLIP_AMPLIFICATION = 2 ** 24;

const SUM_POINTS = 2 ** 13;
const SUM_COORDINATES = 2 ** 18;

function within(coordinates: number, dimension: number, most: number, fewest: number): number {
  return Math.min(most, Math.max(fewest, Math.floor(coordinates / dimension)));
}

/** null where the values are not finite. */
export async function measureArithmetic(
  problem: RunnableProblem,
  described: Problem,
  seed: number,
): Promise<ArithmeticMeasurement | null> {
  const { dimension, indicator } = problem.formula;
  const exact = await highPrecision(described.integrand, scopeOf(described));
  const points = within(COORDINATES, dimension, MOST, FEWEST);
  const { inputs, values } = samplePoints(problem, seed, "arithmetic", points);
  if (!values.every(Number.isFinite)) return null;
  const excess = (value: number, i: number): number =>
    exact.excess(
      inputs.map((row) => row[i] ?? NaN),
      value,
    );
  const differences = exact.missing.length > 0 ? [] : Array.from(values, excess);
  const known = differences.length > 0 && differences.every(Number.isFinite);
  return {
    formula: known ? { ...pairedMean(differences), digits: DIGITS } : null,
    missing: exact.missing,
    flips: indicator ? flipsOf(problem, seed) : null,
    summation: summationOf(problem, seed),
  };
}

function flipsOf(problem: RunnableProblem, seed: number): ArithmeticMeasurement["flips"] {
  const points = within(FLIP_COORDINATES, problem.formula.dimension, FLIP_POINTS, 256);
  const { inputs, values } = samplePoints(problem, seed, "flips", points);
  // Up or down by the lowest bit of the input itself, which is as good as a coin here and needs no further numbers.
  const bits = new DataView(new ArrayBuffer(8));
  const moved = inputs.map((row) =>
    row.map((x) => {
      bits.setFloat64(0, x);
      const sign = bits.getUint8(6) & 1 ? 1 : -1;
      return x * (1 + sign * FLIP_AMPLIFICATION * Number.EPSILON);
    }),
  );
  const other = valuesAt(problem, moved);
  const differences = Array.from(values, (value, i) => value - (other[i] ?? NaN));
  return { ...pairedMean(differences), amplification: FLIP_AMPLIFICATION };
}

function summationOf(problem: RunnableProblem, seed: number): ArithmeticMeasurement["summation"] {
  const { dimension } = problem.formula;
  const points = within(SUM_COORDINATES, dimension, SUM_POINTS, 256);
  const key = makeKey({ seed, purpose: "budget", problem: problem.id, source: "sums", replicate: 0 });
  const integrator = new Integrator(problem);
  const open = () => philox4x64.open({ dimension, n: points, randomisations: [], key }, integrator.kernels);
  const [size] = integrator.run(open(), [points]).sizes;
  const tree = size === undefined ? NaN : channelMean(size.moments);
  const { values } = integrator.points(open(), points);
  return { points, difference: tree - mean(Array.from(values)) };
}
