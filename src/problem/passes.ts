/**
 * The passes that turn the uniform coordinates of a block into inputs: first everything that begins as a normal, in one
 * pass where rows are neighbours; then dependence; then what is left of each input by its own distribution or process.
 */
import { logarithm, fromNumber } from "../numeric/double-double.js";
import { packSteps } from "../numeric/linear-steps.js";
import type { LinearStep } from "../numeric/linear-steps.js";
import type { Dependence, Input, Problem, Transform } from "./contract.js";
import { CLOSED } from "./distributions/contract.js";
import { numberAt, closed } from "./distributions/parts.js";
import { lawOf } from "./distributions/registry.js";
import { pathSteps } from "./gaussian/constructions.js";
import { choleskyFactor, principalFactor } from "./gaussian/matrices.js";
import { isProcess, processOf, processValues, timesOf } from "./gaussian/paths.js";

const rowsOf = ({ length }: Input): number => length ?? 1;

function linear(steps: readonly LinearStep[]): Transform[] {
  return steps.length === 0 ? [] : [{ kind: "linear", table: packSteps(steps), first: 0, rows: 0 }];
}

/** The rows that a dependence mixes together: all components at once, or index by index. */
function groupsOf(members: readonly Input[], size: number): number[][] {
  const all = members.flatMap((input) => Array.from({ length: rowsOf(input) }, (_, k) => input.first + k));
  if (size === all.length) return [all];
  const length = members[0]?.length ?? 1;
  return Array.from({ length }, (_, k) => members.map(({ first }) => first + k));
}

function dependenceSteps(dependence: Dependence, members: readonly Input[]): LinearStep[] {
  if (dependence.kind === "one-factor") {
    const [rows = []] = groupsOf(members, dependence.shares.length);
    return rows.map((row, i) => {
      const share = dependence.shares[i] ?? 0;
      return {
        row,
        constant: 0,
        terms: [
          [Math.sqrt(share), { row: FACTOR_ROW }],
          [Math.sqrt(1 - share), { row }],
        ],
      };
    });
  }
  const { correlation, kind } = dependence;
  const factor = kind === "cholesky" ? choleskyFactor(correlation) : principalFactor(correlation);
  return groupsOf(members, correlation.length).flatMap((rows) =>
    rows.map((row, i) => ({
      row,
      constant: 0,
      terms: (factor[i] ?? [])
        .map((coefficient, j) => [coefficient, { row: rows[j] ?? 0 }] as const)
        .filter(([coefficient]) => coefficient !== 0),
    })),
  );
}

/** The common factor has the first coordinate, before all inputs. */
const FACTOR_ROW = 0;

/** A path from its normals. */
function pathTransforms(input: Input): Transform[] {
  const { distribution, parameters, construction = "increments", first } = input;
  if (!isProcess(distribution)) return [];
  const process = processOf(distribution);
  const values = processValues(distribution, parameters);
  const rows = rowsOf(input);
  const { mean, covariance } = process.gaussian(values, timesOf(values, rows));
  const steps = linear(pathSteps(construction, mean, covariance, first));
  if (!process.exponential) return steps;
  const start = logarithm(fromNumber(numberAt(values, "start"))).high;
  return [...steps, { ...closed(CLOSED.exponentialOfNormal, start, 1), first, rows }];
}

/** See the top of the file. */
export function transformsOf(problem: Pick<Problem, "inputs" | "dependence">): Transform[] {
  const { inputs, dependence } = problem;
  const members = new Set(dependence?.inputs);
  const normals: Transform[] = [];
  const others: Transform[] = [];
  const normal = (first: number, rows: number): void => {
    const before = normals.at(-1);
    if (before !== undefined && before.first + before.rows === first) {
      normals[normals.length - 1] = { ...before, rows: before.rows + rows };
    } else normals.push({ kind: "normal", first, rows });
  };
  if (dependence?.kind === "one-factor") normal(FACTOR_ROW, 1);
  for (const input of inputs) {
    const { distribution, first } = input;
    const rows = rowsOf(input);
    if (isProcess(distribution)) {
      normal(first, rows);
      others.push(...pathTransforms(input));
      continue;
    }
    const passes = lawOf(distribution, input.parameters).passes();
    const begins = passes[0]?.kind === "normal";
    if (begins || members.has(input.name)) normal(first, rows);
    // a member that is no normal goes back to a uniform by the distribution function, and on by its own quantile
    if (!begins && members.has(input.name)) others.push({ ...closed(CLOSED.normalCdf, 0, 1), first, rows });
    for (const pass of passes) if (pass.kind !== "normal") others.push({ ...pass, first, rows });
  }
  if (dependence === undefined) return [...normals, ...others];
  const together = dependence.inputs.flatMap((name) => inputs.filter((input) => input.name === name));
  return [...normals, ...linear(dependenceSteps(dependence, together)), ...others];
}
