/** What several distributions share: kinds of parameters, and the passes of closed forms. */
import type { Parameter, ParameterValues, Pass } from "./contract.js";

export const CLOSED_ACCURACY = "a few units in the last place (elementary functions)";
export const PIECES_ACCURACY = "1e-12 relative, checked whenever a table is made";
export const STEPS_ACCURACY = "exact: the least value whose distribution function reaches u";

/** Reference of most continuous laws. */
export const JOHNSON_1 =
  "Johnson, Kotz & Balakrishnan, Continuous Univariate Distributions 1, 2nd ed., Wiley 1994";
export const JOHNSON_2 =
  "Johnson, Kotz & Balakrishnan, Continuous Univariate Distributions 2, 2nd ed., Wiley 1995";
export const JOHNSON_DISCRETE =
  "Johnson, Kemp & Kotz, Univariate Discrete Distributions, 3rd ed., Wiley 2005";

const optional = (value: number | undefined): { default?: number } =>
  value === undefined ? {} : { default: value };

/** Largest size of a parameter: squares and products of parameters stay finite. */
const LARGEST = 1e100;

export function real(about: string, standard?: number): Parameter {
  const holds = (x: number): boolean => Math.abs(x) <= LARGEST;
  return { about, what: "a number of at most 1e100 in size", holds, ...optional(standard) };
}

export function positive(about: string, standard?: number): Parameter {
  const holds = (x: number): boolean => x >= 1 / LARGEST && x <= LARGEST;
  return { about, what: "a number from 1e-100 to 1e100", holds, ...optional(standard) };
}

export function whole(about: string, least: number, most: number): Parameter {
  const holds = (x: number): boolean => Number.isInteger(x) && x >= least && x <= most;
  return { about, what: `a whole number from ${least} to ${most}`, holds };
}

/** A positive number between two bounds that the tables (or the elementary functions) serve. */
export function between(about: string, least: number, most: number, standard?: number): Parameter {
  const holds = (x: number): boolean => x >= least && x <= most;
  return { about, what: `a number from ${least} to ${most}`, holds, ...optional(standard) };
}

export const PROBABILITY: Parameter = {
  about: "Probability of a success.",
  what: "a probability above 0 and at most 1",
  holds: (x) => x > 0 && x <= 1,
};

/** The number of a parameter that has been checked. */
export function numberAt(values: ParameterValues, name: string): number {
  const value = values[name];
  if (typeof value !== "number")
    throw new TypeError(`parameter ${name}: expected a number, found ${typeof value}`);
  return value;
}

/** The numbers of a list parameter that has been checked. */
export function listAt(values: ParameterValues, name: string): readonly number[] {
  const value = values[name];
  if (!Array.isArray(value)) throw new TypeError(`parameter ${name}: expected a list, found ${typeof value}`);
  return value as readonly number[];
}

export function closed(form: number, location: number, scale: number, shape = 0): Pass {
  return { kind: "closed", form, location, scale, shape };
}
