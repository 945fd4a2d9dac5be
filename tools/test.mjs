// npm test: set-up, then format, lint, types, unused code, and all tests; ends with vitest's summary.
// Arguments behind -- go to vitest: npm test -- test/formula
import { join } from "node:path";
import { root, run, setUp } from "./setup.mjs";

setUp();
const bin = (name) => join(root, "node_modules", ".bin", name);
const checks = [
  ["format", "prettier", ["--check", "--log-level", "warn", "--cache", "."]],
  ["types", "tsc", ["-p", "tsconfig.test.json"]],
  ["lint", "eslint", ["--cache", "--cache-location", "node_modules/.cache/eslint/", "."]],
  ["unused code", "knip", []],
];
for (const [title, file, args] of checks) {
  process.stderr.write(`test: ${title}\n`);
  const code = run(bin(file), args);
  if (code !== 0) process.exit(code);
}
process.exit(run(bin("vitest"), ["run", ...process.argv.slice(2)]));
