/**
 * Writes a report folder. Everything is made in memory before the first file is touched, and each file is written under
 * another name and then renamed, so that a record that cannot be drawn leaves the folder as it was.
 */
import { mkdir, readdir, rename, rm, writeFile } from "node:fs/promises";
import { dirname, join } from "node:path";
import { jsonText } from "../record/json.js";
import type { AllocationPlan } from "../findings/allocation-plan.js";
import type { ProblemPlan } from "../findings/plan.js";
import type { Problem } from "../problem/contract.js";
import type { Sensitivity } from "../record/sensitivity.js";
import type { StudyRecord } from "../record/types.js";
import { allocationChart } from "./charts/allocation-chart.js";
import { inputsChart } from "./charts/inputs.js";
import { planChart } from "./charts/plan-chart.js";
import { chartsOf, everyChart, inspectionCharts } from "./charts/index.js";
import { inspectionPage } from "./page/inspection-page.js";
import { inspectionJson } from "../structure/inspection.js";
import { viewInspections, type Inspected } from "./inspection-view.js";
import { page, reportTitle } from "./page/page.js";
import { sensitivityPage } from "./page/sensitivity-page.js";
import { planPage } from "./page/plan-page.js";
import { drawForFile } from "./render.js";
import { summary } from "./summary.js";
import { slugs, viewRecord } from "./view.js";

export interface ReportOptions {
  /** Also write every chart as SVG, to images/ (PNG would need a native canvas package; a browser or an SVG tool makes it). */
  readonly images?: boolean;
  /** False leaves index.html out. */
  readonly page?: boolean;
}

/** Paths of what was written; `index` is null where the page was left out. */
export interface ReportFiles {
  readonly folder: string;
  readonly index: string | null;
  readonly record: string;
  readonly summary: string;
  readonly charts: readonly string[];
  readonly images: readonly string[];
}

async function writeWhole(path: string, text: string): Promise<void> {
  const draft = `${path}.${process.pid}.part`;
  try {
    await writeFile(draft, text);
    await rename(draft, path);
  } catch (error) {
    await rm(draft, { force: true });
    throw error;
  }
}

/** Removes files that an earlier report left in a folder of ours and that this one does not have. */
async function clear(folder: string, ending: string, keep: ReadonlySet<string>): Promise<void> {
  const names = await readdir(folder).catch(() => []);
  for (const name of names) if (name.endsWith(ending) && !keep.has(name)) await rm(join(folder, name));
}

/** The text of every file of the report by its path in the folder. */
export async function reportTexts(
  record: StudyRecord,
  options: ReportOptions = {},
): Promise<Map<string, string>> {
  const view = viewRecord(record);
  const set = chartsOf(view);
  const charts = everyChart(set);
  const texts = new Map<string, string>();
  texts.set("record.json", `${jsonText(record)}\n`);
  texts.set("summary.md", summary(view, reportTitle(view)));
  for (const chart of charts) texts.set(`charts/${chart.name}.vl.json`, `${jsonText(chart.spec, 1)}\n`);
  if (options.images === true) {
    for (const chart of charts) texts.set(`images/${chart.name}.svg`, await drawForFile(chart));
  }
  if (options.page !== false) texts.set("index.html", await page(view, set));
  return texts;
}

/** Writes all texts, and removes charts and images of an earlier report that are not among them. */
async function writeTexts(folder: string, texts: ReadonlyMap<string, string>): Promise<void> {
  await mkdir(folder, { recursive: true });
  for (const [name, text] of texts) {
    await mkdir(dirname(join(folder, name)), { recursive: true });
    await writeWhole(join(folder, name), text);
  }
  const below = (part: string): Set<string> =>
    new Set([...texts.keys()].filter((name) => dirname(name) === part).map((name) => name.slice(7)));
  await clear(join(folder, "charts"), ".vl.json", below("charts"));
  await clear(join(folder, "images"), ".svg", below("images"));
}

/** The text of every file of an inspection's report; `command` repeats it. */
export async function inspectionTexts(
  inspected: readonly Inspected[],
  command: string,
): Promise<Map<string, string>> {
  const items = viewInspections(inspected);
  const charts = inspectionCharts(items);
  const texts = new Map<string, string>();
  const json = inspected.map(({ inspection }) => inspectionJson(inspection));
  texts.set("inspection.json", `${jsonText(json, 1)}\n`);
  for (const chart of [...charts.across, ...[...charts.bySource.values()].flat()]) {
    texts.set(`charts/${chart.name}.vl.json`, `${jsonText(chart.spec, 1)}\n`);
  }
  texts.set("index.html", await inspectionPage(items, charts, command));
  return texts;
}

/** Writes the report of an inspection; rejects with the system's error where the folder cannot be written. */
export async function writeInspection(
  inspected: readonly Inspected[],
  folder: string,
  command: string,
): Promise<void> {
  await writeTexts(folder, await inspectionTexts(inspected, command));
}

/** What `tolerand plan` found, for its page. */
export interface PlanReport {
  readonly record: StudyRecord;
  readonly plans: readonly ProblemPlan[];
  readonly allocation: AllocationPlan | null;
  /** The command line that repeats it. */
  readonly command: string;
}

/** The text of every file of a plan's report. */
export async function planTexts(report: PlanReport): Promise<Map<string, string>> {
  const { record, plans, allocation, command } = report;
  const view = viewRecord(record);
  const charts = new Map(plans.map((plan) => [plan.problem, planChart(view, plan)]));
  const across = allocation === null ? null : allocationChart(view, allocation);
  const texts = new Map<string, string>();
  texts.set("plan.json", `${jsonText({ plans, allocation }, 1)}\n`);
  for (const chart of [...charts.values(), across]) {
    if (chart !== null) texts.set(`charts/${chart.name}.vl.json`, `${jsonText(chart.spec, 1)}\n`);
  }
  texts.set("index.html", await planPage({ plans, allocation, charts, across, command }));
  return texts;
}

/** Writes the report of a plan; rejects with the system's error where the folder cannot be written. */
export async function writePlan(report: PlanReport, folder: string): Promise<void> {
  await writeTexts(folder, await planTexts(report));
}

/** What `tolerand explain` found of a problem's inputs, for its page. */
export interface SensitivityReport {
  readonly problem: Problem;
  readonly sensitivity: Sensitivity;
  /** The command line that repeats it. */
  readonly command: string;
}

/** The text of every file of the report of a problem's inputs. */
export async function sensitivityTexts(report: SensitivityReport): Promise<Map<string, string>> {
  const { problem, sensitivity } = report;
  const [slug = ""] = slugs([problem.id]);
  const chart = inputsChart(null, { slug, title: problem.title, sensitivity });
  const texts = new Map<string, string>();
  texts.set("inputs.json", `${jsonText(sensitivity, 1)}\n`);
  if (chart !== null) texts.set(`charts/${chart.name}.vl.json`, `${jsonText(chart.spec, 1)}\n`);
  texts.set("index.html", await sensitivityPage({ ...report, chart }));
  return texts;
}

/** Writes the report of a problem's inputs; rejects with the system's error where the folder cannot be written. */
export async function writeSensitivity(report: SensitivityReport, folder: string): Promise<void> {
  await writeTexts(folder, await sensitivityTexts(report));
}

/**
 * Writes the report of `record` to `folder`, which is made if need be; files of an earlier report are replaced, other
 * files are left alone. Rejects with the system's error where the folder cannot be written.
 */
export async function writeReport(
  record: StudyRecord,
  folder: string,
  options: ReportOptions = {},
): Promise<ReportFiles> {
  const texts = await reportTexts(record, options);
  const names = [...texts.keys()];
  const below = (part: string): string[] => names.filter((name) => dirname(name) === part);
  await writeTexts(folder, texts);
  const at = (name: string): string => join(folder, name);
  return {
    folder,
    index: texts.has("index.html") ? at("index.html") : null,
    record: at("record.json"),
    summary: at("summary.md"),
    charts: below("charts").map(at),
    images: below("images").map(at),
  };
}
