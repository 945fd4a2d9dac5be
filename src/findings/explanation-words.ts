/** An explanation in words: the vector at fault, what it predicts, how that compares with what was measured. */
import type {
  Alias,
  Estimated,
  ExplainedStructure,
  Explanation,
  PredictedBias,
} from "../record/explanation.js";
import { formatCount, formatInterval, formatPercent, formatValue } from "./format.js";

const SUBSCRIPTS = "₀₁₂₃₄₅₆₇₈₉";

/** "9 u₁ − 6 u₂ + u₃", or "wal(5 in x₁, 3 in x₂)" for a Walsh function; coordinates are counted from 1. */
export function vectorText({
  indices,
  entries,
  walsh,
}: Pick<Alias, "indices" | "entries" | "walsh">): string {
  const subscript = (k: number): string =>
    String((indices[k] ?? 0) + 1).replace(/\d/g, (digit) => SUBSCRIPTS[Number(digit)] ?? digit);
  if (walsh !== null)
    return `wal(${entries.map((entry, k) => `${formatCount(entry)} in x${subscript(k)}`).join(", ")})`;
  return entries
    .map((entry, k) => {
      const size = Math.abs(entry);
      const sign = k === 0 ? (entry < 0 ? "\u2212" : "") : entry < 0 ? " \u2212 " : " + ";
      return `${sign}${size === 1 ? "" : `${formatCount(size)}\u00a0`}u${subscript(k)}`;
    })
    .join("");
}

/** "2^30", "2^31 − 1", or the digits. */
export function modulusText(digits: string): string {
  const modulus = BigInt(digits);
  const power = modulus.toString(2).length - 1;
  if (power < 8) return digits;
  if (modulus === 1n << BigInt(power)) return `2^${power}`;
  if (modulus === (2n << BigInt(power)) - 1n) return `2^${power + 1} − 1`;
  return digits.replace(/\B(?=(\d{3})+(?!\d))/g, ",");
}

/** "15 planes, gap 0.092"; of a Walsh function that it is constant. */
export function planesText({ planes, gap, size, walsh }: Alias): string {
  if (planes === null || gap === null) return `constant on all points, base ${walsh ?? 2}`;
  const share = size > 1 - 1e-9 ? "" : `, seen by ${formatPercent(Number(size.toPrecision(3)))}`;
  return `${formatCount(planes)} planes, gap ${formatValue(gap)}${share}`;
}

/** The same combination of other coordinates, where it stands for several. */
export function copiesText({ copies }: Alias): string {
  return copies < 2 ? "" : ` (the same at ${formatCount(copies)} places along the coordinates)`;
}

/** What the structure of a source could still spoil. */
export function hazardText({ aliases, structure }: Explanation): string | null {
  const [alias] = aliases;
  if (alias === undefined || structure === null) return null;
  const { planes, gap } = alias;
  if (planes === null || gap === null)
    return `the Walsh function ${vectorText(alias)} is 1 on all its points; an integrand with a part like it would be off by that part`;
  const lie = alias.size > 1 - 1e-9 ? "all its points lie on" : "its points favour or avoid";
  const exact = `${lie} the ${formatCount(planes)} planes ${vectorText(alias)} = ${phaseText(alias)}, ${formatValue(gap)} apart`;
  return `${exact}; an integrand that varies from plane to plane would be off, whatever the number of points`;
}

function phaseText({ phase }: Alias): string {
  const turn = Math.abs(phase - Math.round(phase)) < 1e-9 ? 0 : phase;
  if (turn === 0) return "whole number";
  return turn === 0.5 ? "whole number + \u00bd" : `whole number + ${formatValue(turn)}`;
}

/** A vector and its multiples, which belong to the same planes. */
interface Bundle {
  /** The shortest of them. */
  readonly alias: Alias;
  /** What they add together, as a share of the bias. */
  readonly share: number;
}

/** The shares of the measured bias (of the predicted one where none was measured), the largest first. */
function bundlesOf({ aliases, measured, predicted }: Explanation): Bundle[] {
  const whole = measured?.value ?? predicted?.value ?? 0;
  const bundles = new Map<string, { alias: Alias; sum: number }>();
  for (const alias of aliases) {
    const { indices, entries, contribution, walsh } = alias;
    if (contribution === null) continue;
    const unit = walsh === null ? entries.reduce(gcd, 0) : 1;
    const first = alias.copies > 1 ? (indices[0] ?? 0) : 0;
    const key = `${indices.map((index) => index - first).join()}:${entries.map((entry) => entry / unit).join()}`;
    const known = bundles.get(key);
    const shorter = known === undefined || Math.hypot(...entries) < Math.hypot(...known.alias.entries);
    bundles.set(key, { alias: shorter ? alias : known.alias, sum: (known?.sum ?? 0) + contribution });
  }
  return [...bundles.values()]
    .map(({ alias, sum }) => ({ alias, share: whole === 0 ? 0 : sum / whole }))
    .sort((one, other) => other.share - one.share);
}

function gcd(a: number, b: number): number {
  return b === 0 ? Math.abs(a) : gcd(b, a % b);
}

/** Bundles beside the first that are named: those with at least this share. */
const NAMED_SHARE = 0.1;
const NAMED = 3;

/** The finding in one sentence. */
export function explanationHeadline(explanation: Explanation): string {
  const { reason, predicted, explained } = explanation;
  if (predicted === null) return `No prediction: ${reason ?? "nothing was estimated"}.`;
  if (!explained) return unexplained(explanation);
  const parts = bundlesOf(explanation)
    .filter(({ share }, i) => i === 0 || share >= NAMED_SHARE)
    .slice(0, NAMED)
    .map(({ alias, share }, i) => {
      const lead = i === 0 ? `${shareText(share)} of the bias comes from` : `${shareText(share)} from`;
      return `${lead} ${vectorText(alias)}${copiesText(alias)}: ${planesText(alias)}`;
    });
  return `${parts.join("; ")}.`;
}

/** "98 %"; several vectors of both signs make shares above 1. */
function shareText(share: number): string {
  return `${(100 * share).toFixed(0).replace("-", "\u2212")} %`;
}

/** Why the prediction does not explain what was measured. */
function unexplained({ predicted, measured, difference }: Explanation): string {
  if (predicted === null) return "No prediction.";
  const most = Math.max(...predicted.interval.map(Math.abs));
  if (hidden(predicted) && hidden(measured))
    return `No bias is predicted and none was found: the vectors taken add less than ${formatValue(most)} to this integrand.`;
  if (hidden(measured))
    return `A bias of ${formatValue(predicted.value, predicted.standardError)} is predicted, too small for this measurement to show.`;
  if (hidden(predicted))
    return "Not explained: the dual vectors looked at add nothing that shows beside the noise of the prediction.";
  if (measured === null || difference === null)
    return "Predicted only: there is no measured bias to hold it against.";
  if (!predicted.stable)
    return "Not explained: the sum over dual vectors still moves when twice as many are taken.";
  const share = predicted.value / measured.value;
  const part = share > 0 && share < 1.5 ? `; the prediction makes ${shareText(share)} of the bias` : "";
  return `Not explained in full: measured and predicted bias differ by ${formatValue(difference.value)} (${formatInterval(difference.interval)})${part}.`;
}

function counted(n: number, one: string): string {
  return `${formatCount(n)} ${n === 1 ? one : `${one}s`}`;
}

function tailWord({ stable, tail }: PredictedBias): string {
  if (stable) return "stable";
  return hidden(tail) ? "lost in noise" : "not stable";
}

/** Which points an estimate averages over, or is made of. */
export function structureText({ kind, modulus, what }: ExplainedStructure): string {
  return kind === "net"
    ? `points: ${what}`
    : `lattice of its tuples: modulus ${modulusText(modulus)}, ${what}`;
}

/** Whether an interval holds 0. */
function hidden(estimated: Estimated | null): boolean {
  return estimated !== null && estimated.interval[0] <= 0 && estimated.interval[1] >= 0;
}

/** Predicted, measured, full cycle and difference, each a line with its own words. */
export function explanationLines(explanation: Explanation): string[] {
  const { predicted, measured, difference, fullCycle } = explanation;
  const lines: string[] = [];
  const level = predicted === null ? "" : `${formatPercent(predicted.confidence)} interval `;
  if (measured !== null) {
    const error = measured.standardError;
    const how =
      error === null
        ? `one run of ${formatCount(measured.n)} points without a random start`
        : `standard error ${formatValue(error)}, ${formatCount(measured.replicates)} replicates of ${formatCount(measured.n)} points`;
    lines.push(`measured bias ${formatValue(measured.value, error)} (${how})`);
  }
  if (predicted !== null) {
    const { value, interval, standardError, pairs, source, points, replicates, tail } = predicted;
    const net = explanation.structure?.kind === "net";
    const sum = net ? counted(pairs, "Walsh function") : `${counted(pairs, "pair")} of dual vectors`;
    lines.push(
      `predicted bias ${formatValue(value, standardError)} (${level}${formatInterval(interval)}) from ${sum}, ` +
        `estimated with ${replicates} \u00d7 ${formatCount(points)} points of ${source}`,
      `unresolved tail ${formatValue(tail.value, (tail.interval[1] - tail.interval[0]) / 4)} ` +
        `(${level}${formatInterval(tail.interval)}) from as many again: ${tailWord(predicted)}`,
    );
  }
  if (fullCycle !== null && fullCycle.bias !== null)
    lines.push(
      `bias over all ${formatCount(fullCycle.states)} states ${String(Number(fullCycle.bias.toPrecision(8))).replace("-", "\u2212")} (exact average)`,
    );
  if (difference !== null) {
    const words = explanation.explained
      ? "explained"
      : hidden(measured)
        ? "nothing to explain"
        : "not explained";
    lines.push(
      `measured less predicted ${formatValue(difference.value, (difference.interval[1] - difference.interval[0]) / 4)} ` +
        `(${level}${formatInterval(difference.interval)}): ${words}`,
    );
  }
  return lines;
}
