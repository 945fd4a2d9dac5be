// `tolerand new --kind source`: the file that it writes is a source, and says what all the keys are.
import { existsSync, mkdtempSync, readFileSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { parse } from "yaml";
import { run } from "../../src/cli/commands/new.js";
import { run as points } from "../../src/cli/commands/points.js";
import type { SourceSpec } from "../../src/problem/contract.js";
import { parseSource } from "../../src/sources/choice.js";
import { ownSourceSchema } from "../../src/sources/own-source.js";
import { fakeIo } from "./io.js";

let folder: string;
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), "tolerand-new-"));
});
afterAll(() => {
  rmSync(folder, { recursive: true });
});

describe("a new source", () => {
  it("can be used as it is", async () => {
    const io = fakeIo(folder);
    await run({ name: "house", kind: "source" }, io);
    expect([io.out(), io.err()]).toEqual([
      "house.yaml\n",
      "Next: tolerand points @house.yaml, then tolerand study tour --source @house.yaml\n",
    ]);
    // S. K. Park and K. W. Miller, Communications of the ACM 31 (1988) 1192-1201: 16807 mod 2^31 - 1
    const [own, known] = [fakeIo(folder), fakeIo(folder)];
    await points({ source: "@house.yaml", state: "1" }, own);
    await points({ source: "minstd-16807", state: "1" }, known);
    expect(own.out()).toBe(known.out());
  });

  it("shows every key, and each that is commented out works in its place", () => {
    const text = readFileSync(join(folder, "house.yaml"), "utf8");
    for (const key of Object.keys(ownSourceSchema.shape))
      expect(text).toMatch(new RegExp(`^(# )?${key}: `, "m"));
    const generators = [...text.matchAll(/^# ((?:recursive|xorshift|source|draws): .*)$/gm)].map(
      ([, line]) => line,
    );
    expect(generators).toHaveLength(5);
    for (const line of generators) {
      const other = text.replace(/^congruential: .*$/m, line ?? "");
      expect(parseSource(parse(other) as SourceSpec).id).toBe("house");
    }
    const fixed = text.replace(/^seeding: .*$/m, "").replace(/^# (state: .*)$/m, "$1");
    expect(parseSource(parse(fixed) as SourceSpec).deterministic).toBe(true);
  });

  it("is refused under a name that a source cannot have, and writes nothing", async () => {
    await expect(run({ name: "mt19937", kind: "source" }, fakeIo(folder))).rejects.toThrow(
      'source.name: expected a name that no source of the program has, found "mt19937"',
    );
    await expect(run({ name: "my house", kind: "source" }, fakeIo(folder))).rejects.toThrow(
      'source.name: expected 1 to 40 letters, digits, dots, dashes or underscores, beginning with a letter or digit, found "my house"',
    );
    await expect(run({ name: "house", kind: "source" }, fakeIo(folder))).rejects.toThrow(
      "exists already and is not overwritten; choose another name",
    );
    expect(existsSync(join(folder, "mt19937.yaml"))).toBe(false);
  });
});
