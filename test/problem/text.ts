/** Problem files as texts: what a test needs to check one without touching the disk. */
import { checkProblem } from "../../src/problem/check.js";
import type { Problem } from "../../src/problem/contract.js";
import { parseYaml } from "../../src/problem/document.js";
import { ProblemError } from "../../src/problem/errors.js";

/** The smallest problem that runs, with parts replaced or added. */
export function fileWith(parts: Readonly<Record<string, string>> = {}): string {
  const all: Record<string, string> = {
    inputs: "{ x: { distribution: uniform } }",
    integrand: "x",
    tolerance: "{ absolute: 0.01 }",
    ...parts,
  };
  return Object.entries(all)
    .map(([key, value]) => `${key}: ${value}\n`)
    .join("");
}

export function problemIn(text: string): Promise<Problem> {
  return Promise.resolve().then(() => checkProblem(parseYaml("case.yaml", text), "case"));
}

/** The lines of the refusal of `text`; fails where the text is accepted. */
export async function refusal(text: string): Promise<string[]> {
  try {
    await problemIn(text);
  } catch (error) {
    if (error instanceof ProblemError) return error.message.split("\n");
    throw error;
  }
  throw new Error(`accepted:\n${text}`);
}
