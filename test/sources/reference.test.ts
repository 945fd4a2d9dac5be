// The reference page of sources is made from the registry.
import { readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { format, resolveConfig } from "prettier";
import { expect, test } from "vitest";
import { listSources } from "../../src/sources/registry.js";
import { sourceTables } from "../../src/sources/reference.js";

test("docs/sources.md holds the tables of the registry (else build, and run tools/sources-page.mjs)", async () => {
  const file = new URL("../../docs/sources.md", import.meta.url);
  const options = await resolveConfig(fileURLToPath(file));
  const tables = await format(sourceTables(), { ...options, parser: "markdown" });
  expect(readFileSync(file, "utf8").endsWith(tables)).toBe(true);
});

test("every source has a row and a publication", () => {
  const text = sourceTables();
  for (const { id } of listSources()) {
    expect(text).toContain(`| \`${id}\` |`);
    expect(text.slice(text.indexOf("## Publications"))).toContain(`\`${id}\``);
  }
});
