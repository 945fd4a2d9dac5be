/**
 * Random formulas of the language: an arbitrary of fast-check that grows typed expressions (numbers, conditions,
 * vectors) over several lines, with helper functions, slices and every function of the table.
 */
import fc from "fast-check";
import { FUNCTIONS } from "../../src/formula/index.js";
import type { FormulaScope } from "../../src/formula/contract.js";

export const LENGTH = 5;

export const SCOPE: FormulaScope = {
  inputs: [
    { name: "x", length: LENGTH, first: 0 },
    { name: "y", length: null, first: LENGTH },
    { name: "z", length: LENGTH, first: LENGTH + 1 },
  ],
  constants: {
    k: 1.75,
    w: [0.5, -1.25, 2, 0.125, 3],
    M: [
      [1, 0.5, 0, -0.25, 2],
      [0, 1, 0.75, 1, -1],
      [0.5, 0.5, 0.5, 0.5, 0.5],
      [2, -1, 0, 1, 0.25],
      [-0.5, 0, 1, 0, 1],
    ],
  },
};

type Kind = "number" | "condition" | "vector";
/** Draws an index below its argument. */
type Draw = (below: number) => number;

const ELEMENTWISE = Object.entries(FUNCTIONS).filter(([, entry]) => entry.shape === "elementwise");
const REDUCTIONS = ["sum", "prod", "mean", "min", "max", "norm"];
const VECTOR_FUNCTIONS = ["cumsum", "cumprod", "sort"];
const COMPARISONS = ["<", "<=", ">", ">=", "==", "!="];

/** Grows one formula from draws. */
export function growFormula(draw: Draw): string {
  const names: Record<Kind, string[]> = {
    number: ["y", "k", "pi", "e"],
    condition: [],
    vector: ["x", "z", "w"],
  };
  const pick = (list: readonly string[]): string => list[draw(list.length)] ?? "";
  const constant = (): string => pick(["0", "1", "2", "0.5", "-1.5", "3", "1e-3", "12"]);

  const number = (depth: number): string => {
    if (depth === 0)
      return draw(3) === 0 ? constant() : draw(3) > 0 ? pick(names.number) : `x[${1 + draw(LENGTH)}]`;
    switch (draw(10)) {
      case 0:
      case 1:
        return `(${number(depth - 1)} ${pick(["+", "-", "*", "/"])} ${number(depth - 1)})`;
      case 2:
        return `${pick(REDUCTIONS)}(${vector(depth - 1)})`;
      case 3:
        return call(number, depth);
      case 4:
        return `(${condition(depth - 1)} ? ${number(depth - 1)} : ${number(depth - 1)})`;
      case 5:
        return `((${number(depth - 1)})^${pick(["2", "3", "(-1)", "0.5", "5"])})`;
      case 6:
        return `dot(${vector(depth - 1)}, ${vector(depth - 1)})`;
      case 7:
        return `(${vector(depth - 1)})[${pick(["1", "2", "end", "end - 1"])}]`;
      case 8:
        return `max(${number(depth - 1)}, ${number(depth - 1)})`;
      default:
        return `sum(${pick(["diff(", "("])}${vector(depth - 1)})[${pick(["1:3", "2:4", "1:2:3", "4:-1:1"])}])`;
    }
  };
  const condition = (depth: number): string => {
    if (depth === 0 || draw(3) > 0) return `(${number(depth)} ${pick(COMPARISONS)} ${number(depth)})`;
    return draw(2) === 0
      ? `(not ${condition(depth - 1)})`
      : `(${condition(depth - 1)} ${pick(["and", "or"])} ${condition(depth - 1)})`;
  };
  const vector = (depth: number): string => {
    if (depth === 0) return pick(names.vector);
    switch (draw(9)) {
      case 0:
      case 1:
        return `(${vector(depth - 1)} ${pick(["+", "-", ".*", "./"])} ${vector(depth - 1)})`;
      case 2:
        return `(${number(depth - 1)} ${pick(["+", "-", "*"])} ${vector(depth - 1)})`;
      case 3:
        return call(vector, depth);
      case 4:
        return `${pick(VECTOR_FUNCTIONS)}(${vector(depth - 1)})`;
      case 5:
        return `(M * (${vector(depth - 1)}))`;
      case 6:
        return `[${Array.from({ length: LENGTH }, () => number(depth - 1)).join(", ")}]`;
      case 7:
        return `((${vector(depth - 1)}) > ${number(depth - 1)} ? ${vector(depth - 1)} : ${number(depth - 1)})`;
      default:
        return `((${vector(depth - 1)}) .^ ${pick(["2", "3", "(-1)"])})`;
    }
  };
  const call = (argument: (depth: number) => string, depth: number): string => {
    const [name = "", entry] = ELEMENTWISE[draw(ELEMENTWISE.length)] ?? [];
    const args = Array.from({ length: entry?.arguments[0] ?? 1 }, () => argument(depth - 1));
    return `${name}(${args.join(", ")})`;
  };
  const lines: string[] = ["h(p, q) = p * q - p / 3"];
  for (let line = 0; line < draw(4); line++) {
    const isVector = draw(2) === 0;
    lines.push(`v${line} = ${isVector ? vector(2) : number(2)}`);
    names[isVector ? "vector" : "number"].push(`v${line}`);
  }
  lines.push(draw(4) === 0 ? `h(${number(1)}, ${number(2)})` : number(3));
  return lines.join("\n");
}

/** A formula from a list of random integers, so that failing cases shrink. */
export const formulas: fc.Arbitrary<string> = fc
  .array(fc.nat(1_000_000), { minLength: 60, maxLength: 60 })
  .map((numbers) => {
    let next = 0;
    return growFormula((below) => (numbers[next++ % numbers.length] ?? 0) % below);
  });
