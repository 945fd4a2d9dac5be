/** What estimates are held against: a problem's own reference, or the consensus that stands in for it. */
import type { Problem } from "../problem/contract.js";
import type { Consensus } from "../record/types.js";

export interface KnownReference {
  readonly value: number;
  /** Standard uncertainty, >= 0. */
  readonly uncertainty: number;
  readonly basis: string;
  readonly consensus: boolean;
}

/** By problem id; a problem without a reference and without an agreed consensus is absent. */
export function referencesOf(
  problems: readonly Problem[],
  consensus: readonly Consensus[],
): ReadonlyMap<string, KnownReference> {
  const known = new Map<string, KnownReference>();
  for (const { id, reference } of problems) {
    if (reference !== null) {
      const { value, uncertainty } = reference;
      // It stands inside other sentences, without its full stop.
      const basis = reference.basis.trim().replace(/\.$/, "");
      known.set(id, { value, uncertainty, basis, consensus: false });
      continue;
    }
    const stand = consensus.find((entry) => entry.problem === id);
    if (stand === undefined || !stand.agreed || stand.value === null || stand.standardError === null)
      continue;
    const members = stand.members.map((member) => member.source).join(", ");
    const basis = `consensus of ${members}`;
    known.set(id, { value: stand.value, uncertainty: stand.standardError, basis, consensus: true });
  }
  return known;
}

/** The absolute tolerance, resolved against the reference where it is relative to it; null where that is not known. */
export function toleranceOf(problem: Problem, reference: KnownReference | undefined): number | null {
  const { absolute, relative, to } = problem.tolerance;
  if (absolute !== null) return absolute;
  if (relative === null) return null;
  const constant = problem.constants[to];
  const base = typeof constant === "number" ? constant : reference?.value;
  const resolved = base === undefined ? NaN : relative * Math.abs(base);
  return resolved > 0 ? resolved : null;
}
