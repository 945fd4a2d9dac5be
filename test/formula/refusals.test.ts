/** What is not in the language is refused, with its place and in the words that a user reads; hostile texts quickly. */
import { expect, test } from "vitest";
import { FormulaError } from "../../src/formula/contract.js";
import type { FormulaScope } from "../../src/formula/contract.js";
import { compileFormula } from "../../src/formula/index.js";

const SCOPE: FormulaScope = {
  inputs: [
    { name: "x", length: 4, first: 0 },
    { name: "y", length: null, first: 4 },
  ],
  constants: {
    a: 2,
    M: [
      [1, 2, 3, 4],
      [5, 6, 7, 8],
    ],
  },
};

async function refusal(text: string): Promise<string> {
  try {
    await compileFormula(text, SCOPE);
  } catch (error) {
    if (error instanceof FormulaError) {
      return `${error.position.line}:${error.position.column} ${error.message}`;
    }
    throw error;
  }
  return "compiled";
}

test.each([
  ["x.constructor", '1:2 unexpected "."; there is no access to properties in the formula language'],
  ["import({})", '1:8 unexpected "{"; there are no objects in the formula language'],
  ['createUnit("a")', '1:12 unexpected "\\""; there are no strings in the formula language'],
  ["evaluate(y)", '1:1 unknown function "evaluate"; `tolerand functions` lists them all'],
  ["smu(x)", '1:1 unknown function "smu"; did you mean "sum"?'],
  ["y +\n  (xx + 1)", '2:4 unknown name "xx"; did you mean "x"?'],
  ["i", '1:1 unknown name "i"; known here: a, M, x, y'],
  ["sum(x^2)", "1:6 ^ of a vector of 4 and a number has no clear meaning; write .^ for element by element"],
  [
    "sum(x / x)",
    "1:7 / of a vector of 4 and a vector of 4 has no clear meaning; write ./ for element by element",
  ],
  ["2 y", "1:3 an operator is missing; write * for a product"],
  ["b = 3", "1:1 the last line must be an expression, the value of the formula"],
  [
    "y; y",
    "1:1 only the last line may be an expression without a name; write name = ... to use a value later",
  ],
  [
    "x",
    "1:1 the formula gives a vector of 4; it must give a number. Take sum, mean or max of it, or one element",
  ],
  ["sin()", "1:1 sin takes one argument; found 0"],
  ["cumsum(y)", "1:1 cumsum needs a vector; found a number"],
  ["sum(x[1:2] + x)", "1:12 + needs vectors of one length; found 2 and 4"],
  ["M * [1, 2]", "1:3 * does not go with a matrix of 2 by 4 and a vector of 2"],
  ["x[5]", "1:2 index 5 is outside 1 to 4"],
  ["x[y]", "1:2 an index must be constant; it cannot depend on the inputs"],
  ["x[1.5]", "1:2 an index must be an integer; found 1.5"],
  ["end", "1:1 end has a meaning only within square brackets"],
  ["x[:]", "1:3 a range needs both its ends; write 1:end for all elements"],
  ["[1, 2", '1:1 "[" is never closed'],
  ["(y]", '1:3 "]" found where "(" is still open'],
  ["y!", '1:2 unexpected "!"; write not for a condition, gamma(a + 1) for a factorial'],
  ["5 % y", '1:3 unexpected "%"; write mod(a, b) for a remainder, a / 100 for per cent'],
  ["0x1F", "1:1 only decimal numbers are allowed, such as 12, 0.5 or 1e-3"],
  ["3 + * 4", "1:5 the formula cannot be read here: value expected"],
  ["x = 3\ny", '1:1 the name "x" is taken by an input; choose another'],
  ["b = 1\nb = 2\nb", '2:1 the name "b" is taken by line 1; choose another'],
  ["sum = 1\ny", '1:1 the name "sum" is taken by a function; choose another'],
  [
    "f(n) = f(n - 1)\nf(3)",
    '1:8 "f" uses itself; helper functions are expanded in place and cannot be recursive',
  ],
  ["f(p) = p + q\ny", '1:12 unknown name "q"; known here: a, M, x, y'],
  ["f(p) = p\nf(1, 2)", "2:1 f takes one argument; found 2"],
  ["y(2)", '1:1 "y" is not a function; write * for a product, y[i] for an element'],
  ["sum", '1:1 "sum" is a function; give it its arguments in round brackets'],
  ["[[y, 1], [2, 3]] * [1, 2]", "1:1 a matrix must be constant; it cannot depend on the inputs"],
  ["", "1:1 the formula is empty; write an expression, such as sum(x)"],
])("%j is refused", async (text, message) => {
  expect(await refusal(text)).toBe(message);
});

const doubling = [
  "f0(p) = p + p",
  ...Array.from({ length: 30 }, (_, i) => `f${i + 1}(p) = f${i}(f${i}(p))`),
  "f30(y)",
];
const chain = ["b0 = y", ...Array.from({ length: 3000 }, (_, i) => `b${i + 1} = b${i} * y + 1`), "b3000"];

// Quick and small by the limits that they run into; the message says which.
test.each([
  ["10,000 nested parentheses", "(".repeat(10_000) + "1" + ")".repeat(10_000), "1:65 more than 64 brackets"],
  ["1 MB of text", "1+".repeat(500_000) + "1", "1:1 the formula has 1,000,001 characters"],
  ["a vector of 10^9", "sum(1:1e9)", "1:6 a vector of 1,000,000,000 elements"],
  ["30,000 powers", "2^".repeat(30_000) + "2", "1:1 the expression is more than 600 operations deep"],
  ["30,000 terms", "1+".repeat(30_000) + "1", "1:1 the expression is more than 600 operations deep"],
  ["60,000 signs", "-".repeat(60_000) + "y", "1:1 the expression is more than 600 operations deep"],
  ["9,000 conditionals", "y>0?1:".repeat(9_000) + "1", "1:1 the expression is more than 600 operations deep"],
  ["2^30 expansions", doubling.join("\n"), "1:11 a chain of more than 1,500 operations"],
  ["3,000 dependent lines", chain.join("\n"), "751:17 a chain of more than 1,500 operations"],
  [
    "30,000 written elements",
    `sum([${"y,".repeat(30_000)}y])`,
    "1:5 the formula expands to more than 20,000 operations",
  ],
  [
    "long constant vectors",
    "sum((1:1000000) + (2:1000001) + (3:1000002))",
    "1:35 the formula makes more than 4,000,000",
  ],
])("hostile: %s", async (_, text, beginning) => {
  expect((await refusal(text)).slice(0, beginning.length)).toBe(beginning);
});

test("inputs longer than any vector may be are refused", async () => {
  const scope = { inputs: [{ name: "x", length: 1e9, first: 0 }], constants: {} };
  await expect(compileFormula("sum(x)", scope)).rejects.toThrow("a vector of 1,000,000,000 elements");
});

test("more memory for intermediate vectors than allowed is refused", async () => {
  const scope = { inputs: [{ name: "x", length: 1_000_000, first: 0 }], constants: {} };
  const error =
    "the formula needs 128,000,000 bytes for intermediate vectors; at most 67,108,864 are allowed";
  await expect(compileFormula("sum(sort(x)[1:2]) + sum(sort(x .* x)[1:2])", scope)).rejects.toThrow(error);
});
