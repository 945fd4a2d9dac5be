/** Numbers in words: digits follow the uncertainty (two of its digits: JCGM 100:2008, 7.2.6). */
import { describe, expect, it } from "vitest";
import {
  formatCount,
  formatInterval,
  formatPercent,
  formatPValue,
  formatSeconds,
  formatValue,
} from "../../src/findings/format.js";

describe("values with an uncertainty", () => {
  it.each([
    // JCGM 100:2008, 7.2.6: 10.057 62 ohm with uncertainty 27 milliohm is rounded to 10.058 ohm.
    [10.05762, 0.027, "10.058"],
    [-0.0801129, 0.000985, "−0.08011"],
    [4.0517412, 0.0012, "4.0517"],
    [1234567.8, 4200, "1,234,600"],
    [1234567.8, 42, "1,234,568"],
    [0.00001, 0.02, "0.000"],
    [-0.00001, 0.02, "0.000"],
    [0, 0.5, "0.00"],
    [0.0000123456, 0.0000001, "1.235e−5"],
    [-5.9e-33, 4.4e-16, "0"],
    [12, 1000, "0"],
    [999.96, 1.2, "1,000.0"],
  ])("%d with %d", (value, uncertainty, text) => {
    expect(formatValue(value, uncertainty)).toBe(text);
  });
});

describe("values without one have two digits", () => {
  it.each([
    [0, "0"],
    [0.0123456, "0.012"],
    [0.00999, "0.010"],
    [123.4, "120"],
    [98765, "99,000"],
    [0.99999, "1.0"],
    [1.7376e-6, "1.7e−6"],
    [-1.7376e-6, "−1.7e−6"],
    [2.1e12, "2.1e12"],
    [NaN, "NaN"],
    [Infinity, "Infinity"],
  ])("%d", (value, text) => {
    expect(formatValue(value)).toBe(text);
  });
});

it("intervals take their digits from their width", () => {
  expect(formatInterval([0.0404198, 0.0733371])).toBe("0.0404 to 0.0733");
  expect(formatInterval([-0.579177, -0.411873])).toBe("−0.579 to −0.412");
});

it("counts have their thousands apart, or two or three digits in words", () => {
  expect(formatCount(262144)).toBe("262,144");
  expect(formatCount(82493, true)).toBe("82,000");
  expect(formatCount(2_040_000, true)).toBe("2.0 million");
  expect(formatCount(20_440_000, true)).toBe("20.4 million");
  expect(formatCount(7.1e9, true)).toBe("7.1 billion");
  expect(formatCount(5e12, true)).toBe("5.0 trillion");
  expect(formatCount(999_700, true)).toBe("1.0 million");
  expect(formatCount(256)).toBe("256");
});

it("durations have the unit that suits them", () => {
  const texts = [0, 2.56e-6, 0.0421, 6.2, 360, 20_000, 500_000, 1e9].map(formatSeconds);
  expect(texts).toEqual(["0 s", "2.6 µs", "42 ms", "6.2 s", "6.0 min", "5.6 h", "5.8 days", "32 years"]);
});

it("shares and p-values", () => {
  expect([0.99, 0.999, 0.95].map(formatPercent)).toEqual(["99 %", "99.9 %", "95 %"]);
  expect([0.0312, 1.5e-7, 1e-30].map(formatPValue)).toEqual(["0.031", "1.5e−7", "< 1e−12"]);
});
