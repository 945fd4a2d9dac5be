/** The problems that come with the program: folders under `problems/` at the root of the package. */
import { mkdir, readdir, writeFile } from "node:fs/promises";
import { basename, join } from "node:path";
import { fileURLToPath } from "node:url";
import { parseDocument } from "yaml";
import { nearest } from "../numeric/nearest.js";
import { parseYaml, readText } from "./document.js";
import { fileError } from "./errors.js";
import { plainNumber } from "./evaluate.js";
import { problemSchema, suiteSchema } from "./schema.js";

const ROOT = fileURLToPath(new URL("../../problems/", import.meta.url));
export const SUITE_FILE = "suite.yaml";

/** A shipped problem as a listing shows it, read without evaluating anything. */
interface CatalogueEntry {
  /** suite/problem, as commands take it. */
  readonly name: string;
  readonly id: string;
  readonly title: string;
  readonly dimension: number;
  /** Distributions of its inputs, each once. */
  readonly distributions: readonly string[];
  /** Where the reference comes from; null where a consensus stands in. */
  readonly basis: string | null;
  readonly inUse: boolean;
}

export interface CatalogueSuite {
  readonly name: string;
  readonly title: string;
  readonly about: string;
  readonly problems: readonly CatalogueEntry[];
}

/** The folder of a shipped suite. */
export function shippedFolder(suite: string): string {
  return join(ROOT, suite);
}

/** Names of the shipped suites, sorted. */
export async function shippedSuites(): Promise<string[]> {
  const entries = await readdir(ROOT, { withFileTypes: true });
  return entries
    .filter((entry) => entry.isDirectory())
    .map((entry) => entry.name)
    .sort();
}

async function problemNames(suite: string): Promise<string[]> {
  const files = await readdir(shippedFolder(suite));
  const names = files.filter((file) => file.endsWith(".yaml") && file !== SUITE_FILE);
  return names.map((file) => `${suite}/${basename(file, ".yaml")}`).sort();
}

/** The file of a shipped problem that is named as suite/problem, or null. */
export async function shippedProblemFile(name: string): Promise<string | null> {
  const suite = name.split("/")[0] ?? "";
  if (!(await shippedSuites()).includes(suite)) return null;
  return (await problemNames(suite)).includes(name) ? join(ROOT, `${name}.yaml`) : null;
}

async function entryOf(name: string): Promise<CatalogueEntry> {
  const path = join(ROOT, `${name}.yaml`);
  const file = problemSchema.parse(parseYaml(path, await readText(path)).value);
  const id = basename(name);
  let dimension = file.dependence?.factor === undefined ? 0 : 1;
  for (const { length: given, times } of Object.values(file.inputs)) {
    const length = given ?? (Array.isArray(times) ? times.length : 1);
    dimension += typeof length === "number" ? length : (plainNumber(length) ?? NaN);
  }
  return {
    name,
    id,
    title: file.title ?? id,
    dimension,
    distributions: [
      ...new Set(Object.values(file.inputs).map(({ distribution, path }) => distribution ?? path ?? "")),
    ],
    basis: file.reference?.basis.trim() ?? null,
    inUse: file.inUse !== undefined,
  };
}

async function suiteFile(
  suite: string,
): Promise<{ text: string; taken: string[]; title: string; about: string }> {
  const path = join(shippedFolder(suite), SUITE_FILE);
  const text = await readText(path);
  const { problems, title, about } = suiteSchema.parse(parseYaml(path, text).value);
  return { text, taken: problems ?? [], title: title ?? suite, about: about?.trim() ?? "" };
}

/** The shipped suites and their problems, for `tolerand problems`. Quick: formulas are not evaluated. */
export async function listProblems(): Promise<CatalogueSuite[]> {
  const suites: CatalogueSuite[] = [];
  for (const name of await shippedSuites()) {
    const { taken, title, about } = await suiteFile(name);
    const problems: CatalogueEntry[] = [];
    for (const entry of [...(await problemNames(name)), ...taken]) problems.push(await entryOf(entry));
    suites.push({ name, title, about, problems });
  }
  return suites;
}

/**
 * Copies a shipped suite into `target`, a folder that does not exist yet; problems that the suite takes in from others
 * become files of the copy. Returns the files written. Throws ProblemError for an unknown suite or an existing target.
 */
export async function copySuite(suite: string, target: string): Promise<string[]> {
  const suites = await shippedSuites();
  if (!suites.includes(suite)) {
    const guess = nearest(suite, suites);
    const hint = guess === null ? "" : `; did you mean "${guess}"?`;
    throw fileError(suite, `no shipped suite of that name; shipped suites: ${suites.join(", ")}${hint}`);
  }
  const { text, taken } = await suiteFile(suite);
  const settings = parseDocument(text);
  settings.delete("problems");
  const files = new Map([[SUITE_FILE, settings.toString({ lineWidth: 120 })]]);
  for (const name of [...(await problemNames(suite)), ...taken]) {
    files.set(`${basename(name)}.yaml`, await readText(join(ROOT, `${name}.yaml`)));
  }
  try {
    await mkdir(target);
  } catch (error) {
    const code = error instanceof Error && "code" in error ? String(error.code) : "unknown error";
    const why = code === "EEXIST" ? "exists already and is not overwritten" : `cannot be made (${code})`;
    throw fileError(target, `${why}; name a folder that does not exist yet, in one that does`);
  }
  const written: string[] = [];
  for (const [file, content] of files) {
    const path = join(target, file);
    await writeFile(path, content, { flag: "wx" });
    written.push(path);
  }
  return written;
}
