/**
 * What each line adds to the total, so that the parts sum to it: bias lines in full; random lines share
 * k sqrt(sum sigma^2) by their parts of the variance; a probability, or what was not assessed, adds nothing.
 */
import type { BudgetLine } from "../../record/types.js";

type Part = Pick<BudgetLine, "kind" | "value">;

export function contributionsOf(lines: readonly Part[], factor: number): number[] {
  const deviations = lines.map((line) => (line.kind === "random" ? (line.value ?? 0) : 0));
  const together = Math.hypot(...deviations);
  return lines.map(({ kind, value }, i) => {
    if (kind === "bias") return value ?? 0;
    const deviation = deviations[i] ?? 0;
    return deviation === 0 ? 0 : factor * deviation * (deviation / together);
  });
}

/**
 * Parts >= 0 as whole numbers of 10^-`places` whose sum is that of the rounded total: each is rounded down, and what is
 * missing goes to those with the largest remainders (the method of largest remainders, Hamilton 1792).
 */
export function addingUp(parts: readonly number[], places: number): { parts: number[]; total: number } {
  const unit = 10 ** -places;
  const exact = parts.map((part) => part / unit);
  const floors = exact.map(Math.floor);
  const total = Math.round(exact.reduce((sum, part) => sum + part, 0));
  const missing = total - floors.reduce((sum, part) => sum + part, 0);
  const order = exact
    .map((part, i) => ({ i, rest: part - (floors[i] ?? 0) }))
    .sort((a, b) => b.rest - a.rest);
  const raised = new Set(order.slice(0, Math.max(0, missing)).map(({ i }) => i));
  return { parts: floors.map((part, i) => (part + (raised.has(i) ? 1 : 0)) * unit), total: total * unit };
}
