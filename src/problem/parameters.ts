/** The parameters of an input's distribution: which there are, their numbers, and what they must be together. */
import type { Path } from "./document.js";
import type { Parameter, ParameterValues } from "./distributions/contract.js";
import { processOf, TIMES } from "./gaussian/paths.js";
import type { ProcessId } from "./gaussian/paths.js";
import { distributionOf, lawOf } from "./distributions/registry.js";
import type { DistributionId } from "./distributions/registry.js";
import { show } from "./errors.js";
import type { Findings } from "./findings.js";
import type { NumberReader, Raw } from "./numbers.js";

async function readList(
  raw: readonly Raw[],
  path: Path,
  parameter: Parameter,
  numbers: NumberReader,
): Promise<number[] | null> {
  const list: number[] = [];
  for (const [i, item] of raw.entries()) {
    const value = await numbers.read(item, [...path, i], parameter);
    if (value !== null) list.push(value);
  }
  return list.length === raw.length ? list : null;
}

/** What the reading of parameters needs to know of a distribution or a process. */
interface Owner {
  readonly id: string;
  readonly keys: readonly string[];
  readonly parameters: Readonly<Record<string, Parameter>>;
}

type Given = Readonly<Record<string, Raw | readonly Raw[]>>;

async function readValues(
  { id, keys, parameters }: Owner,
  given: Given,
  path: Path,
  numbers: NumberReader,
  findings: Findings,
): Promise<Record<string, number | readonly number[]> | null> {
  const values: Record<string, number | readonly number[]> = {};
  const known = [...keys, ...Object.keys(parameters)];
  let whole = true;
  for (const [key, raw] of Object.entries(given)) {
    const parameter = Object.hasOwn(parameters, key) ? parameters[key] : undefined;
    if (parameter === undefined) {
      findings.unknownKey([...path, key], known);
      whole = false;
    } else if (parameter.list) {
      const list = typeof raw === "object" ? await readList(raw, [...path, key], parameter, numbers) : null;
      if (list !== null) values[key] = list;
      else whole = false;
      if (typeof raw !== "object")
        findings.add([...path, key], `expected a list of numbers, found ${show(raw)}`);
    } else if (typeof raw === "object") {
      findings.add([...path, key], `expected ${parameter.what}, found ${show(raw)}`);
      whole = false;
    } else {
      const value = await numbers.read(raw, [...path, key], parameter);
      if (value === null) whole = false;
      else values[key] = value;
    }
  }
  for (const [key, parameter] of Object.entries(parameters)) {
    if (parameter.default !== undefined || key === "times" || Object.hasOwn(given, key)) continue;
    const expected = `${parameter.list ? "a list, each " : ""}${parameter.what}`;
    findings.addKey(
      path,
      `${path.join(".")}: ${key} is missing; ${id} needs it: expected ${expected}, or a formula`,
    );
    whole = false;
  }
  return whole ? values : null;
}

/** The parameters that `given` (the keys of an input beside its own) sets, or null after a finding. */
export async function readParameters(
  id: DistributionId,
  given: Given,
  path: Path,
  numbers: NumberReader,
  findings: Findings,
): Promise<ParameterValues | null> {
  const { parameters, check } = distributionOf(id);
  const owner = { id, keys: ["distribution", "length"], parameters };
  const values = await readValues(owner, given, path, numbers, findings);
  if (values === null) return null;
  const defaults = Object.entries(parameters).map(([key, one]) => [key, one.default]);
  const wrong = check?.({ ...(Object.fromEntries(defaults) as ParameterValues), ...values }) ?? null;
  if (wrong !== null) {
    findings.add(path, wrong);
    return null;
  }
  try {
    lawOf(id, values).passes();
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    findings.add(path, `${error.message}; take other parameters`);
    return null;
  }
  return values;
}

/** The parameters of a path, `times` among them, or null after a finding. */
export async function readProcess(
  id: ProcessId,
  given: Given,
  path: Path,
  numbers: NumberReader,
  findings: Findings,
): Promise<ParameterValues | null> {
  const parameters = { ...processOf(id).parameters, times: TIMES };
  const owner = { id, keys: ["path", "length", "construction"], parameters };
  const values = await readValues(owner, given, path, numbers, findings);
  const times = values?.["times"];
  if (typeof times === "object" && times.some((t, i) => i > 0 && !(t > (times[i - 1] ?? 0)))) {
    findings.add([...path, "times"], "expected times in ascending order, each once; sort them");
    return null;
  }
  if (times !== undefined && Object.hasOwn(given, "until")) {
    findings.add([...path, "until"], "expected times or until, found both; keep one of them");
    return null;
  }
  return values;
}
