/**
 * The form of a record: JSON Schema (`tolerand schema --record`) and the check of a record file that may come from
 * anywhere (`tolerand report`). Numbers that are not finite stand in the file as the strings "NaN", "Infinity" and
 * "-Infinity" and come out as numbers.
 */
import { z } from "zod";
import { explanation } from "./explanation-schema.js";
import { measurements } from "./measurements-schema.js";
import { sensitivity } from "./sensitivity-schema.js";
import { interval, name, number, orNull, real, reals, text, whole } from "./schema-parts.js";
import { RECORD_SCHEMA, type StudyRecord } from "./types.js";

const settings = { problem: name, source: name, estimator: name, output: name };
const sourceSpec = z.union([text, z.record(text, z.unknown())]);
const constant = z.union([real, reals, z.array(reals)]);

const problem = z.strictObject({
  id: name,
  title: text,
  about: text,
  dimension: z.int().min(1),
  inputs: z.array(
    z.strictObject({
      name,
      distribution: text,
      construction: text.optional(),
      parameters: z.record(name, z.union([number, z.array(number)])).optional(),
      length: orNull(z.int().min(1)),
      first: whole,
    }),
  ),
  dependence: z
    .union([
      z.strictObject({
        inputs: z.array(name),
        kind: z.enum(["cholesky", "principal-components"]),
        correlation: z.array(reals),
      }),
      z.strictObject({ inputs: z.array(name), kind: z.literal("one-factor"), shares: reals }),
    ])
    .optional(),
  constants: z.record(text, constant),
  integrand: text,
  quantity: z.union([
    z.enum(["mean", "probability", "ratio", "variance"]),
    z.strictObject({ quantile: z.number().gt(0).lt(1) }),
    z.strictObject({ shortfall: z.number().gt(0).lt(1) }),
  ]),
  reference: orNull(z.strictObject({ value: z.number(), text, uncertainty: z.number().min(0), basis: text })),
  tolerance: z.strictObject({
    absolute: orNull(z.number().gt(0)),
    relative: orNull(z.number().gt(0)),
    to: text,
    confidence: z.number().gt(0.5).lt(1),
  }),
  declared: z
    .array(
      z.strictObject({ line: text, kind: z.enum(["bias", "random"]), value: z.number().min(0), basis: text }),
    )
    .optional(),
  inUse: orNull(z.strictObject({ source: name, points: z.int().min(1), secondsPerPoint: number })),
  study: z.strictObject({
    sources: z.array(sourceSpec).optional(),
    sizes: z.array(whole).optional(),
    replicates: whole.optional(),
    estimators: z.array(text).optional(),
    falseAlarms: z.number().optional(),
    seed: whole.optional(),
  }),
});

const source = z.strictObject({
  id: name,
  title: text,
  citation: text,
  family: z.enum(["pseudo-random", "quasi-random", "stratified", "own"]),
  method: text,
  outputBits: whole,
  period: orNull(z.string().regex(/^[0-9]{1,10000}$/, "expected decimal digits")),
  largestDimension: z.int().min(1),
  nesting: z.enum(["sequence", "per-size"]),
  knownStructure: orNull(text),
  deterministic: z.boolean(),
  randomisations: z.array(text),
  repeatable: z.literal(false).optional(),
});

const nonFinite = z.strictObject({
  count: z.int().min(1),
  first: z.strictObject({ replicate: whole, index: whole, inputs: reals, value: text }),
});

const cell = z.strictObject({
  ...settings,
  n: z.int().min(1),
  dimension: z.int().min(1),
  indicator: z.boolean(),
  estimates: reals,
  withinVariances: z.array(orNull(real)),
  finiteBias: interval.optional(),
  secondsPerPoint: number,
  nonFinite: orNull(nonFinite),
  replicates: whole,
  reference: number,
  mean: number,
  bias: number,
  biasStandardError: number,
  rmse: number,
  rmseInterval: interval,
  replicateDeviation: number,
  integrandDeviation: number,
  varianceAgainstCrude: number,
  varianceAgainstCrudeInterval: interval,
  coverage: number,
  heavyTailed: z.boolean(),
  digest: text,
});

const consensus = z.strictObject({
  problem: name,
  value: number,
  standardError: number,
  members: z.array(z.strictObject({ source: name, n: z.int().min(1), mean: real, standardError: real })),
  q: real,
  pValue: real,
  agreed: z.boolean(),
});

const test = z.strictObject({
  ...settings,
  n: z.int().min(1),
  kind: z.enum(["student", "binomial", "none"]),
  pValue: number,
  pValueAdjusted: number,
  detectableBias: number,
  candidate: z.boolean(),
  confirmation: orNull(
    z.strictObject({
      replicates: whole,
      estimates: reals,
      bias: real,
      standardError: real,
      pValue: real,
    }),
  ),
  confirmed: z.boolean(),
  reason: orNull(text),
});

const spreadTest = z.strictObject({
  ...settings,
  n: z.int().min(1),
  ratio: number,
  pValue: number,
  pValueAdjusted: number,
  candidate: z.boolean(),
  confirmation: orNull(
    z.strictObject({
      replicates: whole,
      estimates: reals,
      withinVariances: z.array(orNull(real)),
      ratio: real,
      interval,
      pValue: real,
    }),
  ),
  confirmed: z.boolean(),
  reason: orNull(text),
});

const convergence = z.strictObject({
  ...settings,
  order: number,
  orderInterval: interval,
  floor: number,
  floorLower: number,
  reach: orNull(z.strictObject({ n: real, interval, extrapolated: z.boolean() })),
  never: z.boolean(),
  cost: number,
});

const budget = z.strictObject({
  ...settings,
  n: z.int().min(1),
  tolerance: number,
  confidence: z.number().gt(0).lt(1),
  lines: z.array(
    z.strictObject({
      line: text,
      kind: z.enum(["bias", "random", "probability"]),
      value: number,
      interval,
      basis: text,
      remedy: orNull(text).default(null),
    }),
  ),
  total: number,
  totalInterval: interval,
  verdict: z.enum(["within", "outside", "undecided", "none"]),
  headroom: number,
  largestLine: orNull(text),
  coverageFactor: number.default(null),
  degrees: number.default(null),
  reason: orNull(text),
  inUse: z.boolean(),
});

const recordSchema = z
  .strictObject({
    schema: z.literal(RECORD_SCHEMA),
    spec: z
      .strictObject({
        purpose: z.literal("pilot").optional(),
        until: z.literal("tolerance").optional(),
        problems: z.array(problem),
        sources: z.record(text, z.array(sourceSpec)),
        sizes: z.record(text, z.array(whole)),
        replicates: z.record(text, whole),
        estimators: z.record(text, z.array(text)),
        falseAlarms: z.number(),
        seed: whole,
      })
      .describe("What was asked, with every setting resolved."),
    specDigest: text.describe("SHA-256 of the canonical text of `spec`."),
    digest: text.describe("SHA-256 over the digests of all cells."),
    environment: z.strictObject({
      program: text,
      node: text,
      platform: text,
      threads: whole,
      started: text,
      finished: text,
      seconds: z.number(),
      command: text,
      complete: z.boolean(),
    }),
    problems: z.array(problem),
    sources: z.array(source),
    consensus: z.array(consensus),
    cells: z.array(cell).describe("One per problem, source, estimator, output and number of points."),
    tests: z.array(test),
    spreadTests: z.array(spreadTest).default([]),
    family: z.strictObject({ tests: whole, level: z.number() }),
    convergence: z.array(convergence),
    budgets: z.array(budget),
    explanations: z.array(explanation).default([]),
    stops: z
      .array(
        z.strictObject({
          problem: name,
          source: name,
          n: whole,
          look: whole,
          looks: whole,
          inside: z.boolean(),
        }),
      )
      .optional()
      .describe("Where a study that stops at the tolerance left each source."),
    measurements: z.array(measurements).default([]),
    sensitivity: z.array(sensitivity).default([]),
    warnings: z.array(text),
  })
  .describe("The record of a study by tolerand: what was asked, what was measured, what follows from it.");

/** The JSON Schema (draft 2020-12) of `record.json`. */
export function recordJsonSchema(): Record<string, unknown> {
  return { ...z.toJSONSchema(recordSchema, { io: "input" }) };
}

/** Findings shown of a record that is refused; the rest is counted. */
const SHOWN = 5;

/**
 * A record from the parsed JSON of a file.
 * @throws TypeError naming the parts that do not have the form of a record: where, what is expected, what was found.
 */
export function parseRecord(value: unknown): StudyRecord {
  const found = (value as { schema?: unknown } | null | undefined)?.schema;
  if (found !== RECORD_SCHEMA) {
    const what = typeof found === "string" ? JSON.stringify(found.slice(0, 60)) : "none";
    throw new TypeError(
      `record: expected "schema": "${RECORD_SCHEMA}", found ${what}; give the record.json of a study, or its folder`,
    );
  }
  const parsed = recordSchema.safeParse(value);
  if (parsed.success) return parsed.data as StudyRecord;
  const lines = parsed.error.issues.slice(0, SHOWN).map((issue) => `record: ${placeOf(issue)}`);
  const more = parsed.error.issues.length - SHOWN;
  if (more > 0)
    lines.push(`record: ... and ${more} more; the file was not written by this version of tolerand`);
  throw new TypeError(lines.join("\n"));
}

/** `cells[3].n: ...` */
function placeOf(issue: z.core.$ZodIssue): string {
  const path = issue.path.reduce<string>(
    (before, part) => before + (typeof part === "number" ? `[${part}]` : `${before && "."}${String(part)}`),
    "",
  );
  const message = issue.message.replace(/^Invalid input: /, "");
  return `${path === "" ? "the whole" : path}: ${message}`;
}
