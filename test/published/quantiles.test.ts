/**
 * Quantiles of the kernels against mpmath at 50 digits (data/quantiles.json, made by make/quantiles.py): within 1e-12
 * relative from u = 1e-15 to 1 - 1e-15. For laws with a location the error is relative to the larger of the value and
 * 1e-3 of its scale, as a zero of a sum of two terms has no relative accuracy.
 */
import { readFileSync } from "node:fs";
import { expect, test } from "vitest";
import { lawOf } from "../../src/problem/distributions/registry.js";
import type { DistributionId } from "../../src/problem/distributions/registry.js";
import { quantiles } from "../problem/distributions/draw.js";

interface Row {
  readonly distribution: DistributionId;
  readonly parameters: Readonly<Record<string, number>>;
  readonly values: readonly (string | null)[];
}

const { levels, rows } = JSON.parse(
  readFileSync(new URL("data/quantiles.json", import.meta.url), "utf8"),
) as { levels: readonly number[]; rows: readonly Row[] };

/** Laws whose quantile has a zero where terms of opposite sign meet. */
const WITH_ZERO = new Set(["gumbel", "truncated-normal"]);

test.each(rows.map((row) => [`${row.distribution} ${JSON.stringify(row.parameters)}`, row] as const))(
  "%s",
  (_, { distribution, parameters, values }) => {
    const found = quantiles(lawOf(distribution, parameters), levels);
    for (const [i, text] of values.entries()) {
      if (text === null) continue;
      const exact = Number(text);
      const size = WITH_ZERO.has(distribution) ? Math.max(Math.abs(exact), 1e-3) : Math.abs(exact);
      const error = Math.abs((found[i] ?? NaN) - exact);
      expect(error, `u = ${levels[i]}: ${found[i]} against ${text}`).toBeLessThanOrEqual(1e-12 * size);
    }
  },
);
