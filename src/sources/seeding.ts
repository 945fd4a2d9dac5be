/**
 * How the replicates of a user's own source begin: at states drawn from keys (uniform over all valid ones), at published
 * seeds base, base + stride, base + 2 stride, ... as production systems number their runs, or all at one given state.
 */

export type Seeding =
  | { readonly kind: "uniform-state" }
  | { readonly kind: "published"; readonly base: bigint; readonly stride: bigint }
  | { readonly kind: "state"; readonly text: string };

export const UNIFORM_STATE: Seeding = { kind: "uniform-state" };

/** The published state that `replicate` begins at; null where a key says. */
export function seedOf(seeding: Seeding, replicate: number): string | null {
  if (seeding.kind === "uniform-state") return null;
  if (seeding.kind === "state") return seeding.text;
  return (seeding.base + BigInt(replicate) * seeding.stride).toString();
}

/** Replicates are not counted beyond this: more than any study has. */
const MOST = 2 ** 32;

/** How many of the seeds are valid, in order from the base; `valid` holds on one interval of seeds. */
export function validSeeds(seeding: Seeding, valid: (seed: string) => boolean): number {
  const holds = (replicate: number): boolean => valid(seedOf(seeding, replicate) ?? "");
  if (holds(MOST)) return Infinity;
  let [some, none] = [0, MOST];
  while (none - some > 1) {
    const middle = Math.floor((some + none) / 2);
    if (holds(middle)) some = middle;
    else none = middle;
  }
  return some + 1;
}

/** For titles: "seeds 1, 2, 3, ..." */
export function seedingText(seeding: Seeding): string | null {
  if (seeding.kind === "uniform-state") return null;
  if (seeding.kind === "state") return `state ${seeding.text}`;
  return `seeds ${[0, 1, 2].map((replicate) => seedOf(seeding, replicate)).join(", ")}, …`;
}
