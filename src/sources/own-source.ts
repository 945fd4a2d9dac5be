/**
 * The user's own source, as a mapping in a problem file or inline on the command line:
 *
 *     { name: house, congruential: { modulus: "2^31", multiplier: 65539, increment: 0 },
 *       tuples: successive, endpoint: middle, bits: top 31, seeding: uniform-state }
 *
 * or a pseudo-random source of the registry in another usage: `{ name: house, source: mt19937, tuples: per-coordinate }`.
 */
import { z } from "zod";
import { congruentialPeriod } from "../numeric/congruential-period.js";
import { parseInteger } from "../numeric/integer-formula.js";
import { nearest } from "../numeric/nearest.js";
import { congruential, LARGEST_MODULUS } from "./congruential.js";
import type { Source } from "./contract.js";
import { bitsOf, type Bits } from "./conversion.js";
import {
  isPseudoRandom,
  pseudoRandom,
  USUAL,
  type PseudoRandomSource,
  type Recurrence,
  type Tuples,
  type Usage,
} from "./pseudo-random.js";
import { findSource, isSourceId, sourceIds } from "./registry.js";

/** Outputs that `strided` may pass over: beyond it a run is nearly all waste. */
const LARGEST_STRIDE = 4096;

const whole = z.union([z.number(), z.string()]);

/** The form of the mapping; what it says is checked further below. */
export const ownSourceSchema = z.strictObject({
  name: z.string().regex(/^[A-Za-z0-9][A-Za-z0-9_.-]{0,39}$/),
  congruential: z.strictObject({ modulus: whole, multiplier: whole, increment: whole.optional() }).optional(),
  source: z.string().optional(),
  tuples: z
    .string()
    .regex(/^(successive|per-coordinate|strided \d{1,5})$/)
    .optional(),
  endpoint: z.enum(["middle", "left"]).optional(),
  bits: z
    .string()
    .regex(/^(all|(top|low) \d{1,2})$/)
    .optional(),
  seeding: z.enum(["uniform-state"]).optional(),
});

type Mapping = z.infer<typeof ownSourceSchema>;

/** What is allowed at each key, for messages. */
const ALLOWED: Readonly<Record<string, string>> = {
  "": 'a mapping with "name" and "congruential" or "source"',
  name: "1 to 40 letters, digits, dots, dashes or underscores, beginning with a letter or digit",
  congruential: 'a mapping with "modulus", "multiplier" and "increment"',
  "congruential.modulus": 'a whole number or a formula like "2^31 - 1"',
  "congruential.multiplier": 'a whole number or a formula like "2^16 + 3"',
  "congruential.increment": "a whole number or a formula",
  source: "the id of a pseudo-random source",
  tuples: '"successive", "strided k" (like "strided 2") or "per-coordinate"',
  endpoint: '"middle" or "left"',
  bits: '"all", "top b" or "low b" (like "top 31")',
  seeding: '"uniform-state"',
};

/** The source that a mapping describes. Throws with the key, what was found and what is allowed. */
export function parseOwnSource(written: Readonly<Record<string, unknown>>): Source {
  const result = ownSourceSchema.safeParse(written);
  if (!result.success) throw new TypeError(explain(result.error.issues[0], written));
  const mapping = result.data;
  if (isSourceId(mapping.name)) fail("name", `"${mapping.name}"`, "a name that no source of the program has");
  const { recurrence, usage } = baseOf(mapping);
  return pseudoRandom(
    { ...recurrence, about: { ...recurrence.about, id: mapping.name } },
    {
      tuples: parseTuples(mapping.tuples),
      endpoint: mapping.endpoint ?? usage.endpoint,
      bits:
        mapping.bits === undefined ? usage.bits : parseBits(mapping.bits, bitsOf(recurrence.output.modulus)),
    },
    "own",
  );
}

function fail(key: string, found: string, allowed = ALLOWED[key] ?? ""): never {
  throw new RangeError(`source.${key}: expected ${allowed}, found ${found}`);
}

/** The generator and, for one of the registry, how it is used there. */
function baseOf(mapping: Mapping): { recurrence: Recurrence; usage: Usage } {
  if (mapping.source !== undefined && mapping.congruential !== undefined) {
    fail("congruential", "both", 'one of "congruential" and "source"');
  }
  if (mapping.source !== undefined) return named(mapping.source);
  if (mapping.congruential === undefined)
    fail("congruential", "neither", 'one of "congruential" and "source"');
  return { recurrence: ownCongruential(mapping.name, mapping.congruential), usage: USUAL };
}

function named(id: string): PseudoRandomSource {
  const source = findSource(id);
  if (isPseudoRandom(source)) return source;
  const all = sourceIds().filter((candidate) => isPseudoRandom(findSource(candidate)));
  return fail("source", `"${id}"`, `a pseudo-random source (${all.join(", ")})`);
}

function ownCongruential(name: string, written: NonNullable<Mapping["congruential"]>): Recurrence {
  const modulus = within("congruential.modulus", written.modulus, 2n, LARGEST_MODULUS);
  const multiplier = within("congruential.multiplier", written.multiplier, 1n, modulus - 1n);
  const increment = within("congruential.increment", written.increment ?? 0, 0n, modulus - 1n);
  const map = { multiplier, increment, modulus };
  const about = {
    id: name,
    title: `${multiplier} x + ${increment} mod ${modulus}`,
    citation:
      "the user's own; method: D. H. Lehmer, Mathematical methods in large-scale computing units (1951)",
    method: "congruential",
    outputBits: bitsOf(modulus),
    period: congruentialPeriod(map),
    knownStructure: "tuples of successive outputs lie on a lattice",
  };
  return congruential(about, map);
}

function within(key: string, written: number | string, least: bigint, most: bigint): bigint {
  const value = parseInteger(written, `source.${key}`);
  if (value < least || value > most) {
    const found =
      typeof written === "number" || /^\d+$/.test(written) ? `${value}` : `"${written}" = ${value}`;
    fail(key, found, `a whole number from ${least} to ${most}`);
  }
  return value;
}

function parseTuples(written = "successive"): Tuples {
  if (written === "per-coordinate") return { kind: "per-coordinate" };
  const step = written === "successive" ? 1 : Number(written.slice("strided ".length));
  if (step >= 1 && step <= LARGEST_STRIDE) return { kind: "strided", step };
  return fail("tuples", `"${written}"`, `"strided k" with k from 1 to ${LARGEST_STRIDE}`);
}

function parseBits(written: string, available: number): Bits | null {
  const [end, digits] = written.split(" ");
  if (end !== "top" && end !== "low") return null;
  const count = Number(digits);
  if (count >= 1 && count <= available) return { end, count };
  return fail("bits", `"${end} ${count}"`, `1 to ${available} bits (an output has ${available})`);
}

/** One message for what zod found first. */
function explain(issue: z.core.$ZodIssue | undefined, written: unknown): string {
  const path = (issue?.path ?? []).map(String);
  const key = path.join(".");
  const at = ["source", ...path].join(".");
  const allowed = ALLOWED[key] ?? "another value";
  if (issue?.code === "unrecognized_keys") {
    const unknown = issue.keys[0] ?? "";
    const known = Object.keys(
      key === "congruential" ? ownSourceSchema.shape.congruential.unwrap().shape : ownSourceSchema.shape,
    );
    const guess = nearest(unknown, known);
    return `${at}: unknown key "${unknown}"${guess === null ? "" : `, did you mean "${guess}"?`}; allowed are ${known.join(", ")}`;
  }
  const found = path.reduce<unknown>(
    (value, part) => (value as Record<string, unknown> | undefined)?.[part],
    written,
  );
  return `${at}: expected ${allowed}, found ${found === undefined ? "nothing" : JSON.stringify(found)}`;
}
