/** Texts that are meant to exhaust memory or time, or that are no YAML: refused with a place and within bounds. */
import { mkdtemp, rm, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { LARGEST_FILE, parseYaml, readText } from "../../src/problem/document.js";
import { ProblemError } from "../../src/problem/errors.js";
import { fileWith, refusal } from "./text.js";

const MEGABYTE = 1024 * 1024;

describe("what YAML allows and a problem file has no use for", () => {
  test.each([
    ["an anchor", "a: &x [1]\nb: *x\n", 'case.yaml:1:4: anchor "&x" is not allowed; write the value out'],
    ["an alias", "b: *x\n", 'case.yaml:1:4: alias "*x" is not allowed; write the value out'],
    [
      "a tag",
      "a: !!binary aGk=\n",
      'case.yaml:1:4: tag "!!binary" is not allowed; write plain text and numbers',
    ],
    [
      "a directive",
      "%YAML 1.1\n---\na: yes\n",
      'case.yaml:1:1: directive "%YAML 1.1" is not allowed; remove the line',
    ],
  ])("%s", async (_, text, message) => {
    expect(await refusal(text)).toEqual([message]);
  });

  test("a key that is given twice", async () => {
    expect(await refusal(`${fileWith()}integrand: x^2\n`)).toEqual([
      'case.yaml:4:1: key "integrand" is given twice, first on line 2; keep one of them',
    ]);
  });

  test("a key that would reach into every object", async () => {
    expect(await refusal(`${fileWith()}__proto__: { x: 1 }\n`)).toEqual([
      "case.yaml:4:1: expected a name as the key, found something else; write `name: value`",
    ]);
    expect(Object.hasOwn(Object.prototype, "x")).toBe(false);
  });

  test("a list as a key", async () => {
    expect(await refusal("? [1, 2]\n: 3\n")).toEqual([
      "case.yaml:1:3: expected a name as the key, found something else; write `name: value`",
    ]);
  });

  test("tabs as indentation", async () => {
    expect(await refusal("inputs:\n\tx: 1\n")).toEqual([
      "case.yaml:2:1: not valid YAML: Tabs are not allowed as indentation; mend the text here",
    ]);
  });

  test("two documents in one file", async () => {
    const lines = await refusal("a: 1\n---\nb: 2\n");
    expect(lines[0]).toMatch(/^case\.yaml:2:1: not valid YAML: Source contains multiple documents/);
  });

  test("a bracket that is never closed", async () => {
    const lines = await refusal("inputs: [1, 2\n");
    expect(lines[0]).toMatch(/^case\.yaml:2:1: not valid YAML: Flow sequence in block collection must be/);
  });
});

describe("texts that grow", () => {
  const deep = "nested more than 32 deep; a problem file needs at most five levels";
  const tokens = "expected at most 200000 YAML tokens; shorten the file";
  const bomb = ["a: &a [1, 1]", ...Array.from({ length: 30 }, (_, i) => `b${i}: &b${i} [*a, *a]`)].join("\n");
  test.each([
    ["aliases of aliases", bomb, 'case.yaml:1:4: anchor "&a" is not allowed; write the value out'],
    ["a million opening brackets", "[".repeat(MEGABYTE), `case.yaml:1:33: ${deep}`],
    ["a million opening braces", "{".repeat(MEGABYTE), `case.yaml:1:33: ${deep}`],
    ["lists in lists on one line", "- ".repeat(MEGABYTE / 2), `case.yaml:1:65: ${deep}`],
    ["keys of keys on one line", "? ".repeat(MEGABYTE / 2), `case.yaml:1:65: ${deep}`],
    ["half a million numbers", `a: [${"1,".repeat(MEGABYTE / 2)}1]`, `case.yaml:1:133334: ${tokens}`],
  ])("%s", (_, text, message) => {
    expect(() => parseYaml("case.yaml", text)).toThrow(message);
  });

  test("a staircase of indented keys", () => {
    const steps = Array.from({ length: 1400 }, (_, i) => `${" ".repeat(i)}a:\n`).join("");
    expect(() => parseYaml("case.yaml", steps)).toThrow(ProblemError);
  });
});

describe("files", () => {
  let folder = "";
  beforeAll(async () => {
    folder = await mkdtemp(join(tmpdir(), "tolerand-"));
  });
  afterAll(() => rm(folder, { recursive: true }));

  test("a file of 100 MB is refused unread", async () => {
    const file = join(folder, "large.yaml");
    await writeFile(file, "");
    const { truncate } = await import("node:fs/promises");
    await truncate(file, 100 * MEGABYTE);
    await expect(readText(file)).rejects.toThrow(
      `${file}: expected at most ${LARGEST_FILE} bytes, found ${100 * MEGABYTE}; is it a problem file?`,
    );
  });

  test("bytes that are no UTF-8", async () => {
    const file = join(folder, "latin.yaml");
    await writeFile(file, Buffer.from([0x74, 0x3a, 0x20, 0xe9, 0x0a]));
    await expect(readText(file)).rejects.toThrow(
      `${file}: expected text in UTF-8, found other bytes; save the file as UTF-8`,
    );
  });

  test("a folder, a device, nothing at all", async () => {
    await expect(readText(folder)).rejects.toThrow(
      `${folder}: expected a file, found something else (a folder or a device)`,
    );
    await expect(readText("/dev/zero")).rejects.toThrow("/dev/zero: expected a file, found something else");
    const file = join(folder, "none.yaml");
    await expect(readText(file)).rejects.toThrow(
      `${file}: cannot be opened (ENOENT); check the name and the permissions`,
    );
  });
});
