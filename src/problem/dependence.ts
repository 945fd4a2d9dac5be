/** The `dependence` of a problem file: which inputs hang together, how strongly, and by which construction. */
import type { Dependence, Input } from "./contract.js";
import type { Path } from "./document.js";
import { isProcess } from "./gaussian/paths.js";
import { show } from "./errors.js";
import type { Findings } from "./findings.js";
import { LEAST_EIGENVALUE, nearestCorrelation, spectrumOf } from "./gaussian/matrices.js";
import type { NumberReader, Range, Raw } from "./numbers.js";
import type { ProblemFile } from "./schema.js";

type DependenceFile = NonNullable<ProblemFile["dependence"]>;

const CORRELATION: Range = { what: "a correlation from -1 to 1", holds: (x) => x >= -1 && x <= 1 };
const SHARE: Range = { what: "a number of 0 or more and below 1", holds: (x) => x >= 0 && x < 1 };

/** Components that a full correlation matrix may have: its work grows with the square. */
export const MOST_COMPONENTS = 512;
/** Rows of a nearest matrix that a message prints. */
const SHOWN_ROWS = 6;

/** What is said of an input that is not there. */
function membersOf(
  names: readonly string[] | undefined,
  inputs: readonly Input[],
  findings: Findings,
): Input[] | null {
  const members: Input[] = [];
  for (const [i, name] of (names ?? inputs.map((one) => one.name)).entries()) {
    const found = inputs.find((one) => one.name === name);
    const path = ["dependence", "inputs", i];
    if (found === undefined) {
      findings.add(
        path,
        `expected the name of an input (${inputs.map((one) => one.name).join(", ")}), found ${show(name)}`,
      );
    } else if (members.includes(found)) findings.add(path, `${show(name)} is given twice; keep one of them`);
    else members.push(found);
  }
  return members.length === (names ?? inputs).length ? members : null;
}

const componentsOf = (members: readonly Input[]): number =>
  members.reduce((sum, { length }) => sum + (length ?? 1), 0);

/** Sizes that a matrix (or list) may have: all components; or the inputs, where they are of one length. */
function sizesOf(members: readonly Input[]): { size: number; words: string }[] {
  const total = componentsOf(members);
  const equal = members.every(({ length }) => length === members[0]?.length);
  const paths = members.some(({ distribution }) => isProcess(distribution));
  const byInput = { size: members.length, words: `${members.length} (inputs, index by index)` };
  if (paths) return equal ? [byInput] : [];
  const all = { size: total, words: `${total} (all components)` };
  return equal && members.length > 1 && total !== members.length ? [all, byInput] : [all];
}

async function readMatrix(
  raw: Exclude<DependenceFile["correlation"], undefined>,
  sizes: readonly number[],
  numbers: NumberReader,
): Promise<number[][] | null> {
  const path: Path = ["dependence", "correlation"];
  if (typeof raw === "string" && Object.hasOwn(numbers.constants, raw)) {
    const constant = numbers.constants[raw];
    if (Array.isArray(constant) && Array.isArray(constant[0])) {
      return (constant as readonly (readonly number[])[]).map((row) => [...row]);
    }
  }
  if (!Array.isArray(raw)) {
    const value = await numbers.read(raw, path, CORRELATION);
    const size = sizes[0] ?? 0;
    if (value === null) return null;
    return Array.from({ length: size }, (_, i) =>
      Array.from({ length: size }, (__, j) => (i === j ? 1 : value)),
    );
  }
  const rows: number[][] = [];
  let whole = true;
  for (const [i, row] of (raw as readonly (readonly Raw[])[]).entries()) {
    const values: number[] = [];
    for (const [j, item] of row.entries()) {
      const value = await numbers.read(item, [...path, i, j], CORRELATION);
      if (value === null) whole = false;
      else values.push(value);
    }
    rows.push(values);
  }
  return whole ? rows : null;
}

/** What is wrong with a matrix as a correlation matrix, in words; null if nothing is. */
export function correlationFault(
  matrix: readonly (readonly number[])[],
  sizes: readonly { size: number; words: string }[],
): string | null {
  const size = matrix.length;
  if (!sizes.some((one) => one.size === size) || matrix.some((row) => row.length !== size)) {
    return `expected a square matrix of size ${sizes.map((one) => one.words).join(" or ")}, found ${size} rows of ${matrix[0]?.length ?? 0}`;
  }
  for (let i = 0; i < size; i++) {
    if (matrix[i]?.[i] !== 1) return `expected 1 on the diagonal, found ${matrix[i]?.[i]} in row ${i + 1}`;
    for (let j = 0; j < i; j++) {
      const [a, b] = [matrix[i]?.[j] ?? Number.NaN, matrix[j]?.[i] ?? Number.NaN];
      if (!(Math.abs(a) <= 1)) return `expected correlations from -1 to 1, found ${a} in row ${i + 1}`;
      if (!(Math.abs(a - b) <= 1e-12))
        return `expected a symmetric matrix, found ${a} and ${b} in rows ${i + 1} and ${j + 1}`;
    }
  }
  const least = spectrumOf(matrix).values.at(-1) ?? 0;
  if (least > LEAST_EIGENVALUE) return null;
  const near = nearestCorrelation(matrix);
  const text =
    size > SHOWN_ROWS
      ? "or bring correlations nearer to 0"
      : `the nearest valid one is [${near.map((row) => `[${row.map((x) => Number(x.toFixed(4))).join(", ")}]`).join(", ")}]`;
  return `not a correlation matrix: its smallest eigenvalue is ${least.toPrecision(3)}, and all must be above 0; ${text}`;
}

/** The dependence of a file, or null after a finding. */
export async function checkDependence(
  file: DependenceFile,
  inputs: readonly Input[],
  numbers: NumberReader,
  findings: Findings,
): Promise<Dependence | null> {
  const path = ["dependence"];
  const members = membersOf(file.inputs, inputs, findings);
  if (members === null) return null;
  const names = members.map(({ name }) => name);
  if ((file.correlation === undefined) === (file.factor === undefined)) {
    const found = file.factor === undefined ? "neither" : "both";
    findings.add(path, `expected correlation or factor, found ${found}; give one of them`);
    return null;
  }
  if (
    members.some(({ distribution, construction }) => isProcess(distribution) !== (construction !== undefined))
  )
    return null;
  const paths = members.filter(({ distribution }) => isProcess(distribution)).length;
  if (paths > 0 && paths < members.length) {
    findings.add(
      path,
      "expected paths only or no paths, found both; name the inputs that hang together in `inputs`",
    );
    return null;
  }
  const sizes = sizesOf(members);
  if (sizes.length === 0) {
    findings.add(path, "expected paths of one length, found several; give them the same number of times");
    return null;
  }
  if (file.factor !== undefined) {
    if (paths > 0) {
      findings.add([...path, "factor"], "paths take a correlation, not a factor; write correlation instead");
      return null;
    }
    return factorOf(file.factor, members, numbers, findings);
  }
  if (file.correlation === undefined) return null;
  const correlation = await readMatrix(
    file.correlation,
    sizes.map(({ size }) => size),
    numbers,
  );
  if (correlation === null) return null;
  if (correlation.length > MOST_COMPONENTS) {
    findings.add(
      path,
      `expected at most ${MOST_COMPONENTS} components, found ${correlation.length}; take a factor`,
    );
    return null;
  }
  const fault = correlationFault(correlation, sizes);
  if (fault !== null) {
    findings.add([...path, "correlation"], fault);
    return null;
  }
  return { inputs: names, kind: file.construction ?? "cholesky", correlation };
}

async function factorOf(
  raw: Exclude<DependenceFile["factor"], undefined>,
  members: readonly Input[],
  numbers: NumberReader,
  findings: Findings,
): Promise<Dependence | null> {
  const path = ["dependence", "factor"];
  const size = componentsOf(members);
  const list = Array.isArray(raw) ? (raw as readonly Raw[]) : null;
  if (list !== null && list.length !== size) {
    findings.add(path, `expected one number, or ${size} for the components, found ${list.length}`);
    return null;
  }
  const shares: number[] = [];
  for (const [i, item] of (list ?? [raw as Raw]).entries()) {
    const value = await numbers.read(item, list === null ? path : [...path, i], SHARE);
    if (value === null) return null;
    shares.push(value);
  }
  return {
    inputs: members.map(({ name }) => name),
    kind: "one-factor",
    shares: list === null ? Array.from({ length: size }, () => shares[0] ?? 0) : shares,
  };
}
