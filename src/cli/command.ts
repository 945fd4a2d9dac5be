/** What a command of the program is to its frame: a name, its flags, and a body that is imported only when it runs. */
import type { Options } from "yargs";

/** A stream as Node has it; `once` is there on the real ones. */
export interface Output {
  write(text: string | Uint8Array): unknown;
  readonly isTTY?: boolean;
  once?(event: "drain", then: () => void): unknown;
}

/** Where a command reads its surroundings and writes its words; tests hand in their own. */
export interface Io {
  readonly stdout: Output;
  readonly stderr: Output;
  readonly env: Readonly<Record<string, string | undefined>>;
  readonly cwd: string;
  /** Aborted by the first Ctrl-C: stop in order and keep what is done. */
  readonly signal: AbortSignal;
  /** The command line as typed, for "the command that repeats it". */
  readonly commandLine: string;
}

export type Arguments = Readonly<Record<string, unknown>>;

/** Exit codes: architecture of the command line, the same for every command. */
export const EXIT = { done: 0, outside: 1, badInput: 2, interrupted: 3, internal: 4 } as const;

export interface CommandBody {
  /** Runs the command and gives its exit code. Throws InputError for anything the user can mend. */
  run(args: Arguments, io: Io): Promise<number>;
}

export interface Command {
  readonly name: string;
  /** Positional arguments in yargs' notation, e.g. "<paths..>"; empty where there are none. */
  readonly positional: string;
  readonly summary: string;
  readonly options: Readonly<Record<string, Options>>;
  load(): Promise<CommandBody>;
}
