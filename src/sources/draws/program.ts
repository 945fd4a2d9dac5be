/**
 * A user's program that writes draws to its standard output. One process for each replicate; its seed and number are in
 * its environment. Its output goes through a named pipe, which this thread reads without blocking, so that a program
 * that hangs cannot hang the study. A shell around it (constant text; the command is handed over as separate arguments)
 * notes the exit code, which the thread could not learn while it waits for draws. Works where there is `mkfifo`: Linux,
 * macOS. The program runs with the rights of the user; nothing here starts one unless the command line allowed it.
 */
import { execFileSync, spawn } from "node:child_process";
import { closeSync, constants, mkdtempSync, openSync, readSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { pipeStream, type ByteStream } from "./bytes.js";

/** Environment variables that a program finds. */
const SEED_VARIABLE = "TOLERAND_SEED";
const REPLICATE_VARIABLE = "TOLERAND_REPLICATE";

/**
 * Runs the command and notes its exit code on descriptor 3, which it does not see itself. The shell outlives a SIGTERM to
 * the group, so that the program is waited for and leaves no zombie where nobody else takes note of it (containers). What the shell has to say of that is not shown; the
 * program's standard error is the user's.
 */
const SCRIPT = 'trap : TERM; exec 4>&2 2>/dev/null; (exec "$@" 2>&4 3>&- 4>&-); echo $? >&3';

/** A program that does not end when it is asked to is killed after this time. */
const GRACE_MILLISECONDS = 1000;

export interface ProgramCall {
  /** The source's id, for messages. */
  readonly id: string;
  readonly command: readonly string[];
  readonly folder: string;
  readonly seed: string;
  readonly replicate: number;
}

/** Starts the program; what it writes is the stream. Closing the stream ends the program and all that it started. */
export function startProgram({ id, command, folder, seed, replicate }: ProgramCall): ByteStream {
  const scratch = mkdtempSync(join(tmpdir(), "tolerand-"));
  try {
    const pipe = join(scratch, "draws");
    execFileSync("mkfifo", ["-m", "600", pipe]);
    const output = openSync(pipe, constants.O_RDONLY | constants.O_NONBLOCK);
    const input = openSync(pipe, "w");
    const status = openSync(join(scratch, "status"), "w+");
    const child = spawn("/bin/sh", ["-c", SCRIPT, "sh", ...command], {
      cwd: folder,
      env: { ...process.env, [SEED_VARIABLE]: seed, [REPLICATE_VARIABLE]: String(replicate) },
      stdio: ["ignore", input, "inherit", status],
      // a process group of its own, so that all of it can be ended
      detached: true,
    });
    child.on("error", () => undefined);
    child.unref();
    closeSync(input);
    if (child.pid === undefined) {
      closeSync(output);
      closeSync(status);
      throw new RangeError(
        `source "${id}": its program cannot be started in folder "${folder}"; does the folder exist?`,
      );
    }
    const group = child.pid;
    const stream = pipeStream(output, id, true, () => endingOf(status));
    return {
      ...stream,
      close: () => {
        stream.close();
        closeSync(status);
        signalGroup(group, "SIGTERM");
        const killer = setTimeout(() => {
          signalGroup(group, "SIGKILL");
        }, GRACE_MILLISECONDS);
        killer.unref();
        child.once("exit", () => {
          clearTimeout(killer);
        });
      },
    };
  } finally {
    rmSync(scratch, { recursive: true, force: true });
  }
}

function signalGroup(group: number, signal: "SIGTERM" | "SIGKILL"): void {
  try {
    process.kill(-group, signal);
  } catch {
    // it has ended by itself
  }
}

function endingOf(status: number): string {
  const text = Buffer.alloc(16);
  const code = text.toString("latin1", 0, readSync(status, text, 0, 16, 0)).trim();
  if (code === "127") return "its program was not found (exit code 127)";
  if (code === "126") return "its program cannot be run (exit code 126)";
  if (Number(code) > 128) return `its program was ended by signal ${Number(code) - 128}`;
  return code === "" ? "its program closed its output" : `its program ended with exit code ${code}`;
}

/** The command as a shell would take it, for messages. */
export function commandText(command: readonly string[]): string {
  return command
    .map((part) => (/^[\w@%+=:,./-]+$/.test(part) ? part : `'${part.replaceAll("'", "'\\''")}'`))
    .join(" ");
}
