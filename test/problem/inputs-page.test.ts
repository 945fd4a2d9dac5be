/** Every example of docs/inputs.md is a problem file that is accepted. */
import { readFile } from "node:fs/promises";
import { expect, test } from "vitest";
import { problemIn } from "./text.js";

test("the examples of docs/inputs.md are valid", async () => {
  const page = await readFile(new URL("../../docs/inputs.md", import.meta.url), "utf8");
  const examples = [...page.matchAll(/```yaml\n(.*?)```/gs)].map(([, text = ""]) => text);
  expect(examples.length).toBeGreaterThan(5);
  for (const text of examples) expect((await problemIn(text)).dimension, text).toBeGreaterThan(0);
});
