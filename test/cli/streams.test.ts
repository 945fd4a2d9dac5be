// Streams and saved states of `points`, as a user meets them.
import { mkdtempSync, readFileSync, readdirSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { run } from "../../src/cli/commands/points.js";
import { fakeIo } from "./io.js";

let folder: string;
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), "tolerand-streams-"));
});
afterAll(() => {
  rmSync(folder, { recursive: true });
});

async function points(source: string, flags: Readonly<Record<string, string>>) {
  const io = fakeIo(folder);
  try {
    await run({ source, ...flags }, io);
  } catch (error) {
    return { out: io.out(), err: (error as Error).message };
  }
  return { out: io.out(), err: io.err() };
}

describe("saved states", () => {
  it.each([
    "xoshiro256++",
    "mt19937",
    "sobol+owen",
    "philox4x32",
    "{ name: own, source: mt19937, tuples: per-coordinate }",
  ])("%s goes on to the bit where it was left", async (source) => {
    const asked = { dimension: "3", seed: "7" };
    const whole = (await points(source, { ...asked, points: "1000" })).out;
    const first = await points(source, { ...asked, points: "613", "save-state": "state.json" });
    const rest = await points(source, {
      points: "300",
      "from-state": "state.json",
      "save-state": "state.json",
    });
    const last = await points(source, { points: "80", "from-state": "state.json", first: "7" });
    const lines = whole.split("\n");
    expect(first.out + rest.out).toBe(`${lines.slice(0, 913).join("\n")}\n`);
    expect(last.out).toBe(`${lines.slice(920).join("\n")}`);
    expect(readdirSync(folder).filter((name) => name.endsWith(".new"))).toEqual([]);
  });

  it("name what they belong to", async () => {
    await points("randu", { points: "1", "save-state": "randu.json", state: "1" });
    const saved = JSON.parse(readFileSync(join(folder, "randu.json"), "utf8")) as object;
    // from 1 the next states of RANDU are 65539 and 393225: one output is used up
    expect(saved).toMatchObject({
      schema: "tolerand/state/1",
      source: "randu",
      dimension: 1,
      seed: 20260401,
    });
    expect(await points("mt19937", { "from-state": "randu.json" })).toMatchObject({
      err: '--from-state: "randu.json" holds a state of source "randu", found "mt19937"; name that source',
    });
    expect(await points("randu", { "from-state": "randu.json", dimension: "2" })).toMatchObject({
      err: '--from-state: "randu.json" holds a state with dimension 1, found 2; take the same, or leave --dimension out',
    });
    expect(await points("randu", { "from-state": "randu.json", seed: "3" })).toMatchObject({
      err: '--from-state: "randu.json" holds a state with seed 20260401, found 3; take the same, or leave --seed out',
    });
  });

  it("are refused where there is none, in words", async () => {
    writeFileSync(join(folder, "no.json"), "{}");
    expect((await points("randu", { "from-state": "no.json" })).err).toBe(
      '--from-state: expected a state that --save-state wrote, found another text in "no.json"',
    );
    expect((await points("randu", { "from-state": "nowhere.json" })).err).toBe(
      '--from-state: cannot read "nowhere.json" (ENOENT); give a file that --save-state wrote',
    );
    expect((await points("system", { "save-state": "a.json" })).err).toBe(
      "--save-state: system has no state that can be kept",
    );
    expect((await points("lattice+shift", { "save-state": "a.json" })).err).toBe(
      "--save-state: lattice+shift is built for one size and cannot go on behind it",
    );
    expect((await points("mt19937", { "save-state": "a.json", format: "u32le" })).err).toBe(
      "--save-state: states go with points, found integers; take csv, f64le, f32le or text",
    );
    expect((await points("randu", { "save-state": "no/where.json" })).err).toBe(
      '--save-state: cannot write "no/where.json" (ENOENT); choose another file',
    );
    const damaged = readFileSync(join(folder, "randu.json"), "utf8").replace(/[0-9a-f]{16}/, "short");
    writeFileSync(join(folder, "damaged.json"), damaged);
    expect((await points("randu", { "from-state": "damaged.json" })).err).toBe(
      'state: expected 1 saved state(s) of 1 hexadecimal words for source "randu", found another layout',
    );
  });
});

describe("streams", () => {
  it("of a source that jumps continue each other at their distance", async () => {
    // of 2^27 streams of RANDU each has room for 3 outputs: stream 2 begins with output 3
    const all = (await points("randu", { points: "9", state: "1" })).out.split("\n");
    const second = await points("randu", { points: "3", state: "1", stream: "2/134217728" });
    expect(second.out).toBe(`${all.slice(3, 6).join("\n")}\n`);
    expect(second.err).toContain("stream 2 of 134217728: randu begins 1 times 3 outputs into its sequence");
    const integers = await points("randu", {
      points: "1",
      state: "1",
      stream: "2/134217728",
      format: "integers",
    });
    const four = await points("randu", { points: "4", state: "1", format: "integers" });
    expect(integers.out).toBe(`${four.out.split("\n")[3]}\n`);
  });

  it("of one that does not are keyed, and differ", async () => {
    const [a, b] = await Promise.all(
      ["1/2", "2/2"].map((stream) => points("mt19937", { points: "3", stream })),
    );
    expect(a?.out).not.toBe(b?.out);
    expect(b?.err).toMatch(
      /^stream 2 of 2: mt19937 starts each stream from a keyed state; .* is below 1e-\d+\n$/,
    );
  });

  it.each(["0/3", "4/3", "1", "a/b", "1/0"])("%s is refused", async (stream) => {
    expect((await points("randu", { stream })).err).toBe(
      `--stream: expected a stream and their number such as 3/8, found "${stream}"`,
    );
  });
});
