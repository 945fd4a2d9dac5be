/** The tables of the language as Markdown, for docs/formula.md. */
import { FUNCTIONS, LIMITS, NAMED_NUMBERS, OPERATORS } from "./language.js";
import type { FunctionEntry, FunctionGroup } from "./language.js";

const GROUPS: readonly FunctionGroup[] = [
  "Vectors",
  "Rounding and sign",
  "Powers and logarithms",
  "Angles",
  "Probability",
];

const SHAPES: Readonly<Record<FunctionEntry["shape"], string>> = {
  elementwise: "element by element",
  reduction: "vector to number",
  extremum: "vector to number; several: element by element",
  pair: "two vectors to number",
  vector: "vector to vector",
};

/** Operators, functions by group, named numbers and limits. */
export function languageTables(): string {
  return [operators(), ...GROUPS.map(functions), numbers(), limits()].join("\n\n") + "\n";
}

function table(head: readonly string[], rows: readonly (readonly string[])[]): string {
  const line = (cells: readonly string[]): string => `| ${cells.join(" | ")} |`;
  return [line(head), line(head.map(() => "---")), ...rows.map(line)].join("\n");
}

function code(text: string): string {
  return `\`${text}\``;
}

function operators(): string {
  const rows = OPERATORS.map(({ signs, help }) => [signs.split("  ").map(code).join(" "), help]);
  return `## Operators, strongest first\n\n${table(["written", "means"], rows)}`;
}

function functions(group: FunctionGroup): string {
  const entries: [string, FunctionEntry][] = Object.entries(FUNCTIONS);
  const rows = entries
    .filter(([, entry]) => entry.group === group)
    .map(([name, { shape, mathjs, help }]) => [
      code(name),
      SHAPES[shape],
      help.replaceAll("|", "\\|"),
      mathjs === null ? "(own)" : code(mathjs),
    ]);
  return `## ${group}\n\n${table(["function", "shape", "what it gives", "in mathjs"], rows)}`;
}

function numbers(): string {
  const rows = Object.entries(NAMED_NUMBERS).map(([name, { value, help }]) => [
    code(name),
    String(value),
    help,
  ]);
  return `## Named numbers\n\n${table(["name", "value", "meaning"], rows)}`;
}

function limits(): string {
  const number = (value: number): string => value.toLocaleString("en-GB");
  const rows = [
    ["characters of a formula", number(LIMITS.characters)],
    ["brackets within brackets", number(LIMITS.brackets)],
    ["depth of one expression, helper functions included", number(LIMITS.depth)],
    ["operations in a chain, each waiting for the one before", number(LIMITS.chain)],
    ["operations after helper functions are expanded", number(LIMITS.operations)],
    ["elements of a vector", number(LIMITS.elements)],
    ["constant numbers that a formula makes", number(LIMITS.constantElements)],
    ["bytes for intermediate vectors", number(LIMITS.scratchBytes)],
  ];
  return `## Limits\n\n${table(["what", "at most"], rows)}`;
}
