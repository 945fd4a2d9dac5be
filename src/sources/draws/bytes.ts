/**
 * Bytes from outside, read one after the other in the thread that needs them, with nothing read ahead: a writer that is
 * faster waits (a pipe holds some 64 KB), and memory is flat however long the stream.
 */
import { closeSync, constants, openSync, readSync, statSync } from "node:fs";

export interface ByteStream {
  /** Reads at least one and at most `length` bytes to `into` from `offset` on, waiting for them; 0 at the end. */
  read(into: Uint8Array, offset: number, length: number): number;
  close(): void;
  /** How it ended, to complete "...: the draws end" in a message. */
  ending(): string;
}

/** A writer that gives nothing for so long is given up. */
const PATIENCE_SECONDS = 60;

const FIRST_PAUSE = 0.1;
const LONGEST_PAUSE = 5;

const never = new Int32Array(new SharedArrayBuffer(4));

/** Waits in this thread; unlike a blocking read it can be cut off when the thread is ended. */
function pause(milliseconds: number): void {
  Atomics.wait(never, 0, 0, milliseconds);
}

function codeOf(error: unknown): string {
  return error instanceof Error && "code" in error ? String(error.code) : "unknown error";
}

/** A pipe opened without blocking. `started` says whether a writer is known to be there; without one, it is waited for. */
export function pipeStream(
  descriptor: number,
  name: string,
  started: boolean,
  ending: () => string,
): ByteStream {
  let seen = started;
  return {
    read: (into, offset, length) => {
      const giveUp = performance.now() + PATIENCE_SECONDS * 1000;
      for (let wait = FIRST_PAUSE; ; wait = Math.min(2 * wait, LONGEST_PAUSE)) {
        let count = -1;
        try {
          count = readSync(descriptor, into, offset, length, null);
        } catch (error) {
          if (codeOf(error) !== "EAGAIN") throw error;
          seen = true;
        }
        if (count > 0) seen = true;
        // before a writer comes, a pipe reads as ended
        if (count > 0 || (count === 0 && seen)) return count;
        if (performance.now() > giveUp) {
          throw new RangeError(
            `source "${name}": no draws came for ${PATIENCE_SECONDS} seconds; is there a writer, and does it flush what it writes?`,
          );
        }
        pause(wait);
      }
    },
    close: () => {
      closeSync(descriptor);
    },
    ending,
  };
}

/** A file from byte `start` on. */
export function fileStream(path: string, start: number): ByteStream {
  const descriptor = openSync(path, "r");
  let at = start;
  return {
    read: (into, offset, length) => {
      const count = readSync(descriptor, into, offset, length, at);
      at += count;
      return count;
    },
    close: () => {
      closeSync(descriptor);
    },
    ending: () => "the file ends",
  };
}

/** A named pipe, opened without waiting for its writer. */
export function fifoStream(path: string, name: string): ByteStream {
  const descriptor = openSync(path, constants.O_RDONLY | constants.O_NONBLOCK);
  return pipeStream(descriptor, name, false, () => "the writer of the FIFO ends");
}

/** What stands at a path. Throws a RangeError where nothing that can be read does. */
export function inspectFile(path: string, given: string): { readonly fifo: boolean; readonly size: number } {
  try {
    const found = statSync(path);
    if (found.isFIFO()) return { fifo: true, size: 0 };
    if (found.isFile()) return { fifo: false, size: found.size };
  } catch (error) {
    throw new RangeError(
      `source.draws.file: expected a file or a FIFO that can be read, found "${given}" (${codeOf(error)})`,
      { cause: error },
    );
  }
  throw new RangeError(`source.draws.file: expected a file or a FIFO, found "${given}", which is neither`);
}
