/** Where and when a study ran: kept in the record, left out of every digest. */
import { readFileSync } from "node:fs";
import type { Environment } from "../record/types.js";
import type { Io } from "./command.js";

/** The version of the package. */
export function programVersion(): string {
  const text = readFileSync(new URL("../../package.json", import.meta.url), "utf8");
  return (JSON.parse(text) as { version: string }).version;
}

export function environmentOf(
  io: Io,
  run: { readonly threads: number; readonly started: number; readonly complete: boolean },
): Environment {
  const finished = Date.now();
  return {
    program: programVersion(),
    node: process.versions.node,
    platform: `${process.platform} ${process.arch}`,
    threads: run.threads,
    started: new Date(run.started).toISOString(),
    finished: new Date(finished).toISOString(),
    seconds: (finished - run.started) / 1000,
    command: io.commandLine,
    complete: run.complete,
  };
}
