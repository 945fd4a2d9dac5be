/** The form of the explanations in a record. */
import { z } from "zod";
import { name, number, orNull, real, reals, text, whole } from "./schema-parts.js";

const estimated = { value: real, interval: z.tuple([real, real]) };

const alias = z.strictObject({
  walsh: orNull(z.int().min(2)),
  indices: z.array(whole),
  entries: z.array(z.number()),
  copies: z.int().min(1),
  size: real,
  phase: real,
  planes: orNull(whole),
  gap: number,
  contribution: number,
  standardError: number,
});

const fullCycle = z.strictObject({
  states: z.int().min(1),
  mean: real,
  bias: number,
  referenceUncertainty: number,
  deviation: number,
  nonFinite: whole,
  offending: orNull(z.strictObject({ index: whole, inputs: reals, value: text })),
  endpoints: whole,
});

const paired = { bias: real, standardError: real, interval: z.tuple([real, real]) };

export const resolution = z.strictObject({
  bits: z.int().min(1),
  endpoint: z.enum(["middle", "left"]),
  confidence: z.number().gt(0).lt(1),
  ...paired,
  unreachableTail: z.strictObject({ ...paired, probability: z.number().min(0).max(1) }),
  points: z.int().min(1),
  replicates: z.int().min(2),
  nonFinite: whole,
});

export const explanation = z
  .strictObject({
    problem: name,
    source: name,
    estimator: name,
    output: name,
    structure: orNull(
      z.strictObject({
        kind: z.enum(["full", "seed-averaged", "rank-1", "net"]),
        modulus: z.string().regex(/^[0-9]{1,1000}$/, "expected decimal digits"),
        what: text,
      }),
    ),
    reason: orNull(text),
    predicted: orNull(
      z.strictObject({
        ...estimated,
        standardError: real,
        confidence: z.number().gt(0).lt(1),
        pairs: z.int().min(1),
        doubled: z.strictObject({ ...estimated, pairs: z.int().min(1) }),
        tail: z.strictObject(estimated),
        stable: z.boolean(),
        origin: real,
        source: name,
        points: z.int().min(1),
        replicates: z.int().min(2),
      }),
    ),
    measured: orNull(
      z.strictObject({
        ...estimated,
        standardError: number,
        n: z.int().min(1),
        replicates: z.int().min(1),
      }),
    ),
    difference: orNull(z.strictObject(estimated)),
    explained: z.boolean(),
    aliases: z.array(alias),
    comb: orNull(
      z.strictObject({
        points: z.int().min(1),
        source: z.array(whole),
        sound: z.array(whole),
        soundSource: name,
        profile: reals,
      }),
    ),
    fullCycle: orNull(fullCycle),
    resolution: orNull(z.strictObject({ own: z.int().min(1), costs: z.array(resolution) })),
  })
  .describe("What the structure of a source predicts for an integrand, beside what was measured.");
