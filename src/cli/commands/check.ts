/** `tolerand check PATH…`: what the program understands of a problem file, before anything is run. */
import { formatParameters, formatValue } from "../../findings/format.js";
import { describeFormula, type FormulaDescription } from "../../formula/index.js";
import type { Problem } from "../../problem/contract.js";
import { loadPaths, type LoadedProblem } from "../../problem/load.js";
import { scopeOf } from "../../problem/compile.js";
import { quantityName } from "../../problem/quantity.js";
import { momentsOf } from "../../problem/moments.js";
import type { ResolvedSettings } from "../../problem/settings.js";
import { jsonText } from "../../record/json.js";
import { buildSpec, settingsOf } from "../../study/settings.js";
import { parseSource } from "../../sources/choice.js";
import { prepareProblems } from "../../study/runnable.js";
import { evaluateAt } from "../../study/evaluate-at.js";
import { EXIT, type Arguments, type Io } from "../command.js";
import { asInput, InputError } from "../errors.js";
import { booleanFlag, textFlag, textFlags } from "../read.js";
import { settingsFromFlags } from "../study-flags.js";

interface Checked {
  readonly problem: Problem;
  readonly file: string;
  readonly formula: FormulaDescription;
  readonly settings: ResolvedSettings;
  readonly at: {
    readonly coordinates: readonly number[];
    readonly inputs: readonly number[];
    readonly value: number;
  } | null;
}

export async function run(args: Arguments, io: Io): Promise<number> {
  const flags = settingsFromFlags(args, io);
  const { problems } = await loadPaths(textFlags(args, "paths"), parseSource);
  asInput(() => buildSpec(problems, flags));
  const at = textFlag(args, "at");
  const checked: Checked[] = [];
  for (const loaded of problems) checked.push(await check(loaded, settingsOf(loaded, flags), at));
  if (booleanFlag(args, "json")) io.stdout.write(`${jsonText(checked, 2)}\n`);
  else io.stdout.write(checked.map((one) => words(one, booleanFlag(args, "resolved"))).join("\n"));
  return EXIT.done;
}

async function check(loaded: LoadedProblem, settings: ResolvedSettings, at: string | null): Promise<Checked> {
  const { problem } = loaded;
  const [runnable] = await prepareProblems([problem]);
  const formula = await describeFormula(problem.integrand, scopeOf(problem));
  if (runnable === undefined) throw new Error("a problem was not prepared");
  const coordinates = at === null ? null : coordinatesOf(at, problem);
  const point = coordinates === null ? null : { coordinates, ...evaluateAt(runnable, coordinates) };
  return { problem, file: loaded.document.file, formula, settings, at: point };
}

/** One number stands for all coordinates. */
function coordinatesOf(text: string, problem: Problem): number[] {
  const parts = text.split(",").map((part) => (part.trim() === "" ? Number.NaN : Number(part)));
  const wrong = parts.findIndex((u) => !(u > 0 && u < 1));
  if (wrong >= 0) {
    throw new InputError(
      `--at: expected numbers between 0 and 1 with commas between, found "${text.split(",")[wrong]?.trim()}"`,
    );
  }
  if (parts.length === 1) return Array.from({ length: problem.dimension }, () => parts[0] as number);
  if (parts.length === problem.dimension) return parts;
  throw new InputError(
    `--at: expected one number for all, or ${problem.dimension} numbers for the coordinates of "${problem.id}", found ${parts.length}`,
  );
}

function words(checked: Checked, resolved: boolean): string {
  const { problem, file, formula, settings, at } = checked;
  const shapes = [...formula.names.map(({ name, shape }) => `${name} ${shape}`), `value ${formula.result}`];
  const inputs = problem.inputs.map(
    ({ name, distribution, construction, parameters, length }) =>
      `${name} ${distribution}${construction === undefined ? "" : ` by ${construction}`}${formatParameters(parameters)}${length === null ? "" : ` × ${length}`}`,
  );
  const moments = problem.inputs.map((input) => {
    const { mean, variance, time } = momentsOf(input);
    const when = time === null ? "" : ` at ${time}`;
    return `${input.name}${when} mean ${momentWords(mean)}, variance ${momentWords(variance)}`;
  });
  const { reference, tolerance, inUse } = problem;
  const relative = tolerance.relative === null ? "" : `${tolerance.relative} of ${tolerance.to}`;
  const lines = [
    `${problem.title} (${problem.id}, ${file})`,
    `  inputs      ${inputs.join(", ")}; dimension ${problem.dimension}`,
    ...(problem.dependence === undefined
      ? []
      : [`  dependence  ${problem.dependence.kind} of ${problem.dependence.inputs.join(", ")}`]),
    `  moments     ${moments.slice(0, 12).join("; ")}${moments.length > 12 ? "; …" : ""}`,
    `  constants   ${Object.keys(problem.constants).join(", ") || "none"}`,
    `  formula     ${shapes.join(", ")}`,
    `  quantity    ${quantityName(problem.quantity)}`,
    reference === null
      ? "  reference   none; a consensus of three sound sources will stand in"
      : `  reference   ${reference.value} ± ${reference.uncertainty} (${reference.basis.trim().replaceAll(/\s+/g, " ")})`,
    `  tolerance   ±${tolerance.absolute === null ? relative : formatValue(tolerance.absolute)} at ${tolerance.confidence * 100} %`,
    ...(inUse === null
      ? []
      : [`  in use      ${inUse.source} with ${inUse.points.toLocaleString("en")} points`]),
  ];
  if (resolved) {
    for (const [key, { value, from }] of Object.entries(settings)) {
      lines.push(
        `  ${key.padEnd(11)} ${typeof value === "number" ? value : JSON.stringify(value)} (${from})`,
      );
    }
  }
  if (at !== null)
    lines.push(`  value       ${at.value} at ${shortList(at.coordinates)}, inputs ${shortList(at.inputs)}`);
  return `${lines.join("\n")}\n`;
}

function momentWords(value: number): string {
  if (Number.isNaN(value)) return "none";
  return value === Infinity ? "infinite" : formatValue(value);
}

function shortList(values: readonly number[]): string {
  const shown = values.slice(0, 6).join(", ");
  return `(${shown}${values.length > 6 ? `, … ${values.length} in all` : ""})`;
}
