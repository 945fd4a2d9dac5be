import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { parseSizes } from "../../src/problem/sizes.js";

describe("sizes of a study", () => {
  test.each([
    ["2^8..2^12", [256, 512, 1024, 2048, 4096]],
    ["100..800", [100, 200, 400, 800]],
    ["1000..1000000 by 10", [1000, 10_000, 100_000, 1_000_000]],
    ["1000 .. 1000000 by 10^3", [1000, 1_000_000]],
    ["4096", [4096]],
    ["1000, 500,2^4", [16, 500, 1000]],
    [4096, [4096]],
    [
      [1000, "2^4", 500],
      [16, 500, 1000],
    ],
    ["2^40", [2 ** 40]],
  ])("%j", (given, sizes) => {
    expect(parseSizes(given)).toEqual(sizes);
  });

  const whole = "expected a whole number from 2 to 2^40, as digits or a power such as 2^16, found";
  test.each([
    ["1..8", `${whole} "1"`],
    ["2^8..", `${whole} "2^8.."`],
    ["many", `${whole} "many"`],
    ["1e3.5", `${whole} "1e3.5"`],
    ["-8", `${whole} "-8"`],
    ["2^41", `${whole} "2^41"`],
    [Number.NaN, `${whole} NaN`],
    [2.5, `${whole} 2.5`],
    [[16, 1], `${whole} 1`],
    ["16..64 by 1", `${whole} "1"`],
    ["64..16", 'expected sizes that grow, found "64..16"; swap the two ends'],
    [
      "100..1000",
      '"100..1000" grows by factors of 2 to 800, then 1600, and misses its end 1000; end it at 800 or 1600, or write a list',
    ],
    [[16, 32, 16], "expected different sizes, found 16 twice"],
  ])("%j is refused", (given, message) => {
    expect(() => parseSizes(given)).toThrow(new RangeError(message));
  });

  test("a list of too many sizes is refused", () => {
    const sizes = Array.from({ length: 65 }, (_, i) => 2 + i);
    expect(() => parseSizes(sizes)).toThrow("expected at most 64 sizes, found 65; take a larger factor");
  });

  test("a range begins and ends where it says and grows by its factor", () => {
    const ends = fc.tuple(
      fc.integer({ min: 2, max: 50 }),
      fc.integer({ min: 0, max: 6 }),
      fc.integer({ min: 2, max: 12 }),
    );
    fc.assert(
      fc.property(ends, ([from, steps, by]) => {
        const sizes = parseSizes(`${from}..${from * by ** steps} by ${by}`);
        expect(sizes).toEqual(Array.from({ length: steps + 1 }, (_, i) => from * by ** i));
      }),
    );
  });
});
