/** Mean and variance of an input, for displays: of each component, or of a path at its last time. */
import type { Input } from "./contract.js";
import { numberAt } from "./distributions/parts.js";
import { lawOf } from "./distributions/registry.js";
import { isProcess, processOf, processValues, timesOf } from "./gaussian/paths.js";

export interface InputMoments {
  readonly mean: number;
  readonly variance: number;
  /** The time of a path that they are for; null for a distribution. */
  readonly time: number | null;
}

export function momentsOf({ distribution, parameters, length }: Input): InputMoments {
  if (!isProcess(distribution)) {
    const { mean, variance } = lawOf(distribution, parameters);
    return { mean, variance, time: null };
  }
  const process = processOf(distribution);
  const values = processValues(distribution, parameters);
  const time = timesOf(values, length ?? 1).at(-1) ?? Number.NaN;
  const gaussian = process.gaussian(values, [time]);
  const [m, v] = [gaussian.mean[0] ?? Number.NaN, gaussian.covariance[0]?.[0] ?? Number.NaN];
  if (!process.exponential) return { mean: m, variance: v, time };
  const mean = numberAt(values, "start") * Math.exp(m + v / 2);
  return { mean, variance: mean ** 2 * Math.expm1(v), time };
}
