// The journal: what was done is kept to the bit, a cut last line is ignored, another study's journal is not taken up.
import { appendFileSync, mkdtempSync, readFileSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { journalOwner, openJournal } from "../../src/study/journal.js";
import type { TaskResult } from "../../src/study/tasks.js";

let folder: string;
let path: string;
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), "tolerand-"));
  path = join(folder, "deep", "journal.jsonl");
});
afterEach(() => {
  rmSync(folder, { recursive: true });
});

const result = (id: string, estimate: number): TaskResult => ({
  id,
  results: [{ replicate: 0, n: 64, estimates: [estimate], withinVariances: [null], nonFinite: 0 }],
  openings: [{ replicate: 0, digest: "" }],
  endpoints: 0,
  offences: [{ replicate: 0, index: 3, inputs: [0.25, Number.NEGATIVE_INFINITY], value: "NaN" }],
  points: 64,
  seconds: 0.125,
});

describe("the journal", () => {
  it("gives back what was added, non-finite numbers included", () => {
    const first = openJournal(path, "spec-a", false);
    first.add(result("one", 0.1 + 0.2));
    first.add(result("two", Number.NaN));
    const again = openJournal(path, "spec-a", true);
    expect([...again.done.values()]).toEqual([result("one", 0.1 + 0.2), result("two", Number.NaN)]);
    expect(journalOwner(path)).toBe("spec-a");
  });

  it("ignores a last line that was cut, and writes on behind it", () => {
    openJournal(path, "spec-a", false).add(result("one", 1));
    appendFileSync(path, '{"id":"two","resul');
    const again = openJournal(path, "spec-a", true);
    again.add(result("three", 3));
    expect([...openJournal(path, "spec-a", true).done.keys()]).toEqual(["one", "three"]);
    expect(readFileSync(path, "utf8")).not.toContain("two");
  });

  it("takes up nothing of another spec, nor without being asked", () => {
    openJournal(path, "spec-a", false).add(result("one", 1));
    expect(openJournal(path, "spec-b", true).done.size).toBe(0);
    openJournal(path, "spec-a", false).add(result("one", 1));
    expect(openJournal(path, "spec-a", false).done.size).toBe(0);
  });

  it("goes when the record has taken its place", () => {
    const journal = openJournal(path, "spec-a", false);
    journal.remove();
    expect(journalOwner(path)).toBeNull();
  });
});
