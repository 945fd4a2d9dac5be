/**
 * The user's own source, as a mapping in a problem file or inline on the command line:
 *
 *     { name: house, congruential: { modulus: "2^31", multiplier: 65539, increment: 0 },
 *       tuples: successive, endpoint: middle, bits: top 31, float32: false, seeding: uniform-state }
 *     { name: house, recursive: { modulus: "2^31 - 1", multipliers: [107374182, 0, 0, 0, 104480] } }
 *     { name: house, xorshift: { bits: 64, shifts: [13, -7, 17] } }
 *
 * or a pseudo-random source of the registry in another usage: `{ name: house, source: mt19937, tuples: per-coordinate }`.
 * A mapping with `draws` takes them from outside (draws/own-draws.ts).
 * `seeding: { published: { base: 1, stride: 1 } }` starts replicate r at the published seed base + r stride; `state: 5489`
 * is the one state used in production.
 */
import { z } from "zod";
import { nearest } from "../numeric/nearest.js";
import type { Source } from "./contract.js";
import { bitsOf } from "./conversion.js";
import { DRAW_FORMATS } from "./draws/formats.js";
import { drawsSchema, ownDraws } from "./draws/own-draws.js";
import { ORDERS, ownCongruential, ownRecursive, ownXorshift, refuse } from "./own-recurrence.js";
import {
  parseBits,
  parseSeeding,
  parseTuples,
  publishedSeeds,
  seedingSchema,
  stateSchema,
} from "./own-usage.js";
import {
  isPseudoRandom,
  pseudoRandom,
  USUAL,
  type PseudoRandomSource,
  type Recurrence,
  type Usage,
} from "./pseudo-random.js";
import { findSource, isSourceId, sourceIds } from "./registry.js";
import { seedOf } from "./seeding.js";

const whole = z.union([z.number(), z.string()]);

const congruential = z.strictObject({ modulus: whole, multiplier: whole, increment: whole.optional() });
const recursive = z.strictObject({
  modulus: whole,
  multipliers: z.array(whole).min(ORDERS.least).max(ORDERS.most),
  increment: whole.optional(),
});
const xorshift = z.strictObject({
  bits: z.union([z.literal(32), z.literal(64)]),
  shifts: z.tuple([z.int(), z.int(), z.int()]),
});

/** The form of the mapping; what it says is checked further below. */
export const ownSourceSchema = z.strictObject({
  name: z.string().regex(/^[A-Za-z0-9][A-Za-z0-9_.-]{0,39}$/),
  congruential: congruential.optional(),
  recursive: recursive.optional(),
  xorshift: xorshift.optional(),
  source: z.string().optional(),
  draws: drawsSchema.optional(),
  tuples: z
    .string()
    .regex(/^(successive|per-coordinate|strided \d{1,5})$/)
    .optional(),
  endpoint: z.enum(["middle", "left"]).optional(),
  bits: z
    .string()
    .regex(/^(all|(top|low) \d{1,2})$/)
    .optional(),
  float32: z.boolean().optional(),
  seeding: seedingSchema.optional(),
  state: stateSchema.optional(),
});

type Mapping = z.infer<typeof ownSourceSchema>;

/** Keys of the mappings inside the mapping. */
const INNER: Readonly<Record<string, z.ZodObject>> = {
  congruential,
  recursive,
  xorshift,
  draws: drawsSchema,
  "seeding.published": publishedSeeds,
};

/** The generator of the mapping stands under one of these. */
const GENERATORS = ["congruential", "recursive", "xorshift", "source", "draws"] as const;
const ONE_GENERATOR = `one of the keys ${GENERATORS.map((key) => `"${key}"`).join(", ")}`;

/** What is allowed at each key, for messages; numbers in a path stand as *. */
const ALLOWED: Readonly<Record<string, string>> = {
  "": `a mapping with "name" and ${ONE_GENERATOR}`,
  name: "1 to 40 letters, digits, dots, dashes or underscores, beginning with a letter or digit",
  congruential: 'a mapping with "modulus", "multiplier" and "increment"',
  "congruential.modulus": 'a whole number or a formula like "2^31 - 1"',
  "congruential.multiplier": 'a whole number or a formula like "2^16 + 3"',
  "congruential.increment": "a whole number or a formula",
  recursive: 'a mapping with "modulus", "multipliers" and "increment"',
  "recursive.modulus": 'a whole number or a formula like "2^31 - 1"',
  "recursive.multipliers": `a list of ${ORDERS.least} to ${ORDERS.most} whole numbers or formulas, a1 first`,
  "recursive.multipliers.*": "a whole number or a formula",
  "recursive.increment": "a whole number or a formula",
  xorshift: 'a mapping with "bits" and "shifts"',
  "xorshift.bits": "32 or 64",
  "xorshift.shifts": "three whole numbers, positive to the left and negative to the right",
  "xorshift.shifts.*": "a whole number, positive to the left and negative to the right",
  source: "the id of a pseudo-random source",
  draws: 'a mapping with "format" and "file" or "program"',
  "draws.format": `one of ${DRAW_FORMATS.join(", ")}`,
  "draws.file": "the path of a file or FIFO of draws",
  "draws.program": "a list of texts, the program first and then its arguments",
  "draws.program.*": "a text",
  "draws.folder": "the folder that paths are relative to",
  tuples: '"successive", "strided k" (like "strided 2") or "per-coordinate"',
  endpoint: '"middle" or "left"',
  bits: '"all", "top b" or "low b" (like "top 31")',
  float32: "true or false",
  seeding: '"uniform-state", "published" (seeds 1, 2, 3, …) or { published: { base: 1, stride: 1 } }',
  "seeding.published": 'a mapping with "base" and "stride"',
  "seeding.published.base": "a whole number, the seed of the first replicate",
  "seeding.published.stride": "a whole number, the step from one replicate's seed to the next",
  state: "a starting state in the source's published form",
};

/** The source that a mapping describes. Throws with the key, what was found and what is allowed. */
export function parseOwnSource(written: Readonly<Record<string, unknown>>): Source {
  const result = ownSourceSchema.safeParse(written);
  if (!result.success) throw new TypeError(explain(result.error.issues[0], written));
  const mapping = result.data;
  if (isSourceId(mapping.name))
    refuse("name", `"${mapping.name}"`, "a name that no source of the program has");
  if (mapping.draws !== undefined) {
    onlyGenerator(mapping);
    return ownDraws({ ...mapping, draws: mapping.draws });
  }
  const { recurrence, usage } = baseOf(mapping);
  const seeding = parseSeeding(mapping);
  const start = seedOf(seeding, 0);
  if (start !== null) recurrence.stateFromText(start);
  return pseudoRandom(
    { ...recurrence, about: { ...recurrence.about, id: mapping.name } },
    {
      tuples: parseTuples(mapping.tuples),
      endpoint: mapping.endpoint ?? usage.endpoint,
      bits:
        mapping.bits === undefined ? usage.bits : parseBits(mapping.bits, bitsOf(recurrence.output.modulus)),
      float32: mapping.float32 ?? false,
      seeding,
    },
    "own",
  );
}

/** The generator and, for one of the registry, how it is used there. */
function baseOf(mapping: Mapping): { recurrence: Recurrence; usage: Usage } {
  onlyGenerator(mapping);
  const { name, congruential, recursive, xorshift, source } = mapping;
  if (source !== undefined) return named(source);
  if (recursive !== undefined) return { recurrence: ownRecursive(name, recursive), usage: USUAL };
  if (xorshift !== undefined) return { recurrence: ownXorshift(name, xorshift), usage: USUAL };
  if (congruential !== undefined) return { recurrence: ownCongruential(name, congruential), usage: USUAL };
  return refuseGenerators("none");
}

function onlyGenerator(mapping: Mapping): void {
  const given = GENERATORS.filter((key) => mapping[key] !== undefined);
  if (given.length > 1) refuseGenerators(given.map((key) => `"${key}"`).join(" and "));
}

function refuseGenerators(found: string): never {
  throw new RangeError(`source: expected ${ONE_GENERATOR}, found ${found}`);
}

function named(id: string): PseudoRandomSource {
  const source = findSource(id);
  if (isPseudoRandom(source)) return source;
  const all = sourceIds().filter((candidate) => isPseudoRandom(findSource(candidate)));
  return refuse("source", `"${id}"`, `a pseudo-random source (${all.join(", ")})`);
}

/** One message for what zod found first. */
function explain(issue: z.core.$ZodIssue | undefined, written: unknown): string {
  const path = (issue?.path ?? []).map(String);
  const key = path.map((part) => (/^\d+$/.test(part) ? "*" : part)).join(".");
  const at = ["source", ...path].join(".");
  if (issue?.code === "unrecognized_keys") {
    const unknown = issue.keys[0] ?? "";
    const known = Object.keys((INNER[key] ?? ownSourceSchema).shape);
    const guess = nearest(unknown, known);
    return `${at}: unknown key "${unknown}"${guess === null ? "" : `, did you mean "${guess}"?`}; allowed are ${known.join(", ")}`;
  }
  const found = path.reduce<unknown>(
    (value, part) => (value as Record<string, unknown> | undefined)?.[part],
    written,
  );
  return `${at}: expected ${ALLOWED[key] ?? "another value"}, found ${found === undefined ? "nothing" : JSON.stringify(found)}`;
}
