/** The small pieces that the forms of a record are made of. */
import { z } from "zod";
import { numberFrom } from "./json.js";

export const text = z.string();
export const whole = z.int().min(0);
export const real = z
  .union([z.number(), z.enum(["NaN", "Infinity", "-Infinity"])], {
    error: 'expected a number, "NaN", "Infinity" or "-Infinity"',
  })
  .transform(numberFrom);
export const reals = z.array(real);
export const orNull = <T extends z.ZodType>(schema: T) => z.union([schema, z.null()]);
export const number = orNull(real);
export const interval = orNull(z.tuple([real, real]));
/** A text that names something; bounded, because tables and file names are made of it. */
export const name = z.string().min(1).max(1000);
