/** The form of `sensitivity` in a record. */
import { z } from "zod";
import { name, orNull, real, reals, text, whole } from "./schema-parts.js";

const ends = z.tuple([real, real]);
const share = z.strictObject({ value: real, interval: ends });
const inputShare = z.strictObject({ label: text, first: whole, count: whole, alone: share, total: share });
const order = z.strictObject({ order: real, interval: ends });

export const sensitivity = z.strictObject({
  problem: name,
  output: name,
  confidence: real,
  reason: orNull(text),
  nets: z.array(z.strictObject({ source: name, base: whole, digits: whole, t: z.array(whole) })).default([]),
  measures: orNull(
    z.strictObject({
      source: name,
      points: whole,
      replicates: whole,
      evaluations: whole,
      mean: real,
      variance: real,
      varianceError: real,
      units: z.array(inputShare),
      grouped: z.boolean(),
      inputs: z.array(inputShare),
      pairs: z.array(z.strictObject({ i: whole, j: whole, closed: share, interaction: share })),
      allPairs: orNull(share),
      allAlone: share,
      meanDimension: share,
      truncation: z.strictObject({ atLeast: whole, atMost: whole }),
      smoothness: orNull(
        z.strictObject({
          source: name,
          sizes: reals,
          replicates: whole,
          integrand: order,
          smooth: order,
          kinked: order,
          jumping: order,
        }),
      ),
    }),
  ),
});
