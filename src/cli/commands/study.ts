/** `tolerand study PATH…`: the main job, from problem files to verdicts and a report folder. */
import { existsSync, readFileSync } from "node:fs";
import { join, resolve } from "node:path";
import { exitCodeOf } from "../../findings/headline.js";
import { loadPaths } from "../../problem/load.js";
import { runStudy } from "../../recipe.js";
import { jsonText, digestOf } from "../../record/json.js";
import type { StudyRecord, StudySpec } from "../../record/types.js";
import { threads } from "../../study/executor.js";
import { parseSource } from "../../sources/choice.js";
import { JOURNAL_FILE, journalOwner, openJournal } from "../../study/journal.js";
import { prepareProblems } from "../../study/runnable.js";
import { startProgress } from "../../study/progress.js";
import { tryPrograms } from "../../study/programs.js";
import { buildSpec } from "../../study/settings.js";
import { EXIT, type Arguments, type Io } from "../command.js";
import { dryRun } from "../dry-run.js";
import { environmentOf } from "../environment.js";
import { asInput, InputError } from "../errors.js";
import { messages } from "../messages.js";
import { booleanFlag, textFlag, textFlags, threadCount } from "../read.js";
import { settingsFromFlags } from "../study-flags.js";

export async function run(args: Arguments, io: Io): Promise<number> {
  const flags = settingsFromFlags(args, io);
  const count = threadCount(args);
  const loaded = await loadPaths(textFlags(args, "paths"), parseSource);
  const built = asInput(() => buildSpec(loaded.problems, flags));
  const { warnings } = built;
  const spec = textFlag(args, "until") === null ? built.spec : untilTolerance(built.spec);
  const problems = await prepareProblems(spec.problems);
  const allowPrograms = booleanFlag(args, "allow-programs");
  if (booleanFlag(args, "dry-run")) {
    io.stdout.write(dryRun(spec, problems, count, booleanFlag(args, "json")));
    return EXIT.done;
  }

  const folder = resolve(io.cwd, textFlag(args, "out") ?? join("reports", loaded.name));
  const specDigest = digestOf(spec);
  const resume = booleanFlag(args, "resume");
  const journalPath = join(folder, JOURNAL_FILE);
  checkFolder(folder, specDigest, journalOwner(journalPath), {
    resume,
    replace: booleanFlag(args, "replace"),
  });
  const programNotes = asInput(() => tryPrograms(spec, allowPrograms));
  const journal = openJournal(journalPath, specDigest, resume);
  const executor = threads(problems, count, { allowPrograms });
  const started = Date.now();
  let record: StudyRecord;
  try {
    record = await runStudy({
      spec,
      problems,
      executor,
      journal,
      signal: io.signal,
      stage: (title, work) => startProgress(title, work, io.stderr),
      environment: (complete) => environmentOf(io, { threads: count, started, complete }),
      warnings: [...warnings, ...programNotes],
    });
  } catch (error) {
    // a source of the user's own failed in a thread, where only the kind and text of an error come back
    if (error instanceof RangeError && error.message.startsWith("source "))
      throw new InputError(error.message);
    throw error;
  } finally {
    await executor.close();
  }

  const { writeReport, verdictTables } = await import("../../report/index.js");
  await writeReport(record, folder, { images: booleanFlag(args, "images") });
  if (!record.environment.complete) {
    io.stderr.write(messages.interrupted(folder, io.commandLine));
    return EXIT.interrupted;
  }
  journal.remove();
  if (booleanFlag(args, "json")) io.stdout.write(`${jsonText(record)}\n`);
  else
    io.stdout.write(
      verdictTables(record, { colour: io.stdout.isTTY === true && (io.env["NO_COLOR"] ?? "") === "" }),
    );
  for (const warning of record.warnings) io.stderr.write(`note: ${warning}\n`);
  io.stderr.write(messages.next(`open ${join(folder, "index.html")}`));
  return exitCodeOf(record, textFlag(args, "undecided") === "fail");
}

/** The spec of a study that stops at the tolerance. Throws InputError for draws that cannot be begun anew. */
function untilTolerance(spec: StudySpec): StudySpec {
  const once = Object.values(spec.sources)
    .flat()
    .map(parseSource)
    .find(({ source }) => source.singlePass === true);
  if (once !== undefined) throw new InputError(messages.untilOnce(once.id));
  return { ...spec, until: "tolerance" };
}

/** Refuses a folder that holds something else, before any work is done. */
function checkFolder(
  folder: string,
  spec: string,
  journalOf: string | null,
  { resume, replace }: { readonly resume: boolean; readonly replace: boolean },
): void {
  if (resume && journalOf !== null && journalOf !== spec && !replace)
    throw new InputError(messages.otherJournal(folder));
  if (resume || replace) return;
  if (journalOf === spec) throw new InputError(messages.unfinished(folder));
  const owner = journalOf ?? recordOwner(join(folder, "record.json"));
  if (owner !== null && owner !== spec) throw new InputError(messages.otherStudy(folder));
}

/** The spec digest of the record at `path`; null where there is none, "" where the file is not a record. */
function recordOwner(path: string): string | null {
  if (!existsSync(path)) return null;
  try {
    const { specDigest } = JSON.parse(readFileSync(path, "utf8")) as { specDigest?: unknown };
    return typeof specDigest === "string" ? specDigest : "";
  } catch {
    return "";
  }
}
