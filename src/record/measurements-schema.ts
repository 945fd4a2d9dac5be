/** The form of the measurements in a record. */
import { z } from "zod";
import { resolution } from "./explanation-schema.js";
import { name, number, orNull, real, text, whole } from "./schema-parts.js";

const paired = { points: whole, bias: real, standardError: real, changed: whole };

export const measurements = z.strictObject({
  problem: name,
  resolution: z.array(z.strictObject({ sources: z.array(name), cost: resolution })),
  transform: orNull(z.strictObject({ ...paired, amplification: real })),
  arithmetic: orNull(
    z.strictObject({
      formula: orNull(z.strictObject({ ...paired, digits: whole })),
      missing: z.array(text),
      flips: orNull(z.strictObject({ ...paired, amplification: real })),
      summation: z.strictObject({ points: whole, difference: real }),
    }),
  ),
  tail: orNull(
    z.strictObject({ points: whole, order: whole, index: number, further: number, constant: z.boolean() }),
  ),
});
