/**
 * Pseudo-random sources: what they share. A generator's file states its recurrence (`Recurrence`); this file makes a
 * source of it: words from the kernel into a scratch buffer that fits the first-level cache, converted and transposed
 * from there into rows of coordinates. Points are taken as method asks: successive outputs, every k-th output, or one
 * separately started stream per coordinate.
 */
import type { FillWords, ToRows } from "../kernels/generator-exports.js";
import type { Kernels } from "../kernels/instance.js";
import { bitsOf, makeConversion, takeBits, type Bits } from "./conversion.js";
import type {
  Family,
  IntegerSource,
  OpenRequest,
  OpenStream,
  PointStream,
  Resumable,
  Seekable,
  Source,
} from "./contract.js";
import { cycleOf } from "./cycle.js";
import { withEndpoints } from "./endpoints.js";
import { USUAL, type Recurrence, type State, type Usage } from "./recurrence.js";
import { restoreStates, saveStates } from "./saved-state.js";
import { seedingText } from "./seeding.js";
import { seeded, startingState, startingStates, supplyOfSeeds } from "./starting-state.js";

export type { About, Recurrence, State, Tuples, Usage } from "./recurrence.js";
export { USUAL } from "./recurrence.js";

/** More coordinates per point than this are refused (common practice, no single source; a point is then 8 MB). */
export const LARGEST_DIMENSION = 1_000_000;

/** Scratch for this many words, so that it and the block of points share a 32 KB cache. */
const SCRATCH_WORDS = 2048;

/** A source made of a generator; another usage of the same generator begins from its `recurrence`. */
export interface PseudoRandomSource extends IntegerSource {
  readonly recurrence: Recurrence;
  readonly usage: Usage;
}

export function isPseudoRandom(source: Source | undefined): source is PseudoRandomSource {
  return source !== undefined && "recurrence" in source;
}

/** The source of a generator. */
export function pseudoRandom(
  recurrence: Recurrence,
  usage: Usage = USUAL,
  family: Family = "pseudo-random",
): PseudoRandomSource {
  const { seeding } = usage;
  const seeds = seedingText(seeding);
  return {
    ...recurrence.about,
    ...(seeds === null ? {} : { title: `${recurrence.about.title}, ${seeds}` }),
    ...(seeding.kind === "state" ? { fixed: true as const } : {}),
    ...(seeding.kind === "published"
      ? { replicateSupply: (dimension: number) => supplyOfSeeds(recurrence, usage, dimension) }
      : {}),
    recurrence,
    usage,
    family,
    largestDimension: LARGEST_DIMENSION,
    nesting: "sequence",
    randomisations: [],
    nearestSize: (n) => Math.max(1, Math.round(n)),
    open: (request, kernels) => {
      const stream: OpenStream =
        recurrence.advance === undefined
          ? new Stream(recurrence, usage, request, kernels)
          : new JumpingStream(recurrence, recurrence.advance.bind(recurrence), usage, request, kernels);
      return usage.float32 || usage.endpoint === "left"
        ? withEndpoints(stream, usage.float32, kernels)
        : stream;
    },
    ...(recurrence.states === undefined ? {} : { cycle: () => cycleOf(recurrence, usage) }),
    openIntegers: (request) => {
      const integers = recurrence.integers(startingState(recurrence, seeded(seeding, request)));
      const { bits } = usage;
      return {
        next: bits === null ? () => integers.next().value : () => nextCut(recurrence, bits, integers),
      };
    },
  };
}

/** The next kernel word from published integers (the first one lowest), and of it the bits that are used. */
function nextCut({ output }: Recurrence, bits: Bits, integers: Iterator<bigint, never>): bigint {
  const width = BigInt(bitsOf(output.modulus) / output.integers);
  let word = 0n;
  for (let part = 0n; part < BigInt(output.integers); part++) word |= integers.next().value << (part * width);
  return takeBits(word, bits, bitsOf(output.modulus));
}

class Stream implements PointStream, Resumable {
  readonly dimension: number;
  protected readonly start: readonly State[];
  readonly #id: string;
  readonly #kernels: Kernels;
  readonly #step: number;
  readonly #states: readonly number[];
  readonly #stateWords: number;
  readonly #scratch: number;
  /** Points (even number) that are made at a time. */
  readonly #chunk: number;
  readonly #fillWords: FillWords;
  readonly #keepEvery: (words: number, count: number, step: number) => void;
  readonly #toRows: ToRows;

  constructor(recurrence: Recurrence, usage: Usage, request: OpenRequest, kernels: Kernels) {
    const { exports, arena } = kernels;
    const constants = recurrence.constants ?? [];
    this.dimension = request.dimension;
    this.start = startingStates(recurrence, usage, request);
    this.#id = recurrence.about.id;
    this.#kernels = kernels;
    this.#step = usage.tuples.kind === "strided" ? usage.tuples.step : 1;
    this.#stateWords = this.start[0]?.length ?? 0;
    // kernels read and write whole vectors: two words of slack behind every block
    const block = (this.#stateWords + constants.length + 2) * 8;
    this.#states = this.start.map(() => arena.allocate(block));
    for (const pointer of this.#states) {
      kernels.u64(pointer + this.#stateWords * 8, constants.length).set(constants);
    }
    this.write(this.start);
    const perPoint = (usage.tuples.kind === "strided" ? this.dimension : 1) * this.#step;
    this.#chunk = Math.max(2, 2 * Math.floor(SCRATCH_WORDS / (2 * perPoint)));
    this.#scratch = arena.allocate((this.#chunk + 1) * perPoint * recurrence.output.bytes + 16);
    this.#fillWords = recurrence.kernel(exports);
    this.#keepEvery = recurrence.output.bytes === 4 ? exports.keepEvery32 : exports.keepEvery64;
    this.#toRows = makeConversion({ output: recurrence.output, ...usage }, kernels);
  }

  fill(pointer: number, stride: number, count: number): void {
    const perCoordinate = this.#states.length > 1;
    const columns = perCoordinate ? 1 : this.dimension;
    for (let j = 0; j < this.#states.length; j++) {
      const state = this.#states[j] ?? 0;
      const row = pointer + j * stride * 8;
      for (let begin = 0; begin < count; begin += this.#chunk) {
        const size = Math.min(this.#chunk, count - begin);
        this.#fillWords(state, this.#scratch, size * columns * this.#step);
        if (this.#step > 1) this.#keepEvery(this.#scratch, size * columns, this.#step);
        this.#toRows(this.#scratch, columns, size, row + begin * 8, stride);
      }
    }
  }

  save(): string {
    return saveStates(
      this.#id,
      this.#states.map((pointer) => [...this.#words(pointer)]),
    );
  }

  restore(saved: string): void {
    this.write(restoreStates(saved, this.#id, this.#states.length, this.#stateWords));
  }

  protected write(states: readonly State[]): void {
    states.forEach((state, j) => this.#words(this.#states[j] ?? 0).set(state));
  }

  /** Words of one state that `points` points use up. */
  protected wordsFor(points: number): bigint {
    const columns = this.#states.length > 1 ? 1 : this.dimension;
    return BigInt(points) * BigInt(columns * this.#step);
  }

  #words(pointer: number): BigUint64Array {
    return this.#kernels.u64(pointer, this.#stateWords);
  }
}

class JumpingStream extends Stream implements Seekable {
  readonly #advance: (state: State, words: bigint) => State;

  constructor(
    recurrence: Recurrence,
    advance: (state: State, words: bigint) => State,
    usage: Usage,
    request: OpenRequest,
    kernels: Kernels,
  ) {
    super(recurrence, usage, request, kernels);
    this.#advance = advance;
  }

  seek(index: number): void {
    const words = this.wordsFor(index);
    this.write(this.start.map((state) => this.#advance(state, words)));
  }
}
