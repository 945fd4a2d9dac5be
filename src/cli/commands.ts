/** The table of commands: help and the check of flags come from it; bodies are imported when they run. */
import type { Options } from "yargs";
import type { Command } from "./command.js";
import { DRAW_FORMATS } from "../sources/draws/formats.js";

const text = (describe: string): Options => ({ type: "string", requiresArg: true, describe });
const flag = (describe: string): Options => ({ type: "boolean", describe });

const json = flag("print one JSON document instead of a table");
const seed = text("seed of the study (a whole number)");
const source = text("a source: id, inline mapping, or @file.yaml; repeatable");
const threads = text("worker threads (default: all processors)");
const allowPrograms = flag("start the programs that sources of your own name; they run with your rights");
const dimension: Options = { ...text("coordinates per point"), alias: "dimensions" };

const studySettings = {
  source,
  sources: text("ids of sources, with commas between; all: every source that has an error bar"),
  sizes: text('numbers of points, e.g. "2^8..2^16", "1000..1000000 by 10" or "1000,5000"'),
  replicates: text("independent replicates per source"),
  estimators: text("estimators, with commas between"),
  "false-alarms": text("level of the family of bias tests, e.g. 0.01"),
  seed,
};

export const commands: readonly Command[] = [
  {
    name: "new",
    positional: "<name>",
    summary: "write a commented problem or source file that runs as it is",
    options: { kind: { ...text("what to write"), choices: ["problem", "source"], default: "problem" } },
    load: () => import("./commands/new.js"),
  },
  {
    name: "study",
    positional: "<paths..>",
    summary: "run problems under sources, write a report folder, print the verdicts",
    options: {
      ...studySettings,
      out: text("report folder (default: reports/NAME)"),
      threads,
      until: {
        ...text("stop each source at the first of its sizes that is inside the tolerance"),
        choices: ["tolerance"],
      },
      resume: flag("go on with an interrupted run of the same study"),
      replace: flag("overwrite a report folder that holds another study"),
      "allow-programs": allowPrograms,
      "dry-run": flag("print tasks and expected time, run nothing"),
      undecided: {
        ...text("what an undecided verdict of what is in use does to the exit code"),
        choices: ["pass", "fail"],
      },
      images: flag("write the figures as SVG files too"),
      json,
    },
    load: () => import("./commands/study.js"),
  },
  {
    name: "explain",
    positional: "<problem>",
    summary: "why a source errs on a problem; without a source, which inputs matter",
    options: {
      source,
      sources: studySettings.sources,
      points: text("points of one estimate"),
      replicates: studySettings.replicates,
      "full-cycle": flag("average over every state of the source as well (at most 2^32 of them)"),
      threads,
      "allow-programs": allowPrograms,
      seed,
      out: text("folder for a report (default: none is written)"),
      json,
    },
    load: () => import("./commands/explain.js"),
  },
  {
    name: "inspect",
    positional: "<sources..>",
    summary: "structure of sources: period, low bits, dual lattice, net quality, discrepancy",
    options: {
      dimension: { ...dimension, describe: "numbers of coordinates, e.g. 2..16 (the default), 8 or 2,3,6" },
      points: text("points of a planned study, or of a point set"),
      streams: text("independent runs of that many points"),
      state: text("the source's own starting state in published form, or @file"),
      indices: text("an index set, 0-based: which outputs or coordinates, e.g. 0,1,5"),
      span: text("index sets of the worst projections lie below this index (12)"),
      discrepancy: flag(
        "discrepancies of the first --points points as well: their number squared is the cost",
      ),
      seed: text("seed of the points for --discrepancy (a whole number)"),
      "allow-programs": allowPrograms,
      out: text("folder for a report (default: none is written)"),
      json,
    },
    load: () => import("./commands/inspect.js"),
  },
  {
    name: "probe",
    positional: "<source>",
    summary: "write the problem that resonates with the lattice of a source",
    options: {
      dimension: { ...dimension, describe: "coordinates of the problem (default 3)" },
      peaked: flag("a peak between the planes in place of a wave along them"),
      points: text("points of a rank-1 lattice, whose planes depend on their number (default 4096)"),
      out: text("file to write (default: probe-SOURCE-DIMENSION.yaml); never overwritten"),
      json,
    },
    load: () => import("./commands/probe.js"),
  },
  {
    name: "plan",
    positional: "<paths..>",
    summary: "points and cost that bring each source inside the tolerance, from a small pilot or a record",
    options: {
      ...studySettings,
      "seconds-per-point": text("seconds of one evaluation in your own program"),
      randomisations: text("independent randomisations that the estimate is the mean of (default: 1)"),
      time: text("a time budget in seconds: the smallest error that it buys"),
      out: text("folder for a report (default: none is written)"),
      total: text("tolerance on the weighted sum of a suite (default: that of its suite.yaml)"),
      threads,
      "allow-programs": allowPrograms,
      json,
    },
    load: () => import("./commands/plan.js"),
  },
  {
    name: "check",
    positional: "<paths..>",
    summary: "validate problem files and print what the program understood",
    options: {
      ...studySettings,
      at: text(
        "evaluate the integrand at this point of the unit cube: one number for all coordinates, or one each",
      ),
      resolved: flag("print every setting and where it comes from"),
      json,
    },
    load: () => import("./commands/check.js"),
  },
  {
    name: "points",
    positional: "<source>",
    summary: "write points of a source, or its own integers",
    options: {
      dimension,
      points: text("how many points (with --format integers: how many outputs)"),
      first: text("index of the first point, 0-based"),
      seed,
      state: text("the source's own starting state in published form, or @file"),
      stream: text("one of several independent streams: 3/8 is the third of eight"),
      "save-state": text("file for the state behind the last point, as JSON"),
      "from-state": text("file with a saved state to go on from"),
      format: {
        ...text("form of the output"),
        choices: ["csv", "integers", ...DRAW_FORMATS],
        default: "csv",
      },
      "allow-programs": allowPrograms,
    },
    load: () => import("./commands/points.js"),
  },
  {
    name: "sources",
    positional: "",
    summary: "list the sources",
    options: { json },
    load: () => import("./commands/sources.js"),
  },
  {
    name: "problems",
    positional: "",
    summary: "list the shipped problems, or copy a suite",
    options: { json, copy: text("name of a shipped suite to copy into the working folder") },
    load: () => import("./commands/problems.js"),
  },
  {
    name: "functions",
    positional: "",
    summary: "list the functions of the formula language",
    options: { json },
    load: () => import("./commands/functions.js"),
  },
  {
    name: "distributions",
    positional: "",
    summary: "list the distributions and paths of inputs and their parameters",
    options: { json },
    load: () => import("./commands/distributions.js"),
  },
  {
    name: "estimators",
    positional: "",
    summary: "list the estimators",
    options: { json },
    load: () => import("./commands/estimators.js"),
  },
  {
    name: "report",
    positional: "<record>",
    summary: "redraw a report from its record (a report folder will do)",
    options: {
      out: text("folder to write to (default: where the record is)"),
      images: flag("write the figures as SVG files too"),
    },
    load: () => import("./commands/report.js"),
  },
  {
    name: "schema",
    positional: "",
    summary: "print the JSON Schema of the problem file, or of the record",
    options: { record: flag("of the record") },
    load: () => import("./commands/schema.js"),
  },
];
