/**
 * A source of draws from outside: a file, a FIFO or a program. Draws become coordinates as a generator's outputs do: an
 * integer k of b bits gives (k + 1/2) / 2^min(b, 52), reals are taken as they are. A real may be exactly 0; such
 * coordinates are counted. Good for: the generator that is really in use, whatever language it is written in. Bad at:
 * knowing anything beside the draws: no period, no structure is derived.
 */
import type { Kernels } from "../../kernels/instance.js";
import type { OpenRequest, OpenStream, Source } from "../contract.js";
import { makeConversion, type Bits, type Endpoint } from "../conversion.js";
import { withEndpoints } from "../endpoints.js";
import { LARGEST_DIMENSION } from "../pseudo-random.js";
import { seedingText, type Seeding } from "../seeding.js";
import { FORMATS, type DrawFormat } from "./formats.js";
import type { Origin } from "./origin.js";
import type { DrawReader } from "./reader.js";
import type { ToRows } from "../../kernels/generator-exports.js";

export interface DrawsUsage {
  readonly step: number;
  readonly endpoint: Endpoint;
  readonly bits: Bits | null;
  readonly float32: boolean;
  readonly seeding: Seeding;
}

/** Scratch for this many words, so that it and the block of points share a 32 KB cache. */
const SCRATCH_WORDS = 2048;

export function drawsSource(id: string, format: DrawFormat, origin: Origin, usage: DrawsUsage): Source {
  const seeds = seedingText(usage.seeding);
  const source: Source = {
    id,
    title: seeds === null ? origin.title : `${origin.title}, ${seeds}`,
    citation: "the user's own draws",
    family: "own",
    method: "draws from outside",
    outputBits: usage.bits?.count ?? FORMATS[format].bits,
    period: null,
    largestDimension: LARGEST_DIMENSION,
    nesting: "sequence",
    randomisations: [],
    knownStructure: "unknown: the draws come from outside",
    ...(usage.seeding.kind === "state" ? { fixed: true as const } : {}),
    nearestSize: (n) => Math.max(1, Math.round(n)),
    open: (request, kernels) => {
      const { dimension, n } = request;
      const stream = streamOf(
        request,
        origin.open(request, n * dimension * usage.step),
        format,
        usage,
        kernels,
      );
      const exact = FORMATS[format].kind === "integer" && usage.endpoint === "middle" && !usage.float32;
      return exact ? stream : withEndpoints(stream, usage.float32, kernels);
    },
  };
  // not spread: whether a path is a FIFO is looked up when it is asked
  return Object.defineProperties(source, Object.getOwnPropertyDescriptors(origin.abilities));
}

function streamOf(
  { dimension }: OpenRequest,
  reader: DrawReader,
  format: DrawFormat,
  usage: DrawsUsage,
  kernels: Kernels,
): OpenStream {
  const { arena, exports } = kernels;
  const { wordBytes } = reader;
  const perPoint = dimension * usage.step;
  const chunk = Math.max(2, 2 * Math.floor(SCRATCH_WORDS / (2 * perPoint)));
  const scratch = arena.allocate((chunk + 1) * perPoint * wordBytes + 16);
  const keepEvery = wordBytes === 4 ? exports.keepEvery32 : exports.keepEvery64;
  const toRows = conversionOf(format, usage, kernels);
  return {
    dimension,
    fill: (pointer, stride, count) => {
      for (let begin = 0; begin < count; begin += chunk) {
        const size = Math.min(chunk, count - begin);
        const words = kernels.u32(scratch, (size * perPoint * wordBytes) / 4);
        reader.read(new Uint8Array(words.buffer, words.byteOffset, words.byteLength));
        if (usage.step > 1) keepEvery(scratch, size * dimension, usage.step);
        toRows(scratch, dimension, size, pointer + begin * 8, stride);
      }
    },
    close: () => {
      reader.close();
    },
  };
}

function conversionOf(format: DrawFormat, { endpoint, bits }: DrawsUsage, kernels: Kernels): ToRows {
  const form = FORMATS[format];
  if (form.kind !== "integer") return (words, ...rest) => realRows(kernels, words, ...rest);
  const bytes = form.bytes === 4 ? 4 : 8;
  const output = { modulus: 1n << BigInt(form.bits), bytes, zeroless: false, integers: 1 } as const;
  return makeConversion({ output, endpoint, bits }, kernels);
}

function realRows(
  kernels: Kernels,
  words: number,
  dimension: number,
  count: number,
  out: number,
  stride: number,
): void {
  const values = kernels.f64(words, dimension * count);
  const rows = kernels.f64(out, stride * (dimension - 1) + count);
  for (let j = 0; j < dimension; j++) {
    for (let i = 0, k = j; i < count; i++, k += dimension) rows[j * stride + i] = values[k] as number;
  }
}
