#!/usr/bin/env node
/** The program's entry: connects the frame of the command line to this process. */
import { programVersion } from "./environment.js";
import { runProgram } from "./frame.js";

const controller = new AbortController();
process.once("SIGINT", () => {
  controller.abort();
});
// A reader that closes early (head, less) ends the output, not the program with an error.
process.stdout.on("error", (error: NodeJS.ErrnoException) => {
  if (error.code === "EPIPE") process.exit(0);
  throw error;
});

const argv = process.argv.slice(2);
process.exitCode = await runProgram(
  argv,
  {
    stdout: process.stdout,
    stderr: process.stderr,
    env: process.env,
    cwd: process.cwd(),
    signal: controller.signal,
    commandLine: ["tolerand", ...argv.map(quoted)].join(" "),
  },
  programVersion(),
);

/** As a shell would need it, so that the command in a report can be pasted. */
function quoted(word: string): string {
  return /^[\w@%+=:,./^-]+$/.test(word) ? word : `'${word.replaceAll("'", `'\\''`)}'`;
}
