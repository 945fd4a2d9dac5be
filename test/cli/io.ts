/** A terminal of our own for tests of the command line. */
import type { Io } from "../../src/cli/command.js";

export interface FakeIo extends Io {
  readonly out: () => string;
  readonly err: () => string;
}

export function fakeIo(cwd = process.cwd(), signal: AbortSignal = new AbortController().signal): FakeIo {
  const out: string[] = [];
  const err: string[] = [];
  return {
    stdout: { write: (text: string) => out.push(text) },
    stderr: { write: (text: string) => err.push(text) },
    env: {},
    cwd,
    signal,
    commandLine: "tolerand test",
    out: () => out.join(""),
    err: () => err.join(""),
  };
}
