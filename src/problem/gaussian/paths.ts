/** Inputs that are paths: Gaussian processes seen at given times, one row of the block for each time. */
import { exponential, fromNumber } from "../../numeric/double-double.js";
import type { Parameter, ParameterValues } from "../distributions/contract.js";
import { numberAt, positive, real } from "../distributions/parts.js";

export interface Process {
  readonly title: string;
  readonly citation: string;
  readonly parameters: Readonly<Record<string, Parameter>>;
  /** Mean and covariance of the Gaussian path at `times`. */
  readonly gaussian: (
    values: ParameterValues,
    times: readonly number[],
  ) => { readonly mean: number[]; readonly covariance: number[][] };
  /** True where the path is the exponential of the Gaussian one. */
  readonly exponential: boolean;
}

const until = positive("Last of equally spaced times; without `times`.", 1);
export const TIMES: Parameter = {
  ...positive("Times above 0, ascending; instead of `length` and `until`."),
  list: true,
};
const volatility = positive("Volatility per square root of time.", 1);

const table = (times: readonly number[], f: (s: number, t: number) => number): number[][] =>
  times.map((s) => times.map((t) => f(Math.min(s, t), Math.max(s, t))));

const brownian: Process = {
  title: "Brownian motion with drift",
  citation: "Glasserman, Monte Carlo Methods in Financial Engineering, Springer 2004, section 3.1",
  parameters: {
    start: real("Value at time 0.", 0),
    drift: real("Drift per unit of time.", 0),
    volatility,
    until,
  },
  exponential: false,
  gaussian(values, times) {
    const [start, drift, sigma] = [
      numberAt(values, "start"),
      numberAt(values, "drift"),
      numberAt(values, "volatility"),
    ];
    return {
      mean: times.map((t) => start + drift * t),
      covariance: table(times, (s) => sigma * sigma * s),
    };
  },
};

/** The logarithm of `start` enters as a factor after the exponential, see passes.ts. */
const geometric: Process = {
  title: "Geometric Brownian motion",
  citation: "Glasserman, Monte Carlo Methods in Financial Engineering, Springer 2004, section 3.2",
  parameters: {
    start: positive("Value at time 0.", 1),
    drift: real("Growth rate of the mean per unit of time.", 0),
    volatility,
    until,
  },
  exponential: true,
  gaussian(values, times) {
    const [drift, sigma] = [numberAt(values, "drift"), numberAt(values, "volatility")];
    return {
      mean: times.map((t) => (drift - (sigma * sigma) / 2) * t),
      covariance: table(times, (s) => sigma * sigma * s),
    };
  },
};

const decay = (x: number): number => exponential(fromNumber(-x)).high;

const ornsteinUhlenbeck: Process = {
  title: "Ornstein-Uhlenbeck process",
  citation:
    "Uhlenbeck & Ornstein, Physical Review 36 (1930) 823-841; exact transition: Glasserman 2004, section 3.3",
  parameters: {
    start: real("Value at time 0.", 0),
    level: real("Level to which it reverts.", 0),
    reversion: positive("Rate of reversion per unit of time."),
    volatility,
    until,
  },
  exponential: false,
  gaussian(values, times) {
    const [start, level] = [numberAt(values, "start"), numberAt(values, "level")];
    const [kappa, sigma] = [numberAt(values, "reversion"), numberAt(values, "volatility")];
    const unit = (sigma * sigma) / (2 * kappa);
    return {
      mean: times.map((t) => level + (start - level) * decay(kappa * t)),
      covariance: table(times, (s, t) => unit * decay(kappa * (t - s)) * (1 - decay(2 * kappa * s))),
    };
  },
};

export const PROCESSES = {
  brownian,
  "geometric-brownian": geometric,
  "ornstein-uhlenbeck": ornsteinUhlenbeck,
} as const satisfies Readonly<Record<string, Process>>;

export type ProcessId = keyof typeof PROCESSES;
export const processIds = Object.keys(PROCESSES) as ProcessId[];

export function processOf(id: ProcessId): Process {
  return PROCESSES[id];
}

export function isProcess(id: string): id is ProcessId {
  return Object.hasOwn(PROCESSES, id);
}

/** Parameters with the defaults of the process filled in. */
export function processValues(id: ProcessId, given: ParameterValues = {}): ParameterValues {
  const values: Record<string, number | readonly number[]> = {};
  for (const [name, one] of Object.entries(processOf(id).parameters)) {
    if (one.default !== undefined) values[name] = one.default;
  }
  return { ...values, ...given };
}

export function timesOf(values: ParameterValues, length: number): readonly number[] {
  const { times } = values;
  if (typeof times === "object") return times;
  const last = numberAt(values, "until");
  return Array.from({ length }, (_, i) => (last * (i + 1)) / length);
}
