/** Reductions: the operation that joins the next element to what was gathered so far, and what they begin with. */
import type { ReduceName } from "./ir.js";

export const COMBINE: Readonly<Record<ReduceName, "add" | "mul" | "min" | "max">> = {
  sum: "add",
  prod: "mul",
  min: "min",
  max: "max",
};

export const START: Readonly<Record<ReduceName, number>> = { sum: 0, prod: 1, min: Infinity, max: -Infinity };
