import { describe, expect, test } from "vitest";
import { parseYaml } from "../../src/problem/document.js";

const document = parseYaml(
  "case.yaml",
  [
    "title: plain text", // 1
    "inputs: # a comment", // 2
    "  x: { distribution: uniform,", // 3
    "       length: 3 }", // 4
    "integrand: |", // 5
    "", // 6
    "    y = x + 1", // 7
    "    sum(y)", // 8
    'quoted: "a + b"', // 9
    "folded: >", // 10
    "  a +", // 11
    "  b", // 12
    "list: [1, 2, three]", // 13
    "2: number as a key", // 14
    "nothing:", // 15
    "",
  ].join("\n"),
);

describe("places", () => {
  test.each([
    [["title"], 1, 8],
    [["inputs", "x"], 3, 6],
    [["inputs", "x", "length"], 4, 16],
    [["list", 2], 13, 14],
    [["2"], 14, 4],
    [["inputs", "x", "missing", "deeper"], 3, 6],
    [["none"], 1, 1],
  ])("the value at %j", (path, line, column) => {
    expect(document.place(path)).toEqual({ line, column });
  });

  test("keys", () => {
    expect(document.keyPlace(["inputs", "x", "length"])).toEqual({ line: 4, column: 8 });
    expect(document.keyPlace(["nothing"])).toEqual({ line: 15, column: 1 });
  });

  test.each([
    // Line 1 of the text is the empty line 6 of the file, line 2 its line 7.
    ["integrand", { line: 2, column: 5 }, { line: 7, column: 9 }],
    ["integrand", { line: 3, column: 1 }, { line: 8, column: 5 }],
    ["title", { line: 1, column: 7 }, { line: 1, column: 14 }],
    ["quoted", { line: 1, column: 5 }, { line: 9, column: 14 }],
    ["folded", { line: 1, column: 5 }, { line: 10, column: 9 }],
  ])("inside the text of %s", (key, at, place) => {
    expect(document.inside([key], at)).toEqual(place);
  });
});

test("data and sources", () => {
  expect(document.value).toEqual({
    title: "plain text",
    inputs: { x: { distribution: "uniform", length: 3 } },
    integrand: "\ny = x + 1\nsum(y)\n",
    quoted: "a + b",
    folded: "a + b\n",
    list: [1, 2, "three"],
    2: "number as a key",
    nothing: null,
  });
  expect(document.source(["inputs", "x", "length"])).toBe("3");
  expect(document.source(["inputs"])).toBeNull();
  expect(document.has(["nothing"])).toBe(true);
  expect(document.has(["none"])).toBe(false);
});

test.each([
  ["yes", "yes"],
  ["0o17", 15],
  ["0x1F", 31],
  ["017", 17],
  ["1_000", "1_000"],
  ["2^8", "2^8"],
  ["1e-4", 1e-4],
  ["12:30", "12:30"],
  ["2026-04-01", "2026-04-01"],
  ["~", null],
  ["true", true],
  ["9007199254740991", 9007199254740991],
  ["9007199254740993", "9007199254740993"],
  ["-18446744073709551616", "-18446744073709551616"],
])("scalar %s by the core schema of YAML 1.2", (text, value) => {
  expect(parseYaml("case.yaml", `a: ${text}\n`).value).toEqual({ a: value });
});
