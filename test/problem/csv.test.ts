import { expect, test } from "vitest";
import { parseCsv } from "../../src/problem/csv.js";

test("fields by column name, with quotation marks, spaces, a byte order mark and empty lines", () => {
  const table = parseCsv('\uFEFFlabel, n\n"a, b", 10\n\n c ,20\n', "t.csv");
  expect(table.columns).toEqual(["label", "n"]);
  expect(table.rows).toEqual([
    { line: 2, fields: { label: "a, b", n: "10" } },
    { line: 4, fields: { label: "c", n: "20" } },
  ]);
});

test.each(["a\n1\n\n2", "a\n1\n\n2\n", "a\r\n1\r\n\r\n2\r\n"])("lines of rows in %j", (text) => {
  expect(parseCsv(text, "t.csv").rows.map(({ line }) => line)).toEqual([2, 4]);
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
