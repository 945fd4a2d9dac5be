/**
 * Files and programs that a problem file names: relative to it, and never outside its suite (the folder it lies in), not
 * through a symbolic link either. What is found to be inside is noted as the folder that the paths begin in; the source
 * itself is another room's.
 */
import { existsSync, realpathSync } from "node:fs";
import { isAbsolute, relative, resolve, sep } from "node:path";
import type { SourceSpec, StudySettings } from "./contract.js";
import type { YamlDocument } from "./document.js";
import { ProblemError, type ProblemIssue } from "./errors.js";

/** The settings with the folder in each source of draws. Throws ProblemError for a path that leaves the folder. */
export function placeDraws(study: StudySettings, document: YamlDocument, folder: string): StudySettings {
  if (study.sources === undefined) return study;
  const issues: ProblemIssue[] = [];
  const sources = study.sources.map((source, i): SourceSpec => {
    const draws = drawsOf(source);
    if (typeof source === "string" || draws === null) return source;
    const key = draws["file"] === undefined ? "program" : "file";
    const path = pathOf(draws);
    const wrong =
      draws["folder"] === undefined
        ? path !== null && leaves(folder, path)
          ? `expected a path in the folder of the problem file, found "${path}", which leaves it; move it there, or name the source on the command line with --source`
          : null
        : "folder: not a key of problem files, where paths are relative to the file; remove it";
    if (wrong !== null) {
      const place = document.place(["study", "sources", i]);
      const where = draws["folder"] === undefined ? `.${key}` : "";
      issues.push({
        file: document.file,
        ...place,
        message: `study.sources item ${i + 1}: draws${where}: ${wrong}`,
      });
    }
    return { ...source, draws: { ...draws, folder: relative(process.cwd(), folder) || "." } };
  });
  if (issues.length > 0) throw new ProblemError(issues);
  return { ...study, sources };
}

function drawsOf(source: SourceSpec): Readonly<Record<string, unknown>> | null {
  const draws = typeof source === "string" ? null : source["draws"];
  if (typeof draws !== "object" || draws === null || Array.isArray(draws)) return null;
  return draws as Readonly<Record<string, unknown>>;
}

/** The path of the file or program; null for a program that is found by its name. */
function pathOf({ file, program }: Readonly<Record<string, unknown>>): string | null {
  if (typeof file === "string") return file;
  const command: unknown = Array.isArray(program) ? program[0] : null;
  return typeof command === "string" && command.includes("/") ? command : null;
}

/** Whether `path`, read from `folder`, is absolute or ends outside it, through a symbolic link too. */
export function leaves(folder: string, path: string): boolean {
  const target = resolve(folder, path);
  if (isAbsolute(path) || !within(resolve(folder), target)) return true;
  return existsSync(target) && !within(realpathSync(folder), realpathSync(target));
}

function within(folder: string, target: string): boolean {
  return target.startsWith(folder.endsWith(sep) ? folder : folder + sep);
}
