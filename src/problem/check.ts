/**
 * From a file's data to a Problem: the form by the schema, the meaning by the rules here. Every part is checked on its
 * own, so that one wrong key does not hide the next.
 */
import { z } from "zod";
import { FormulaError } from "../formula/contract.js";
import type { FormulaScope } from "../formula/contract.js";
import { FUNCTIONS, NAMED_NUMBERS, RESERVED_WORDS, compileFormula } from "../formula/index.js";
import { componentsOf } from "./compile.js";
import type { Declared, InUse, Problem, Quantity, Reference, SuiteTotal, Tolerance } from "./contract.js";
import { DEFAULT_CONFIDENCE, LIMITS } from "./defaults.js";
import { checkDependence } from "./dependence.js";
import { checkInputs } from "./inputs.js";
import type { YamlDocument } from "./document.js";
import { ProblemError, show } from "./errors.js";
import { Findings } from "./findings.js";
import { FINITE, NOT_NEGATIVE, NumberReader, POSITIVE, readConstants, wholeFrom } from "./numbers.js";
import type { Constants, Range } from "./numbers.js";
import { quantityForm, quantityName } from "./quantity.js";
import { problemSchema, suiteSchema } from "./schema.js";
import type { ProblemFile, SuiteFile } from "./schema.js";
import { checkSource, checkStudy } from "./study.js";
import type { SourceCheck } from "./study.js";

/** Names with a meaning of their own. Those of plain objects are among them: data keyed by name would find them. */
const TAKEN = new Map<string, string>([
  ...Object.getOwnPropertyNames(Object.prototype).map((name) => [name, "is reserved"] as const),
  ...Object.keys(NAMED_NUMBERS).map((name) => [name, "is a number of the formula language"] as const),
  ...Object.keys(FUNCTIONS).map((name) => [name, "is a function of the formula language"] as const),
  ...RESERVED_WORDS.map((name) => [name, "is a word of the formula language"] as const),
]);

const CONFIDENCE: Range = {
  what: "a confidence above 0.5 and below 1, such as 0.99",
  holds: (x) => x > 0.5 && x < 1,
};

/** The parts of a file that have the right form; the others are reported and left out. */
function parts<S extends z.ZodRawShape>(
  schema: z.ZodObject<S>,
  findings: Findings,
): Partial<z.infer<z.ZodObject<S>>> {
  const { value } = findings.document;
  const result: Record<string, unknown> = {};
  const given = value === null || typeof value !== "object" || Array.isArray(value) ? null : { ...value };
  if (given === null) {
    const keys = Object.keys(schema.shape).join(", ");
    findings.addKey([], `expected a mapping with the keys ${keys}; found ${show(value)}`);
    return {};
  }
  for (const key of Object.keys(given)) {
    if (!Object.hasOwn(schema.shape, key)) findings.unknownKey([key], Object.keys(schema.shape));
  }
  for (const key of Object.keys(schema.shape)) {
    const read = z.safeParse(schema.shape[key] as z.ZodType, (given as Record<string, unknown>)[key]);
    if (!read.success) findings.addSchema(read.error, [key], schema);
    else if (read.data !== undefined) result[key] = read.data;
  }
  return result as Partial<z.infer<z.ZodObject<S>>>;
}

function checkNames(names: readonly string[], section: string, others: Constants, findings: Findings): void {
  for (const name of names) {
    const taken = TAKEN.get(name);
    if (taken !== undefined) findings.addKey([section, name], `the name "${name}" ${taken}; take another`);
    else if (Object.hasOwn(others, name)) {
      findings.addKey([section, name], `"${name}" is an input and a constant; give one of them another name`);
    }
  }
}

async function checkReference(
  file: NonNullable<ProblemFile["reference"]>,
  numbers: NumberReader,
  findings: Findings,
): Promise<Reference | null> {
  const value = await numbers.read(file.value, ["reference", "value"], FINITE);
  const uncertainty = await numbers.read(file.uncertainty ?? 0, ["reference", "uncertainty"], NOT_NEGATIVE);
  if (value === null || uncertainty === null) return null;
  const text = findings.document.source(["reference", "value"]) ?? String(file.value);
  return { value, text: text.trim(), uncertainty, basis: file.basis.trim() };
}

async function checkTolerance(
  file: ProblemFile["tolerance"],
  reference: number | "later" | null,
  numbers: NumberReader,
  findings: Findings,
): Promise<Tolerance | null> {
  const path = ["tolerance"];
  const to = file.to ?? "reference";
  const confidence = await numbers.read(
    file.confidence ?? DEFAULT_CONFIDENCE,
    [...path, "confidence"],
    CONFIDENCE,
  );
  if (file.absolute !== undefined && file.relative !== undefined) {
    findings.add(path, "expected absolute or relative, found both; keep one of them");
    return null;
  }
  if (file.absolute !== undefined) {
    if (file.to !== undefined) {
      findings.add(
        [...path, "to"],
        'only a relative tolerance has "to"; remove it, or write relative for absolute',
      );
    }
    const absolute = await numbers.read(file.absolute, [...path, "absolute"], POSITIVE);
    return absolute === null || confidence === null ? null : { absolute, relative: null, to, confidence };
  }
  if (file.relative === undefined) {
    findings.add(path, "expected absolute or relative, found neither; add one such as absolute: 0.01");
    return null;
  }
  const relative = await numbers.read(file.relative, [...path, "relative"], POSITIVE);
  const unit = to === "reference" ? reference : numbers.constants[to];
  if (to !== "reference" && typeof unit !== "number") {
    const names = Object.entries(numbers.constants).filter(([, value]) => typeof value === "number");
    const known = ["reference", ...names.map(([name]) => name)].join(", ");
    findings.add(
      [...path, "to"],
      `expected reference or a constant that is a number (${known}), found ${show(to)}`,
    );
    return null;
  }
  if (unit === 0) {
    const what = to === "reference" ? "the reference" : `the constant ${to}`;
    findings.add(
      path,
      `a tolerance relative to ${what} has no size, as its value is 0; write an absolute one`,
    );
    return null;
  }
  if (relative === null || confidence === null) return null;
  return { absolute: typeof unit === "number" ? relative * Math.abs(unit) : null, relative, to, confidence };
}

async function checkDeclared(
  file: NonNullable<ProblemFile["declared"]>,
  numbers: NumberReader,
  findings: Findings,
): Promise<Declared[]> {
  const declared: Declared[] = [];
  for (const [i, item] of file.entries()) {
    const path = ["declared", i];
    const kind = item.bias === undefined ? "random" : "bias";
    const raw = item.bias ?? item.deviation;
    if (raw === undefined || (item.bias !== undefined && item.deviation !== undefined)) {
      findings.add(
        path,
        `expected bias or deviation, found ${raw === undefined ? "neither" : "both"}; give one of them`,
      );
      continue;
    }
    const value = await numbers.read(raw, [...path, kind === "bias" ? "bias" : "deviation"], NOT_NEGATIVE);
    if (value !== null) declared.push({ line: item.line, kind, value, basis: item.basis });
  }
  return declared;
}

async function checkInUse(
  file: NonNullable<ProblemFile["inUse"]>,
  numbers: NumberReader,
): Promise<InUse | null> {
  const points = await numbers.read(file.points, ["inUse", "points"], wholeFrom(2, LIMITS.points, "2^40"));
  const seconds = file.secondsPerPoint;
  const secondsPerPoint =
    seconds === undefined ? null : await numbers.read(seconds, ["inUse", "secondsPerPoint"], POSITIVE);
  return points === null ? null : { source: file.source, points, secondsPerPoint };
}

const LEVEL: Range = { what: "a level between 0 and 1", holds: (x) => x > 0 && x < 1 };

async function checkQuantity(
  file: NonNullable<ProblemFile["quantity"]>,
  numbers: NumberReader,
): Promise<Quantity | null> {
  if (typeof file === "string") return file;
  const [name, raw] =
    "quantile" in file ? (["quantile", file.quantile] as const) : (["shortfall", file.shortfall] as const);
  const level = await numbers.read(raw, ["quantity", name], LEVEL);
  if (level === null) return null;
  return name === "quantile" ? { quantile: level } : { shortfall: level };
}

async function checkIntegrand(
  text: string,
  scope: FormulaScope,
  quantity: Quantity,
  findings: Findings,
): Promise<void> {
  if (text === "") return;
  try {
    const { indicator } = await compileFormula(text, scope, componentsOf(quantity));
    const { integrand, sorted } = quantityForm(quantity);
    const name = quantityName(quantity);
    if (integrand === "condition" && !indicator) {
      findings.add(
        ["quantity"],
        `a ${name} needs an integrand that is a condition, such as x > 1, found one that gives a number; write the condition, or ask for its mean`,
      );
    } else if (sorted && indicator) {
      findings.add(
        ["quantity"],
        `the integrand is a condition, whose only values are 0 and 1, and has no ${name}; ask for its probability`,
      );
    }
  } catch (error) {
    if (!(error instanceof FormulaError)) throw error;
    findings.addFormula(["integrand"], error);
  }
}

const anySource: SourceCheck = () => undefined;

/** The problem in a file. Throws ProblemError with every finding. */
export async function checkProblem(
  document: YamlDocument,
  id: string,
  check: SourceCheck = anySource,
): Promise<Problem> {
  const findings = new Findings(document);
  const file = parts(problemSchema, findings);
  const numbers = new NumberReader(findings);
  const misshapen = findings.issues.length;
  const names = Object.keys(file.constants ?? {});
  checkNames(names, "constants", {}, findings);
  const malformed = file.constants === undefined && document.has(["constants"]);
  numbers.formulas = !malformed && !names.some((name) => TAKEN.has(name));
  const constants = await readConstants(file.constants, numbers, findings);
  checkNames(Object.keys(file.inputs ?? {}), "inputs", constants, findings);
  const before = file.dependence?.factor === undefined ? 0 : 1;
  const inputs = await checkInputs(file.inputs ?? {}, before, numbers, findings);
  const dependence =
    file.dependence === undefined || inputs.length < Object.keys(file.inputs ?? {}).length
      ? null
      : await checkDependence(file.dependence, inputs, numbers, findings);
  const quantity = await checkQuantity(file.quantity ?? "mean", numbers);
  // A formula whose names are broken would only repeat that.
  if (inputs.length > 0 && !malformed && findings.issues.length === misshapen) {
    await checkIntegrand(file.integrand ?? "", { inputs, constants }, quantity ?? "mean", findings);
  }
  const reference =
    file.reference === undefined ? null : await checkReference(file.reference, numbers, findings);
  const unit = reference?.value ?? "later";
  const tolerance =
    file.tolerance === undefined ? null : await checkTolerance(file.tolerance, unit, numbers, findings);
  const declared = await checkDeclared(file.declared ?? [], numbers, findings);
  const inUse = file.inUse === undefined ? null : await checkInUse(file.inUse, numbers);
  if (file.inUse !== undefined) checkSource(file.inUse.source, ["inUse", "source"], check, findings);
  const study = await checkStudy(file.study ?? {}, numbers, check, findings);
  if (findings.issues.length > 0 || tolerance === null || file.integrand === undefined) {
    throw new ProblemError(findings.inOrder());
  }
  const last = inputs.at(-1);
  return {
    id,
    title: file.title ?? id,
    about: file.about?.trim() ?? "",
    dimension: last === undefined ? 0 : last.first + (last.length ?? 1),
    inputs,
    ...(dependence === null ? {} : { dependence }),
    constants,
    integrand: file.integrand,
    quantity: quantity ?? "mean",
    reference,
    tolerance,
    ...(declared.length > 0 ? { declared } : {}),
    inUse,
    study,
  };
}

const WEIGHT: Range = { what: "a number other than 0", holds: (x) => x !== 0 };

async function checkTotal(
  file: NonNullable<SuiteFile["total"]>,
  numbers: NumberReader,
): Promise<SuiteTotal | null> {
  const weights: Record<string, number> = {};
  for (const [problem, raw] of Object.entries(file.weights)) {
    const weight = await numbers.read(raw, ["total", "weights", problem], WEIGHT);
    if (weight !== null) weights[problem] = weight;
  }
  const path = ["total", "tolerance"];
  const tolerance = await numbers.read(file.tolerance.absolute, [...path, "absolute"], POSITIVE);
  const asked = file.tolerance.confidence ?? DEFAULT_CONFIDENCE;
  const confidence = await numbers.read(asked, [...path, "confidence"], CONFIDENCE);
  return tolerance === null || confidence === null ? null : { weights, tolerance, confidence };
}

/** The settings in a `suite.yaml`. Throws ProblemError with every finding. */
export async function checkSuite(
  document: YamlDocument,
  check: SourceCheck = anySource,
): Promise<Omit<SuiteFile, "study" | "total"> & { study: Problem["study"]; total: SuiteTotal | null }> {
  const findings = new Findings(document);
  const { study, total, ...rest } = parts(suiteSchema, findings);
  const numbers = new NumberReader(findings);
  const settings = await checkStudy(study ?? {}, numbers, check, findings);
  const sum = total === undefined ? null : await checkTotal(total, numbers);
  if (findings.issues.length > 0) throw new ProblemError(findings.inOrder());
  return { ...rest, study: settings, total: sum };
}
