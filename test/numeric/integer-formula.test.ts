import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { parseInteger } from "../../src/numeric/integer-formula.js";

describe("integer formulas", () => {
  test.each([
    ["2^31 - 1", (1n << 31n) - 1n],
    ["65539", 65539n],
    ["7^5", 16807n],
    ["-3 + 2*(4 - 1)^2", 15n],
    ["2^3^2", 512n],
    ["-2^2", -4n],
    ["(-2)^3", -8n],
    ["2*-3", -6n],
    ["0^0", 1n],
    ["1^99999999999", 1n],
    ["(-1)^99999999999", -1n],
    ["0^5", 0n],
    ["6364136223846793005", 6364136223846793005n],
  ])("%s", (text, value) => {
    expect(parseInteger(text, "modulus")).toBe(value);
  });

  test("numbers are taken as they are", () => {
    expect(parseInteger(65539, "modulus")).toBe(65539n);
    expect(parseInteger(5n, "modulus")).toBe(5n);
  });

  test("sums, products and powers agree with BigInt arithmetic", () => {
    const small = fc.bigInt(0n, 1n << 40n);
    fc.assert(
      fc.property(small, small, fc.bigInt(0n, 9n), small, (a, b, k, c) => {
        expect(parseInteger(`${a} + ${b} * (${c} - ${a})^${k}`, "x")).toBe(a + b * (c - a) ** k);
      }),
    );
  });

  test.each([
    ["2^", '"2^" (it ends too early)'],
    ["", '"" (it ends too early)'],
    ["2 3", '"2 3" (unexpected "3")'],
    ["(2 + 3", '"(2 + 3" (a parenthesis is not closed)'],
    ["2 / 3", '"2 / 3" (unexpected "/")'],
    ["2^-1", '"2^-1" (a negative exponent)'],
    ["two", '"two" (unexpected "t")'],
    ["(".repeat(500), "a formula nested deeper than 50 levels"],
    ["1".repeat(2000), "a text of 2000 characters"],
  ])("%s is refused", (text, found) => {
    const allowed = 'a whole number or a formula of whole numbers with + - * ^ ( ), like "2^31 - 1"';
    expect(() => parseInteger(text, "modulus")).toThrow(
      new RangeError(`modulus: expected ${allowed}, found ${found}`),
    );
  });

  test.each(["9^9^9^9", "2^5000", "(2^4000)*(2^4000)", "10^10^10"])("%s is refused at once", (text) => {
    expect(() => parseInteger(text, "modulus")).toThrow(
      new RangeError(`modulus: expected a value of at most 4096 bits, found "${text}"`),
    );
  });

  test("other values are refused by type", () => {
    expect(() => parseInteger(null, "modulus")).toThrow(TypeError);
    expect(() => parseInteger([2], "modulus")).toThrow(
      new TypeError('modulus: expected a whole number or a formula like "2^31 - 1", found a list'),
    );
    expect(() => parseInteger(1.5, "modulus")).toThrow(
      new RangeError(
        'modulus: expected a whole number (write large ones as text, like "2^64 - 59"), found 1.5',
      ),
    );
    expect(() => parseInteger(2 ** 60, "modulus")).toThrow(RangeError);
  });
});
