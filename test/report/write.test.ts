/** Writing a report folder: whole files or none, strangers' files left alone. */
import { mkdtemp, readFile, readdir, rm, writeFile, mkdir } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { jsonText } from "../../src/record/json.js";
import type { StudyRecord } from "../../src/record/types.js";
import { writeReport } from "../../src/report/index.js";
import { slugs } from "../../src/report/view.js";
import { SMALL, sampleRecord } from "./sample-record.js";

let folder = "";

beforeEach(async () => {
  folder = await mkdtemp(join(tmpdir(), "tolerand-report-"));
});

afterEach(async () => {
  await rm(folder, { recursive: true, force: true });
});

const two = { ...SMALL, problems: 2 };

describe("writeReport", () => {
  it("writes the page, the record, the summary and the charts, and images when asked", async () => {
    const out = join(folder, "a", "b");
    const files = await writeReport(sampleRecord(two), out, { images: true });
    expect((await readdir(out)).sort()).toEqual([
      "charts",
      "images",
      "index.html",
      "record.json",
      "summary.md",
    ]);
    expect(files.charts.length).toBe(14);
    expect(files.images.length).toBe(14);
    for (const file of files.images) expect(await readFile(file, "utf8")).toMatch(/^<\?xml[^>]*>\n<svg /);
    expect(await readFile(files.record, "utf8")).toBe(`${jsonText(sampleRecord(two))}\n`);
  });

  it("leaves out the page when told so", async () => {
    const files = await writeReport(sampleRecord(two), folder, { page: false });
    expect(files.index).toBeNull();
    expect(await readdir(folder)).not.toContain("index.html");
  });

  it("replaces an earlier report, its left-over charts too, and no other file", async () => {
    await writeReport(sampleRecord(SMALL), folder);
    await writeFile(join(folder, "notes.txt"), "mine");
    await writeFile(join(folder, "charts", "mine.json"), "{}");
    await writeReport(sampleRecord(two), folder);
    const charts = await readdir(join(folder, "charts"));
    expect(charts).toContain("mine.json");
    expect(charts).not.toContain("bias-floor.vl.json");
    expect(await readFile(join(folder, "notes.txt"), "utf8")).toBe("mine");
  });

  it("leaves the folder as it was where a record cannot be drawn", async () => {
    await writeFile(join(folder, "index.html"), "before");
    const broken = { ...sampleRecord(two), sources: null } as unknown as StudyRecord;
    await expect(writeReport(broken, folder)).rejects.toThrow();
    expect(await readdir(folder)).toEqual(["index.html"]);
    expect(await readFile(join(folder, "index.html"), "utf8")).toBe("before");
  });

  it("leaves no draft behind where a file cannot be written", async () => {
    await mkdir(join(folder, "summary.md"));
    await expect(writeReport(sampleRecord(two), folder)).rejects.toThrow();
    expect((await readdir(folder)).filter((name) => name.endsWith(".part"))).toEqual([]);
  });
});

describe("slugs", () => {
  it("make distinct, harmless file stems of any names", () => {
    const made = slugs(["sobol+owen", "sobol owen", "../../etc/passwd", "", "ÄÖ", "<b>", "x".repeat(300)]);
    expect(new Set(made).size).toBe(made.length);
    for (const slug of made) expect(slug).toMatch(/^[a-z0-9-]{1,64}$/);
    expect(made.slice(0, 3)).toEqual(["sobol-owen", "sobol-owen-2", "etc-passwd"]);
  });
});
