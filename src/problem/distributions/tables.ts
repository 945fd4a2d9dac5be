/** Tables of quantiles as passes, each made once per process. */
import { normalise } from "../../numeric/log-law.js";
import type { LogLaw } from "../../numeric/log-law.js";
import { quantileTable } from "../../numeric/quantile-table.js";
import type { QuantileLaw } from "../../numeric/quantile-table.js";
import { stepTable } from "../../numeric/step-table.js";
import type { Steps } from "../../numeric/step-table.js";
import type { Pass } from "./contract.js";

const made = new Map<string, readonly Pass[]>();

function once(key: string, make: () => Pass): readonly Pass[] {
  let passes = made.get(key);
  if (passes === undefined) {
    passes = [make()];
    made.set(key, passes);
  }
  return passes;
}

/** The pass of a law whose quantile is tabulated. Throws RangeError where no table is accurate enough. */
export function piecesPass(key: string, law: () => QuantileLaw): readonly Pass[] {
  return once(key, () => ({ kind: "pieces", table: quantileTable(law()).table }));
}

/** A positive law whose two tails are both read in x = log y: form 0 gives y, form 1 y / (1 + y). */
export function bothTails(
  law: LogLaw,
  form: 0 | 1,
  scale: number,
  support: readonly [number, number],
): QuantileLaw {
  const whole = normalise(law);
  const side = (direction: 1 | -1) => ({ law: whole, direction, base: 0, sign: 1 }) as const;
  return { form, left: side(-1), right: side(1), location: 0, scale, support };
}

/** The pass of a discrete law. Throws RangeError where it has too many values. */
export function stepsPass(key: string, steps: () => Steps): readonly Pass[] {
  return once(key, () => ({ kind: "steps", table: stepTable(steps()) }));
}
