/** From paths and names to problems: files, folders (suites), and the suites that come with the program. */
import { readdir, stat } from "node:fs/promises";
import { basename, dirname, extname, join, resolve } from "node:path";
import { nearest } from "../numeric/nearest.js";
import { SUITE_FILE, shippedFolder, shippedProblemFile, shippedSuites } from "./catalogue.js";
import { checkProblem, checkSuite } from "./check.js";
import type { Problem, StudySettings, SuiteTotal } from "./contract.js";
import { parseYaml, readText } from "./document.js";
import { placeDraws } from "./draws-folder.js";
import type { YamlDocument } from "./document.js";
import { ProblemError, fileError } from "./errors.js";
import type { ProblemIssue } from "./errors.js";
import type { SourceCheck } from "./study.js";

const EXTENSIONS = new Set([".yaml", ".yml"]);
/** Problem ids become names of files and keys of records. */
const ID = /^[A-Za-z0-9][A-Za-z0-9._-]{0,99}$/;

/** A folder of problem files and what its suite.yaml says. */
export interface Suite {
  /** Name of the folder. */
  readonly name: string;
  readonly folder: string;
  readonly title: string;
  readonly about: string;
  readonly study: StudySettings;
  /** The weighted sum with a tolerance of its own; null where the suite states none. */
  readonly total: SuiteTotal | null;
  /** Shipped problems taken in, as suite/problem. */
  readonly problems: readonly string[];
}

/** A problem with the file it came from and the suite around it. */
export interface LoadedProblem {
  readonly problem: Problem;
  readonly document: YamlDocument;
  /** The suite whose settings apply; null for a file in a folder without suite.yaml. */
  readonly suite: Suite | null;
}

/** What a command was given. */
export interface LoadedProblems {
  /** Name for the report's folder: the suite's or the problem's; several are joined with "+". */
  readonly name: string;
  readonly problems: readonly LoadedProblem[];
}

const isProblemFile = (file: string): boolean =>
  EXTENSIONS.has(extname(file)) && basename(file) !== SUITE_FILE;

async function kindOf(path: string): Promise<"file" | "folder" | null> {
  const found = await stat(path).catch(() => null);
  return found === null ? null : found.isDirectory() ? "folder" : "file";
}

async function readSuite(folder: string, check?: SourceCheck): Promise<Suite | null> {
  const file = join(folder, SUITE_FILE);
  if ((await kindOf(file)) === null) return null;
  const document = parseYaml(file, await readText(file));
  const { title, about, study, total, problems = [] } = await checkSuite(document, check);
  const issues: ProblemIssue[] = [];
  for (const [i, entry] of problems.entries()) {
    if ((await shippedProblemFile(entry)) !== null) continue;
    const message = `problems item ${i + 1}: expected a shipped problem such as tidal/season-guarantee, found "${entry}"`;
    issues.push({
      file,
      ...document.place(["problems", i]),
      message: `${message}; \`tolerand problems\` lists them`,
    });
  }
  if (issues.length > 0) throw new ProblemError(issues);
  const name = basename(resolve(folder));
  const placed = placeDraws(study, document, folder);
  return { name, folder, title: title ?? name, about: about?.trim() ?? "", study: placed, total, problems };
}

async function readProblem(file: string, suite: Suite | null, check?: SourceCheck): Promise<LoadedProblem> {
  const id = basename(file, extname(file));
  if (!ID.test(id)) {
    throw fileError(
      file,
      "expected a file name of letters, digits, dots, dashes and _ (it names the problem in records); rename the file",
    );
  }
  const document = parseYaml(file, await readText(file));
  const problem = await checkProblem(document, id, check);
  return {
    problem: { ...problem, study: placeDraws(problem.study, document, dirname(file)) },
    document,
    suite,
  };
}

/** Loads one problem file, with the suite.yaml beside it if there is one. Throws ProblemError with all findings. */
export async function loadProblem(path: string, check?: SourceCheck): Promise<LoadedProblem> {
  if (!EXTENSIONS.has(extname(path))) {
    throw fileError(
      path,
      "expected a problem file that ends in .yaml or .yml; rename it, or name its folder",
    );
  }
  if (basename(path) === SUITE_FILE) {
    throw fileError(
      path,
      "holds the settings of a suite, not a problem; name its folder, or a problem file in it",
    );
  }
  return readProblem(path, await readSuite(dirname(path), check), check);
}

/** Loads all problems of a folder, by file name; findings of all files are thrown together as one ProblemError. */
export async function loadSuite(
  folder: string,
  check?: SourceCheck,
): Promise<{ suite: Suite; problems: LoadedProblem[] }> {
  const found = await readSuite(folder, check);
  const name = basename(resolve(folder));
  const suite: Suite = found ?? {
    name,
    folder,
    title: name,
    about: "",
    study: {},
    total: null,
    problems: [],
  };
  const idOf = (file: string): string => basename(file, extname(file));
  const files = (await readdir(folder)).filter(isProblemFile);
  files.sort((a, b) => (idOf(a) < idOf(b) ? -1 : 1));
  const paths = files.map((file) => join(folder, file));
  for (const entry of suite.problems) {
    const file = await shippedProblemFile(entry);
    if (file !== null) paths.push(file);
  }
  if (paths.length === 0) {
    throw fileError(
      folder,
      "expected problem files (*.yaml) in this folder, found none; `tolerand new` writes one",
    );
  }
  const problems: LoadedProblem[] = [];
  const issues: ProblemIssue[] = [];
  for (const path of paths) {
    try {
      problems.push(await readProblem(path, suite, check));
    } catch (error) {
      if (!(error instanceof ProblemError)) throw error;
      issues.push(...error.issues);
    }
  }
  if (issues.length === 0) issues.push(...strayWeights(suite, problems));
  if (issues.length > 0) throw new ProblemError(issues);
  return { suite, problems };
}

/** Weights of problems that the suite does not have. */
function strayWeights({ total, folder }: Suite, problems: readonly LoadedProblem[]): ProblemIssue[] {
  const ids = problems.map(({ problem }) => problem.id);
  return Object.keys(total?.weights ?? {})
    .filter((id) => !ids.includes(id))
    .map((id) => {
      const guess = nearest(id, ids);
      const hint = guess === null ? "" : `; did you mean "${guess}"?`;
      const message = `total weights: expected problems of the suite, found "${id}"${hint}`;
      return { file: join(folder, SUITE_FILE), line: null, column: null, message };
    });
}

async function loadOne(
  given: string,
  check?: SourceCheck,
): Promise<{ name: string; problems: readonly LoadedProblem[] }> {
  // A path wins over the name of a shipped suite.
  const kind = await kindOf(given);
  if (kind === "file") {
    const loaded = await loadProblem(given, check);
    return { name: loaded.problem.id, problems: [loaded] };
  }
  const suites = await shippedSuites();
  const folder = kind === "folder" ? given : suites.includes(given) ? shippedFolder(given) : null;
  if (folder !== null) {
    const { suite, problems } = await loadSuite(folder, check);
    return { name: suite.name, problems };
  }
  const file = await shippedProblemFile(given);
  if (file !== null) {
    const loaded = await loadProblem(file, check);
    return { name: loaded.problem.id, problems: [loaded] };
  }
  const guess = nearest(given, suites);
  const hint = guess === null ? "" : `; did you mean "${guess}"?`;
  throw fileError(
    given,
    `no such file, folder or shipped suite; shipped suites: ${suites.join(", ")}${hint}`,
  );
}

/**
 * Loads what a command was given: problem files, folders, names of shipped suites, or suite/problem. Two problems of
 * one name cannot be told apart in a record and are refused. `check` is the parser of sources (sources/choice.ts); with
 * it an unknown source is a finding with its line. Throws ProblemError with the findings of all.
 */
export async function loadPaths(paths: readonly string[], check?: SourceCheck): Promise<LoadedProblems> {
  const names: string[] = [];
  const byId = new Map<string, LoadedProblem>();
  const issues: ProblemIssue[] = [];
  for (const path of paths) {
    try {
      const { name, problems } = await loadOne(path, check);
      names.push(name);
      for (const loaded of problems) {
        const { id } = loaded.problem;
        const first = byId.get(id);
        if (first === undefined) byId.set(id, loaded);
        else if (first.document.file !== loaded.document.file) {
          const message = `a problem named "${id}" also comes from ${first.document.file}; rename one of the files`;
          issues.push({ file: loaded.document.file, line: null, column: null, message });
        }
      }
    } catch (error) {
      if (!(error instanceof ProblemError)) throw error;
      issues.push(...error.issues);
    }
  }
  if (issues.length > 0) throw new ProblemError(issues);
  return { name: [...new Set(names)].join("+"), problems: [...byId.values()] };
}
