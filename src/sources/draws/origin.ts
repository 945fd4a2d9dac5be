/**
 * Where draws come from. A file is cut into consecutive stretches, one for each replicate: replicate r begins at draw
 * r times the draws of one. What can only be read forwards (a FIFO, numbers as text) is read by one task, replicate after
 * replicate. A program is started anew for each replicate.
 */
import { resolve } from "node:path";
import type { OpenRequest, ReplicateSupply, Source } from "../contract.js";
import { seedOf, type Seeding } from "../seeding.js";
import { fifoStream, fileStream, inspectFile } from "./bytes.js";
import { FORMATS, type DrawFormat } from "./formats.js";
import { commandText, startProgram } from "./program.js";
import { makeReader, type DrawReader } from "./reader.js";
import { drawsIn } from "./supply.js";

export interface Origin {
  readonly title: string;
  /** What a source of it has beside what all have. */
  readonly abilities: Pick<Source, "singlePass" | "program" | "replicateSupply" | "repetition">;
  /** The draws of a replicate, `draws` of them; closing it leaves nothing behind. */
  open(request: OpenRequest, draws: number): DrawReader;
}

export interface OriginOptions {
  readonly id: string;
  readonly format: DrawFormat;
  readonly folder: string;
  /** Draws that one coordinate of a point takes. */
  readonly step: number;
}

/** Readers that go on where the last replicate ended; one for each path in this thread. */
const forwards = new Map<string, Forward>();

interface Forward {
  readonly reader: DrawReader;
  /** Draw at which the reader stands; NaN in the middle of a replicate. */
  at: number;
  /** The replicate that reads, for messages. */
  name: string;
}

export function fileOrigin(given: string, { id, format, folder, step }: OriginOptions): Origin {
  const path = resolve(folder, given);
  const text = FORMATS[format].kind === "text";
  const isFifo = (): boolean => inspectFile(path, given).fifo;
  const nameOf = (replicate: number): string => `source "${id}", replicate ${replicate}`;

  const openForward = (fifo: boolean, name: string): Forward => {
    const bytes = fifo ? fifoStream(path, id) : fileStream(path, 0);
    const entry: Forward = {
      reader: makeReader({ format, bytes, start: 0, name: () => entry.name }),
      at: 0,
      name,
    };
    return entry;
  };

  /** Continues the reader of this path where it stands at draw `start` (a FIFO stands where it stands). */
  const forward = (fifo: boolean, start: number, draws: number, name: string): DrawReader => {
    let entry = forwards.get(path);
    if (entry === undefined || (!fifo && entry.at !== start)) {
      entry?.reader.close();
      entry = openForward(fifo, name);
      forwards.set(path, entry);
      if (!fifo) entry.reader.skip(start);
    }
    const here = entry;
    const { reader } = here;
    here.name = name;
    // what an interrupted replicate leaves unread is no place to go on from
    here.at = NaN;
    let left = draws;
    return {
      wordBytes: reader.wordBytes,
      read: (words) => {
        reader.read(words);
        left -= words.byteLength / reader.wordBytes;
        if (left === 0) here.at = start + draws;
      },
      skip: (count) => {
        reader.skip(count);
      },
      close: () => undefined,
    };
  };
  return {
    title: `draws from ${given} (${format})`,
    abilities: {
      get singlePass() {
        return text || isFifo();
      },
      replicateSupply: (dimension, n): ReplicateSupply => {
        const { fifo, size } = inspectFile(path, given);
        if (fifo) return { count: Infinity, why: "a FIFO passes by once", fresh: false };
        const draws = drawsIn(path, given, size, format);
        return {
          count: Math.floor(draws / (n * dimension * step)),
          why: `"${given}" holds ${draws} draws`,
        };
      },
      repetition: (first, second, dimension, n) => {
        const [a, b] = [first, second].map((replicate) => replicate * n * dimension * step);
        const unit = FORMATS[format].bytes;
        const where =
          text || isFifo()
            ? `draw ${b} and draw ${a}`
            : `byte offset ${(b ?? 0) * unit} and byte offset ${(a ?? 0) * unit}`;
        return `source "${id}": replicate ${second} begins with the same draws as replicate ${first} (${where} of "${given}"); give draws that do not repeat themselves`;
      },
    },
    open: ({ replicate = 0 }, draws) => {
      const { fifo } = inspectFile(path, given);
      const start = replicate * draws;
      if (text || fifo) return forward(fifo, start, draws, nameOf(replicate));
      const first = start * FORMATS[format].bytes;
      const name = nameOf(replicate);
      return makeReader({ format, bytes: fileStream(path, first), start: first, name: () => name });
    },
  };
}

export function programOrigin(
  command: readonly string[],
  seeding: Seeding,
  { id, format, folder }: OriginOptions,
): Origin {
  const text = commandText(command);
  return {
    title: `draws of ${text} (${format})`,
    abilities: {
      program: { command: text, folder },
      repetition: (first, second) =>
        `source "${id}": replicate ${second} begins with the same draws as replicate ${first} (from byte offset 0 on); let the program take its seed from TOLERAND_SEED, which differs for each replicate`,
    },
    open: ({ key, state, replicate = 0, allowPrograms = false }) => {
      if (!allowPrograms) throw new RangeError(programRefusal(id, { command: text, folder }));
      const seed = state ?? seedOf(seeding, replicate) ?? key?.derive("program").words64(1)[0]?.toString();
      if (seed === undefined) {
        throw new TypeError(`key: source "${id}" needs a key or a state, found neither`);
      }
      const name = `source "${id}", replicate ${replicate}`;
      const bytes = startProgram({ id, command, folder, seed, replicate });
      return makeReader({ format, bytes, start: 0, name: () => name });
    },
  };
}

/** Why a program is not started, with the command that would run and the flag that allows it. */
export function programRefusal(id: string, { command, folder }: NonNullable<Source["program"]>): string {
  const where = folder === "." ? "" : ` (in folder "${folder}")`;
  return `source "${id}" would start the program: ${command}${where}; programs are started only with --allow-programs on the command line`;
}
