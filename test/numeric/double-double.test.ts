/** Exponential and logarithm in double-double arithmetic against mpmath 1.3.0 at 50 digits: [x, high, low]. */
import { expect, test } from "vitest";
import { exponential, fromNumber, logarithm, subtract } from "../../src/numeric/double-double.js";

const EXPONENTIALS = [
  [1, 2.718281828459045, 1.4456468917292502e-16],
  [-30.5, 5.675685232632723e-14, -2.744021414416088e-30],
  [200.25, 9.278333978592355e86, -6.7649200889856955e69],
  [0.001, 1.0010005001667084, -4.290842058948394e-17],
] as const;
const LOGARITHMS = [
  [3, 1.0986122886681098, -9.07129723500153e-17],
  [0.0625001, -2.7725871222410614, 2.1779538325722248e-16],
  [10000000000.0, 23.025850929940457, -3.94399383981999e-16],
] as const;

test.each(EXPONENTIALS)("e^%d", (x, high, low) => {
  const miss = subtract(exponential(fromNumber(x)), { high, low }).high;
  expect(Math.abs(miss)).toBeLessThan(1e-29 * high);
});

test.each(LOGARITHMS)("log %d", (x, high, low) => {
  const miss = subtract(logarithm(fromNumber(x)), { high, low }).high;
  expect(Math.abs(miss)).toBeLessThan(1e-30 * Math.abs(high));
});
