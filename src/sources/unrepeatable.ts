/**
 * Two sources that cannot be repeated: the operating system's random bytes (`system`), and the JavaScript engine's own
 * Math.random (`math-random`), which takes no seed (the language's specification fixes no method; V8 uses xorshift128+ with
 * 52 bits, S. Vigna, "Further scramblings of Marsaglia's xorshift generators", Journal of Computational and Applied
 * Mathematics 315 (2017) 175-181). Good for: seeing how what people reach for first does. Bad at: a study that anyone is to
 * check, since keys have no effect, runs differ every time, and nothing can be resumed.
 */
import { randomFillSync } from "node:crypto";
import type { Kernels } from "../kernels/instance.js";
import type { OpenRequest, PointStream, Source, SourceDescription } from "./contract.js";
import { LARGEST_DIMENSION } from "./pseudo-random.js";

type About = Pick<
  SourceDescription,
  "id" | "title" | "citation" | "method" | "outputBits" | "knownStructure"
>;

/** Words that are drawn at a time. */
const SCRATCH_WORDS = 2048;

function unrepeatable(about: About, draw: (words: BigUint64Array) => void): Source {
  return {
    ...about,
    family: "pseudo-random",
    period: null,
    largestDimension: LARGEST_DIMENSION,
    nesting: "sequence",
    randomisations: [],
    repeatable: false,
    nearestSize: (n) => Math.max(1, Math.round(n)),
    open: (request, kernels) => open(about.id, draw, request, kernels),
  };
}

function open(
  id: string,
  draw: (words: BigUint64Array) => void,
  { dimension, state }: OpenRequest,
  kernels: Kernels,
): PointStream {
  if (state !== undefined) {
    throw new RangeError(`state: expected none, as source "${id}" takes no seed or state, found "${state}"`);
  }
  const chunk = Math.max(2, 2 * Math.floor(SCRATCH_WORDS / (2 * dimension)));
  // one more point, which the transposition of an odd number of points reads
  const words = (chunk + 1) * dimension;
  const scratch = kernels.arena.allocate(words * 8);
  return {
    dimension,
    fill: (pointer, stride, count) => {
      for (let begin = 0; begin < count; begin += chunk) {
        const size = Math.min(chunk, count - begin);
        draw(kernels.u64(scratch, size * dimension));
        kernels.exports.rowsMidpoint64(scratch, dimension, size, pointer + begin * 8, stride);
      }
    },
  };
}

export const system = unrepeatable(
  {
    id: "system",
    title: "The operating system's random bytes",
    citation: "none: the generator of the operating system, which differs by machine and version (2026)",
    method: "operating system",
    outputBits: 64,
    knownStructure: null,
  },
  (words) => void randomFillSync(words),
);

export const mathRandom = unrepeatable(
  {
    id: "math-random",
    title: "The JavaScript engine's own Math.random",
    citation:
      "ECMA-262, ECMAScript Language Specification, Math.random (2025): the method is left to the engine",
    method: "linear feedback",
    outputBits: 52,
    knownStructure: "linear over GF(2) in the engine in use (V8: xorshift128+)",
  },
  (words) => {
    const halves = new Uint32Array(words.buffer, words.byteOffset, words.length * 2);
    for (let k = 0; k < halves.length; k += 2) {
      // the top 52 bits of a word; V8 gives no more
      const bits = Math.random() * 2 ** 32;
      const high = Math.floor(bits);
      halves[k] = (bits - high) * 2 ** 32;
      halves[k + 1] = high;
    }
  },
);
