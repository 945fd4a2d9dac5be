import { expect, test } from "vitest";
import { parseCsv } from "../../src/problem/csv.js";

test("fields by column name, with quotation marks, spaces, a byte order mark and empty lines", () => {
  const table = parseCsv('\uFEFFlabel, n\n"a, b", 10\r\n\n c ,20\n', "t.csv");
  expect(table.columns).toEqual(["label", "n"]);
  expect(table.rows).toEqual([
    { line: 2, fields: { label: "a, b", n: "10" } },
    { line: 4, fields: { label: "c", n: "20" } },
  ]);
});

test("the line of a last row without an end of line", () => {
  expect(parseCsv("a\n1\n2", "t.csv").rows.map(({ line }) => line)).toEqual([2, 3]);
});

test.each([
  ["", "t.csv: expected a header line and rows below it, found no row"],
  ["a,b\n", "t.csv: expected a header line and rows below it, found no row"],
  ["a,a\n1,2\n", 't.csv: expected a header line that names each column once, found the column "a" twice'],
  ["a,\n1,2\n", "t.csv: expected a header line that names each column once, found a column without a name"],
  ["a,b\n1,2\n3\n", "t.csv:3:1: expected 2 fields as in the header line, found another number"],
  ['a,b\n1,"2\n', "t.csv:2:1: not comma-separated values (Quote Not Closed"],
])("refuses %j", (text, message) => {
  expect(() => parseCsv(text, "t.csv")).toThrow(message);
});
