/**
 * The journal of a running study: one line of JSON per finished task, appended as it comes, so that an interrupted or
 * killed run loses at most the tasks in flight. The first line names the spec; a journal of another spec is not taken
 * up. A last line that was cut by a crash is ignored.
 */
import { appendFileSync, existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { dirname } from "node:path";
import { jsonText, numberFrom } from "../record/json.js";
import type { ReplicateResult, TaskResult } from "./tasks.js";

export const JOURNAL_FILE = "journal.jsonl";

/** The spec digest that the journal at `path` belongs to, or null where there is none. */
export function journalOwner(path: string): string | null {
  if (!existsSync(path)) return null;
  const head = parseLine(readFileSync(path, "utf8").split("\n", 1)[0] ?? "") as { spec?: unknown } | null;
  return typeof head?.spec === "string" ? head.spec : null;
}

/** A journal opened for appending, with what it already held. */
export interface Journal<R = TaskResult> {
  /** Results by task id from an earlier run of the same spec. */
  readonly done: ReadonlyMap<string, R>;
  add(result: R): void;
  /** Removes the file: the record has taken its place. */
  remove(): void;
}

/** Opens the journal of a study at `path` for the spec with digest `spec`; `resume` keeps what an earlier run left. */
export function openJournal(path: string, spec: string, resume: boolean): Journal {
  return openJournalOf(path, spec, resume, revive);
}

/** As `openJournal` for results of any kind; `revived` makes one of its parsed line. */
export function openJournalOf<R extends { readonly id: string }>(
  path: string,
  spec: string,
  resume: boolean,
  revived: (parsed: R) => R,
): Journal<R> {
  mkdirSync(dirname(path), { recursive: true });
  const done = new Map<string, R>();
  if (resume && journalOwner(path) === spec) {
    for (const line of readFileSync(path, "utf8").split("\n").slice(1)) {
      const result = parseLine(line) as R | null;
      if (result !== null) done.set(result.id, revived(result));
    }
  }
  // Rewritten whole, so that a cut last line does not stay in the middle.
  const lines = [{ spec }, ...done.values()].map((entry) => jsonText(entry));
  writeFileSync(path, `${lines.join("\n")}\n`);
  return {
    done,
    add: (result) => {
      appendFileSync(path, `${jsonText(result)}\n`);
    },
    remove: () => {
      rmSync(path, { force: true });
    },
  };
}

function parseLine(line: string): unknown {
  try {
    return JSON.parse(line) as unknown;
  } catch {
    return null;
  }
}

/** Non-finite numbers come back from their strings. */
function revive(result: TaskResult): TaskResult {
  const numbers = (values: readonly unknown[]): number[] => values.map(numberFrom);
  const results = result.results.map((r): ReplicateResult => ({
    ...r,
    estimates: numbers(r.estimates),
    withinVariances: r.withinVariances.map((v) => (v === null ? null : numberFrom(v))),
  }));
  const offences = result.offences.map((offence) => ({ ...offence, inputs: numbers(offence.inputs) }));
  return { ...result, results, offences };
}
