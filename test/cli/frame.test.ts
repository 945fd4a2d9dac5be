// The frame of the command line: what it says when a word is wrong, word for word.
import { describe, expect, it } from "vitest";
import { runProgram } from "../../src/cli/frame.js";
import { usage } from "../../src/cli/messages.js";
import { fakeIo } from "./io.js";

async function tolerand(...argv: string[]) {
  const io = fakeIo();
  const code = await runProgram(argv, io, "9.9.9");
  return { code, out: io.out(), err: io.err() };
}

describe("the frame", () => {
  it("shows five ways in without arguments", async () => {
    expect(await tolerand()).toEqual({ code: 0, out: usage, err: "" });
  });

  it("proposes the nearest command", async () => {
    const { code, out, err } = await tolerand("studdy", "x.yaml");
    expect({ code, out }).toEqual({ code: 2, out: "" });
    expect(err).toMatch(/^command: expected one of new, study, .*, found "studdy"; did you mean study\?\n$/);
  });

  it("proposes the nearest flag", async () => {
    expect(await tolerand("study", "x.yaml", "--replicate", "3")).toEqual({
      code: 2,
      out: "",
      err: '--replicate: not a flag of "tolerand study"; did you mean --replicates?; see tolerand study --help\n',
    });
  });

  it("asks for what is missing", async () => {
    const { code, err } = await tolerand("study");
    expect(code).toBe(2);
    expect(err).toContain("Not enough non-option arguments");
  });

  it("prints help and version on standard output", async () => {
    const help = await tolerand("--help");
    expect(help.code).toBe(0);
    for (const name of [
      "new",
      "study",
      "check",
      "points",
      "sources",
      "problems",
      "functions",
      "report",
      "schema",
    ]) {
      expect(help.out).toContain(`tolerand ${name}`);
    }
    expect((await tolerand("--version")).out).toBe("9.9.9\n");
    expect((await tolerand("study", "--help")).out).toContain("--false-alarms");
  });
});
