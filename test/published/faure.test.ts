/** Faure's sequence against data/qmc.json: exact fractions of the first 27 points in 2, 3 and 5 dimensions. */
import { expect, it } from "vitest";
import { faure } from "../../src/sources/faure.js";
import { pointsOf } from "../sources/points.js";
import { reference } from "./qmc-data.js";

it.each(Object.entries(reference.faure))("%s: first 27 points", (_, { base, first27_fractions }) => {
  const dimension = first27_fractions[0]?.length ?? NaN;
  let cells = 1n;
  while (cells * BigInt(base) <= 2n ** 52n) cells *= BigInt(base);
  const expected = first27_fractions.map((point) =>
    point.map((fraction) => {
      const [numerator = "0", denominator = "1"] = fraction.split("/");
      return (Number((BigInt(numerator) * cells) / BigInt(denominator)) + 0.5) / Number(cells);
    }),
  );
  expect(faure.generatingMatrices(dimension, 27).base).toBe(base);
  expect(pointsOf(faure, { dimension, count: 27 })).toEqual(expected);
});
