/** How a user's own source is used, as its mapping says it: tuples, bits, where replicates start. */
import { z } from "zod";
import type { Bits } from "./conversion.js";
import { refuse, within } from "./own-recurrence.js";
import type { Tuples } from "./pseudo-random.js";
import { UNIFORM_STATE, type Seeding } from "./seeding.js";

/** Seeds are numbered up to here. */
const LARGEST_SEED = 2n ** 64n - 1n;

/** Outputs that `strided` may pass over: beyond it a run is nearly all waste. */
const LARGEST_STRIDE = 4096;

const whole = z.union([z.number(), z.string()]);

export const publishedSeeds = z.strictObject({ base: whole.optional(), stride: whole.optional() });

/** How a mapping says where replicates start. */
export const seedingSchema = z.union([
  z.enum(["uniform-state", "published"]),
  z.strictObject({ published: publishedSeeds }),
]);
export const stateSchema = z.union([z.int().min(0), z.string().min(1)]);

/** Where replicates start. Throws a RangeError for a stride that would repeat a seed, or a state beside a seeding. */
export function parseSeeding({
  seeding,
  state,
}: {
  readonly seeding?: z.infer<typeof seedingSchema> | undefined;
  readonly state?: z.infer<typeof stateSchema> | undefined;
}): Seeding {
  if (state !== undefined) {
    if (seeding !== undefined) refuse("seeding", JSON.stringify(seeding), "none beside a state");
    return { kind: "state", text: String(state) };
  }
  if (seeding === undefined || seeding === "uniform-state") return UNIFORM_STATE;
  const { base = 1, stride = 1 } = seeding === "published" ? {} : seeding.published;
  return {
    kind: "published",
    base: within("seeding.published.base", base, 0n, LARGEST_SEED),
    stride: within("seeding.published.stride", stride, 1n, LARGEST_SEED),
  };
}

export function parseTuples(written = "successive"): Tuples {
  if (written === "per-coordinate") return { kind: "per-coordinate" };
  const step = written === "successive" ? 1 : Number(written.slice("strided ".length));
  if (step >= 1 && step <= LARGEST_STRIDE) return { kind: "strided", step };
  return refuse("tuples", `"${written}"`, `"strided k" with k from 1 to ${LARGEST_STRIDE}`);
}

export function parseBits(written: string, available: number): Bits | null {
  const [end, digits] = written.split(" ");
  if (end !== "top" && end !== "low") return null;
  const count = Number(digits);
  if (count >= 1 && count <= available) return { end, count };
  return refuse("bits", `"${end} ${count}"`, `1 to ${available} bits (an output has ${available})`);
}
