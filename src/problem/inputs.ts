/** The inputs of a file: each a distribution or the path of a process, with its parameters and coordinates. */
import type { Input } from "./contract.js";
import { LIMITS } from "./defaults.js";
import type { Findings } from "./findings.js";
import { wholeFrom } from "./numbers.js";
import type { NumberReader } from "./numbers.js";
import { distributionOf } from "./distributions/registry.js";
import type { DistributionId } from "./distributions/registry.js";
import { readObservations } from "./observations.js";
import { readParameters, readProcess } from "./parameters.js";
import type { ProblemFile } from "./schema.js";

type InputFile = ProblemFile["inputs"][string];

/** Times of a path at most: principal components take time with their third power, memory with the second. */
const MOST_TIMES = 1024;

async function checkPath(
  name: string,
  { path: id, construction = "increments", length: raw, distribution, file, column, ...given }: InputFile,
  first: number,
  numbers: NumberReader,
  findings: Findings,
): Promise<Input | null> {
  const at = ["inputs", name];
  if (id === undefined) return null;
  if (distribution !== undefined) {
    findings.add(at, "expected distribution or path, found both; keep one of them");
    return null;
  }
  if (file !== undefined || column !== undefined) {
    findings.unknownKey([...at, file === undefined ? "column" : "file"], ["path", "length", "construction"]);
    return null;
  }
  const parameters = await readProcess(id, given, at, numbers, findings);
  if (parameters === null) return null;
  const { times } = parameters;
  if ((typeof times === "object") === (raw !== undefined)) {
    const found = raw === undefined ? "neither" : "both";
    findings.add(at, `expected length or times for a path, found ${found}; give one of them`);
    return null;
  }
  const length =
    typeof times === "object"
      ? times.length
      : await numbers.read(raw ?? 1, [...at, "length"], wholeFrom(1, MOST_TIMES));
  if (length === null) return null;
  const own = Object.keys(parameters).length > 0 ? { parameters } : {};
  return { name, distribution: id, construction, ...own, length, first };
}

/** The column that an empirical input names; for any other, `file` and `column` are unknown keys. */
async function observations(
  distribution: DistributionId,
  data: string | undefined,
  column: string | undefined,
  at: readonly string[],
  findings: Findings,
): Promise<number[] | null> {
  if (distribution !== "empirical") {
    const known = ["distribution", "length", ...Object.keys(distributionOf(distribution).parameters)];
    findings.unknownKey([...at, data === undefined ? "column" : "file"], known);
    return null;
  }
  if (data === undefined) {
    findings.addKey(at, `${at.join(".")}: file is missing; a column needs the CSV file that it is in`);
    return null;
  }
  if (findings.document.has([...at, "values"])) {
    findings.add([...at, "values"], "expected values or file, found both; keep one of them");
    return null;
  }
  return readObservations(data, column, at, findings);
}

async function checkInput(
  name: string,
  file: InputFile,
  first: number,
  numbers: NumberReader,
  findings: Findings,
): Promise<Input | null> {
  const at = ["inputs", name];
  if (file.path !== undefined) return checkPath(name, file, first, numbers, findings);
  const { distribution, length: raw, construction, path: _path, file: data, column, ...numbersGiven } = file;
  let given: typeof numbersGiven = numbersGiven;
  if (distribution === undefined) {
    findings.addKey(
      [...at, "distribution"],
      `${at.join(".")}.distribution is missing; expected a distribution such as uniform or normal (\`tolerand distributions\` lists them)`,
    );
    return null;
  }
  if (construction !== undefined) {
    findings.add(
      [...at, "construction"],
      "only a path has a construction; remove it, or write path for distribution",
    );
    return null;
  }
  if (data !== undefined || column !== undefined) {
    const values = await observations(distribution, data, column, at, findings);
    if (values === null) return null;
    given = { ...numbersGiven, values };
  }
  const parameters = await readParameters(distribution, given, at, numbers, findings);
  if (parameters === null) return null;
  let length: number | null = null;
  if (raw !== undefined) {
    length = await numbers.read(raw, [...at, "length"], wholeFrom(1, LIMITS.dimension));
    if (length === null) return null;
  }
  const own = Object.keys(parameters).length > 0 ? { parameters } : {};
  return { name, distribution, ...own, length, first };
}

/** The inputs in order, their coordinates from `before` on; those that cannot be read are reported and left out. */
export async function checkInputs(
  file: ProblemFile["inputs"],
  before: number,
  numbers: NumberReader,
  findings: Findings,
): Promise<Input[]> {
  const inputs: Input[] = [];
  let first = before;
  for (const [name, given] of Object.entries(file)) {
    const input = await checkInput(name, given, first, numbers, findings);
    if (input === null) continue;
    inputs.push(input);
    first += input.length ?? 1;
  }
  if (first > LIMITS.dimension) {
    findings.add(
      ["inputs"],
      `expected at most ${LIMITS.dimension} coordinates in all, found ${first}; shorten them`,
    );
  }
  return inputs;
}
