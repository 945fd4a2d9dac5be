/** The inputs of a file: each a distribution or the path of a process, with its parameters and coordinates. */
import type { Input } from "./contract.js";
import { LIMITS } from "./defaults.js";
import type { Findings } from "./findings.js";
import { wholeFrom } from "./numbers.js";
import type { NumberReader } from "./numbers.js";
import { readParameters, readProcess } from "./parameters.js";
import type { ProblemFile } from "./schema.js";

type InputFile = ProblemFile["inputs"][string];

/** Times of a path at most: principal components take time with their third power, memory with the second. */
const MOST_TIMES = 1024;

async function checkPath(
  name: string,
  { path: id, construction = "increments", length: raw, distribution, ...given }: InputFile,
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

async function checkInput(
  name: string,
  file: InputFile,
  first: number,
  numbers: NumberReader,
  findings: Findings,
): Promise<Input | null> {
  const at = ["inputs", name];
  if (file.path !== undefined) return checkPath(name, file, first, numbers, findings);
  const { distribution, length: raw, construction, path: _path, ...given } = file;
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
