/** Which randomisations a source accepts together, and the refusals. */
import type { Randomisation, Source, SourceDescription } from "./contract.js";

/**
 * All combinations that a source accepts, the empty one first: one of its randomisations alone, and `tent` only after
 * `shift` (F. J. Hickernell 2002: the baker's transform gains its order on a shifted lattice).
 */
export function acceptedRandomisations(source: SourceDescription): readonly (readonly Randomisation[])[] {
  const alone = source.randomisations.filter((name) => name !== "tent").map((name) => [name]);
  const tent = source.randomisations.includes("tent") && source.randomisations.includes("shift");
  return [[], ...alone, ...(tent ? [["shift", "tent"] as const] : [])];
}

/** The randomisations named, if the source accepts them together and in this order; else a RangeError that lists what it accepts. */
export function checkRandomisations(source: Source, names: readonly string[]): readonly Randomisation[] {
  const combinations = acceptedRandomisations(source);
  const wanted = names.join("+");
  const found = combinations.find((combination) => combination.join("+") === wanted);
  if (found !== undefined) return found;
  const allowed = combinations.slice(1).map((combination) => `"${[source.id, ...combination].join("+")}"`);
  throw new RangeError(
    allowed.length === 0
      ? `source: "${source.id}" takes no randomisation, found "${[source.id, ...names].join("+")}"; write "${source.id}"`
      : `source: "${source.id}" does not take "${names.join("+")}"; expected "${source.id}" or ${allowed.join(", ")}`,
  );
}
