/** What a refused problem file says, word for word: place, what was found, what is allowed. */
import { describe, expect, test } from "vitest";
import { fileWith, problemIn, refusal } from "./text.js";

describe("form", () => {
  test("an unknown key names the nearest known one and its line", async () => {
    expect(await refusal(`${fileWith()}tolerence: { absolute: 1 }\n`)).toEqual([
      'case.yaml:4:1: unknown key "tolerence"; did you mean "tolerance"? known keys here: title, about, inputs, dependence, ' +
        "constants, integrand, quantity, reference, tolerance, declared, inUse, study",
    ]);
  });

  test("an unknown key further down says where", async () => {
    expect(await refusal(fileWith({ inputs: "{ x: { distribution: uniform, lenght: 3 } }" }))).toEqual([
      'case.yaml:1:39: unknown key "lenght" in inputs.x; did you mean "length"? known keys here: distribution, length, from, to',
    ]);
    expect(await refusal(fileWith({ study: "{ replicats: 3 }" }))).toEqual([
      'case.yaml:4:10: unknown key "replicats" in study; did you mean "replicates"? known keys here: sources, sizes, ' +
        "replicates, estimators, falseAlarms, seed",
    ]);
  });

  test("a far-off key gets no guess", async () => {
    expect((await refusal(`${fileWith()}xyzzy: 1\n`))[0]).toMatch(
      /^case\.yaml:4:1: unknown key "xyzzy"; known keys/,
    );
  });

  test("missing keys are named with what they hold", async () => {
    expect(await refusal("title: x\n")).toEqual([
      "case.yaml:1:1: inputs is missing; expected a mapping from names to inputs such as x: { distribution: uniform }",
      "case.yaml:1:1: integrand is missing; expected the integrand, as text in the formula language",
      "case.yaml:1:1: tolerance is missing; expected a mapping such as { absolute: 0.01, confidence: 0.99 }",
    ]);
    expect(await refusal(fileWith({ reference: "{ value: 1 }" }))).toEqual([
      "case.yaml:4:1: reference.basis is missing; expected the published source or the derivation of the value, as text",
    ]);
  });

  test.each([
    ["integrand", "5", "2:12: integrand: expected the integrand, as text in the formula language, found 5"],
    ["integrand", '""', '2:12: integrand: expected the integrand, as text in the formula language, found ""'],
    [
      "inputs",
      "{ x: { distribution: normall } }",
      '1:30: inputs.x.distribution: expected a distribution such as uniform or normal (`tolerand distributions` lists them), found "normall"',
    ],
    [
      "inputs",
      "{}",
      "1:9: inputs: expected at least one input such as x: { distribution: uniform }, found an empty mapping",
    ],
    [
      "inputs",
      "{ 2x: { distribution: uniform } }",
      '1:11: inputs: expected a name of letters, digits and _ that begins with a letter, found "2x"',
    ],
    [
      "inputs",
      "[x]",
      '1:9: inputs: expected a mapping from names to inputs such as x: { distribution: uniform }, found ["x"]',
    ],
    [
      "quantity",
      "median",
      '4:11: quantity: expected mean, probability, ratio, variance, { quantile: 0.99 } or { shortfall: 0.975 }, found "median"',
    ],
    ["quantity", "{ quantile: 1 }", "4:23: quantity.quantile: expected a level between 0 and 1, found 1"],
    [
      "quantity",
      "probability",
      "4:11: quantity: a probability needs an integrand that is a condition, such as x > 1, found one that gives a number; write the condition, or ask for its mean",
    ],
    [
      "quantity",
      "ratio",
      "2:12: integrand: the formula gives a number; a ratio needs two numbers: let the last line be [above, below]",
    ],
    [
      "constants",
      "{ a: .nan }",
      "4:17: constants.a: expected a number, a formula, a vector such as [1, 2, 3] or a matrix such as [[1, 2], [3, 4]], found NaN",
    ],
    [
      "constants",
      "{ a: [] }",
      "4:17: constants.a: expected a number, a formula, a vector such as [1, 2, 3] or a matrix such as [[1, 2], [3, 4]], found []",
    ],
    [
      "study",
      "{ sources: philox4x32 }",
      '4:19: study.sources: expected a list of sources such as [philox4x32, sobol+owen], found "philox4x32"',
    ],
  ])("%s: %s", async (key, value, message) => {
    expect(await refusal(fileWith({ [key]: value }))).toEqual([`case.yaml:${message}`]);
  });

  test("a file that is no mapping", async () => {
    const keys =
      "title, about, inputs, dependence, constants, integrand, quantity, reference, tolerance, declared, inUse, study";
    const say = (found: string) => [
      `case.yaml:1:1: expected a mapping with the keys ${keys}; found ${found}`,
    ];
    expect(await refusal("")).toEqual(say("nothing"));
    expect(await refusal("just text\n")).toEqual(say('"just text"'));
    expect(await refusal("- 1\n- 2\n")).toEqual(say("[1,2]"));
  });
});

describe("meaning", () => {
  test.each([
    ["tolerance", "{ absolute: 0 }", "3:24: tolerance.absolute: expected a number above 0, found 0"],
    ["tolerance", "{ absolute: -1 }", "3:24: tolerance.absolute: expected a number above 0, found -1"],
    [
      "tolerance",
      "{ absolute: .nan }",
      "3:24: tolerance.absolute: expected a number above 0, or a formula, found NaN",
    ],
    [
      "tolerance",
      "{ absolute: .inf }",
      "3:24: tolerance.absolute: expected a number above 0, or a formula, found Infinity",
    ],
    [
      "tolerance",
      "{ absolute: 1, confidence: 0.5 }",
      "3:39: tolerance.confidence: expected a confidence above 0.5 and below 1, such as 0.99, found 0.5",
    ],
    [
      "tolerance",
      "{ absolute: 1, confidence: 1 }",
      "3:39: tolerance.confidence: expected a confidence above 0.5 and below 1, such as 0.99, found 1",
    ],
    [
      "tolerance",
      "{}",
      "3:12: tolerance: expected absolute or relative, found neither; add one such as absolute: 0.01",
    ],
    [
      "tolerance",
      "{ absolute: 1, relative: 1 }",
      "3:12: tolerance: expected absolute or relative, found both; keep one of them",
    ],
    [
      "tolerance",
      "{ absolute: 1, to: reference }",
      '3:31: tolerance.to: only a relative tolerance has "to"; remove it, or write relative for absolute',
    ],
    [
      "tolerance",
      "{ relative: 0.1, to: notional }",
      '3:33: tolerance.to: expected reference or a constant that is a number (reference), found "notional"',
    ],
    [
      "inputs",
      "{ x: { distribution: uniform, length: 0 } }",
      "1:47: inputs.x.length: expected a whole number from 1 to 65536, found 0",
    ],
    [
      "inputs",
      "{ x: { distribution: uniform, length: 2.5 } }",
      "1:47: inputs.x.length: expected a whole number from 1 to 65536, found 2.5",
    ],
    [
      "inputs",
      "{ x: { distribution: uniform, length: 40000 }, y: { distribution: normal, length: 40000 } }",
      "1:9: inputs: expected at most 65536 coordinates in all, found 80000; shorten them",
    ],
    [
      "inputs",
      "{ toString: { distribution: uniform } }",
      '1:11: the name "toString" is reserved; take another',
    ],
    ["constants", "{ x: 1 }", '1:11: "x" is an input and a constant; give one of them another name'],
    [
      "constants",
      "{ m: [[1, 2], [3]] }",
      "4:26: constants.m item 2: expected rows of one length, found 2 and 1 numbers; complete the row",
    ],
    [
      "reference",
      "{ value: 1, uncertainty: -1, basis: b }",
      "4:37: reference.uncertainty: expected a number of 0 or more, found -1",
    ],
    [
      "reference",
      "{ value: 1 / 0, basis: b }",
      '4:21: reference.value: expected a finite number, found Infinity (from "1 / 0")',
    ],
    [
      "inUse",
      "{ source: mt19937, points: 1 }",
      "4:35: inUse.points: expected a whole number from 2 to 2^40, found 1",
    ],
    [
      "declared",
      "[{ line: step, basis: b }]",
      "4:12: declared item 1: expected bias or deviation, found neither; give one of them",
    ],
    [
      "declared",
      "[{ line: step, bias: 0.1 }]",
      "4:12: declared item 1.basis is missing; expected where the figure comes from, as text",
    ],
    [
      "study",
      "{ replicates: 1 }",
      "4:22: study.replicates: expected a whole number from 2 to 100000, found 1",
    ],
    [
      "study",
      "{ falseAlarms: 0.5 }",
      "4:23: study.falseAlarms: expected a number above 0 and below 0.5, such as 0.01, found 0.5",
    ],
    [
      "study",
      "{ seed: 2^60 }",
      '4:16: study.seed: expected a whole number from 0 to 2^53 - 1, found 1152921504606847000 (from "2^60")',
    ],
    [
      "study",
      "{ seed: 9007199254740993 }",
      '4:16: study.seed: expected a whole number from 0 to 2^53 - 1, found 9007199254740992 (from "9007199254740993")',
    ],
    [
      "study",
      "{ estimators: [crud] }",
      '4:23: study.estimators item 1: expected one of crude, found "crud"; did you mean "crude"?',
    ],
    [
      "study",
      "{ sources: [pcg64, pcg64] }",
      '4:27: study.sources item 2: expected each source once, found "pcg64" again; remove it',
    ],
    [
      "study",
      "{ sizes: 8..4 }",
      '4:17: study.sizes: expected sizes that grow, found "8..4"; swap the two ends',
    ],
  ])("%s: %s", async (key, value, message) => {
    expect(await refusal(fileWith({ [key]: value }))).toEqual([`case.yaml:${message}`]);
  });

  test("a tolerance relative to a value of 0", async () => {
    const reference = "{ value: 0, basis: symmetry }";
    expect(await refusal(fileWith({ tolerance: "{ relative: 0.1 }", reference }))).toEqual([
      "case.yaml:3:12: tolerance: a tolerance relative to the reference has no size, as its value is 0; write an absolute one",
    ]);
    const parts = { tolerance: "{ relative: 0.1, to: unit }", constants: "{ unit: 0 }" };
    expect(await refusal(fileWith(parts))).toEqual([
      "case.yaml:3:12: tolerance: a tolerance relative to the constant unit has no size, as its value is 0; write an absolute one",
    ]);
  });

  test("all findings of a file come together, from the top down", async () => {
    const text = fileWith({
      inputs: "{ x: { distribution: gama } }",
      tolerance: "{ absolute: -1, confidence: 2 }",
      study: "{ replicates: 0 }",
    });
    expect((await refusal(text)).map((line) => line.split(": ")[0])).toEqual([
      "case.yaml:1:30",
      "case.yaml:3:24",
      "case.yaml:3:40",
      "case.yaml:4:22",
    ]);
  });

  test("broken constants are not repeated by the formulas that use them", async () => {
    const reference = "{ value: a + 1, basis: arithmetic }";
    expect(
      await refusal(fileWith({ constants: "{ pi: 3, a: pi / 2 }", reference, study: '{ seed: "-1" }' })),
    ).toEqual([
      'case.yaml:4:14: the name "pi" is a number of the formula language; take another',
      'case.yaml:6:16: study.seed: expected a whole number from 0 to 2^53 - 1, found -1 (from "-1")',
    ]);
  });

  test("many findings are cut and counted", async () => {
    const text = fileWith() + Array.from({ length: 30 }, (_, i) => `wrong${i}: 1\n`).join("");
    const lines = await refusal(text);
    expect(lines).toHaveLength(21);
    expect(lines.at(-1)).toBe("... and 10 more; mend these first");
  });
});

describe("what is accepted", () => {
  test("four keys are enough", async () => {
    expect(await problemIn(fileWith())).toEqual({
      id: "case",
      title: "case",
      about: "",
      dimension: 1,
      inputs: [{ name: "x", distribution: "uniform", length: null, first: 0 }],
      constants: {},
      integrand: "x",
      quantity: "mean",
      reference: null,
      tolerance: { absolute: 0.01, relative: null, to: "reference", confidence: 0.99 },
      inUse: null,
      study: {},
    });
  });

  test("inputs take their coordinates in order; lengths may be formulas of constants", async () => {
    const { inputs, dimension } = await problemIn(
      fileWith({
        constants: "{ weeks: 64 }",
        integrand: "sum(a) + b + sum(c)",
        inputs:
          "{ a: { distribution: normal, length: weeks / 2 }, b: { distribution: uniform }, c: { distribution: normal, length: 2^3 } }",
      }),
    );
    expect(inputs.map(({ first, length }) => [first, length])).toEqual([
      [0, 32],
      [32, null],
      [33, 8],
    ]);
    expect(dimension).toBe(41);
  });

  test("a constant may use those before it", async () => {
    const { constants, reference } = await problemIn(
      fileWith({
        constants: '{ a: 4, b: a / 2, v: [a, b, "1/3"], m: [[1, b], [3, 4]] }',
        reference: "{ value: a * b + 0.5, basis: arithmetic }",
      }),
    );
    expect(constants).toEqual({
      a: 4,
      b: 2,
      v: [4, 2, 1 / 3],
      m: [
        [1, 2],
        [3, 4],
      ],
    });
    expect(reference).toEqual({ value: 8.5, text: "a * b + 0.5", uncertainty: 0, basis: "arithmetic" });
  });

  test("digits beyond double precision are kept as written and rounded once", async () => {
    const { reference } = await problemIn(
      fileWith({ reference: "{ value: 1.4142135623730950488016887242097, basis: square root of two }" }),
    );
    expect(reference?.value).toBe(Math.SQRT2);
    expect(reference?.text).toBe("1.4142135623730950488016887242097");
  });

  test("a relative tolerance is known where what it refers to is known", async () => {
    const reference = "{ value: -8, basis: arithmetic }";
    const known = await problemIn(fileWith({ tolerance: "{ relative: 0.25 }", reference }));
    expect(known.tolerance).toEqual({ absolute: 2, relative: 0.25, to: "reference", confidence: 0.99 });
    const later = await problemIn(fileWith({ tolerance: "{ relative: 0.25, confidence: 0.9 }" }));
    expect(later.tolerance).toEqual({ absolute: null, relative: 0.25, to: "reference", confidence: 0.9 });
    const unit = await problemIn(
      fileWith({ constants: "{ unit: 3 }", tolerance: "{ relative: 0.5, to: unit }" }),
    );
    expect(unit.tolerance.absolute).toBe(1.5);
  });

  test("declared contributions and what is in use are kept", async () => {
    const problem = await problemIn(
      fileWith({
        declared:
          "[{ line: time step, bias: 0.002, basis: halved step }, { line: data, deviation: 1e-3, basis: resampling }]",
        inUse: "{ source: mt19937, points: 10^5, secondsPerPoint: 2e-5 }",
      }),
    );
    expect(problem.declared).toEqual([
      { line: "time step", kind: "bias", value: 0.002, basis: "halved step" },
      { line: "data", kind: "random", value: 0.001, basis: "resampling" },
    ]);
    expect(problem.inUse).toEqual({ source: "mt19937", points: 100_000, secondsPerPoint: 2e-5 });
  });

  test("whole numbers beyond 2^53 in a source of one's own keep their digits", async () => {
    const { study } = await problemIn(
      fileWith({
        study:
          "{ sources: [{ name: house, congruential: { modulus: 18446744073709551616, multiplier: 5 } }] }",
      }),
    );
    expect(study.sources).toEqual([
      { name: "house", congruential: { modulus: "18446744073709551616", multiplier: 5 } },
    ]);
  });
});
