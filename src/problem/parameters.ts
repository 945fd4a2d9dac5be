/** The parameters of an input's distribution: which there are, their numbers, and what they must be together. */
import type { Path } from "./document.js";
import type { Parameter, ParameterValues } from "./distributions/contract.js";
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

/** The parameters that `given` (the keys of an input beside its own) sets, or null after a finding. */
export async function readParameters(
  id: DistributionId,
  given: Readonly<Record<string, Raw | readonly Raw[]>>,
  path: Path,
  numbers: NumberReader,
  findings: Findings,
): Promise<ParameterValues | null> {
  const distribution = distributionOf(id);
  const values: Record<string, number | readonly number[]> = {};
  const known = ["distribution", "length", ...Object.keys(distribution.parameters)];
  let whole = true;
  for (const [key, raw] of Object.entries(given)) {
    const parameter = Object.hasOwn(distribution.parameters, key) ? distribution.parameters[key] : undefined;
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
  for (const [key, parameter] of Object.entries(distribution.parameters)) {
    if (parameter.default !== undefined || Object.hasOwn(given, key)) continue;
    findings.addKey(
      path,
      `${path.join(".")}: ${key} is missing; ${id} needs it: expected ${parameter.list ? "a list, each " : ""}${parameter.what}, or a formula`,
    );
    whole = false;
  }
  if (!whole) return null;
  const defaults = Object.entries(distribution.parameters).map(([key, one]) => [key, one.default]);
  const wrong =
    distribution.check?.({ ...(Object.fromEntries(defaults) as ParameterValues), ...values }) ?? null;
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
