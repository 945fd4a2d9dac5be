/**
 * Niederreiter's sequence in base 2 against data/qmc.json: the first 16 points of GSL 2.7.1 (gsl_qrng_niederreiter_2, 12
 * dimensions), equal there to Boost.Random 1.74.
 */
import { expect, it } from "vitest";
import { niederreiter } from "../../src/sources/niederreiter.js";
import { digitsOf, pointsOf } from "../sources/points.js";
import { reference } from "./qmc-data.js";

it("first 16 points in 12 dimensions, numerators over 2^32", () => {
  const points = pointsOf(niederreiter, { dimension: 12, count: 16 });
  const numerators = points.map((point) => point.map((u) => digitsOf(u) >> 20n));
  expect(numerators).toEqual(
    reference.niederreiter_base2_gsl.numerators_2_32.map((point) => point.map(BigInt)),
  );
});
