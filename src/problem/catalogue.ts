/** The problems that come with the program: folders under `problems/` at the root of the package. */
import { readdir } from "node:fs/promises";
import { join } from "node:path";
import { fileURLToPath } from "node:url";

const ROOT = fileURLToPath(new URL("../../problems/", import.meta.url));

/** The folder of a shipped suite. */
export function shippedFolder(suite: string): string {
  return join(ROOT, suite);
}

/** Names of the shipped suites, sorted. */
export async function shippedSuites(): Promise<string[]> {
  const entries = await readdir(ROOT, { withFileTypes: true });
  return entries
    .filter((entry) => entry.isDirectory())
    .map((entry) => entry.name)
    .sort();
}

/** The file of a shipped problem that is named as suite/problem, or null. */
export async function shippedProblemFile(name: string): Promise<string | null> {
  const [suite = "", problem = "", ...rest] = name.split("/");
  if (rest.length > 0 || !(await shippedSuites()).includes(suite)) return null;
  const files = await readdir(shippedFolder(suite));
  const file = `${problem}.yaml`;
  return problem !== "" && problem !== "suite" && files.includes(file)
    ? join(shippedFolder(suite), file)
    : null;
}
