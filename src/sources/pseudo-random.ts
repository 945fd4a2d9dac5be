/**
 * Pseudo-random sources: what they share. A generator's file states its recurrence (`Recurrence`); this file makes a
 * source of it: words from the kernel into a scratch buffer that fits the first-level cache, converted and transposed
 * from there into rows of coordinates. Points are taken as method asks: successive outputs, every k-th output, or one
 * separately started stream per coordinate.
 */
import type { FillWords, GeneratorExports, ToRows } from "../kernels/generator-exports.js";
import type { Kernels } from "../kernels/instance.js";
import {
  bitsOf,
  makeConversion,
  takeBits,
  type Bits,
  type Endpoint,
  type OutputWords,
} from "./conversion.js";
import type {
  Family,
  IntegerRequest,
  IntegerSource,
  OpenRequest,
  OpenStream,
  PointStream,
  ReplicateSupply,
  Resumable,
  Seekable,
  Source,
  SourceDescription,
} from "./contract.js";
import { withEndpoints } from "./endpoints.js";
import type { Key } from "./key.js";
import { restoreStates, saveStates } from "./saved-state.js";
import { seedOf, seedingText, UNIFORM_STATE, validSeeds, type Seeding } from "./seeding.js";

/** A generator's state as 64-bit words, in the layout of its kernel. */
export type State = readonly bigint[];

export type About = Pick<
  SourceDescription,
  "id" | "title" | "citation" | "method" | "outputBits" | "period" | "knownStructure"
>;

/** What a generator's file says: how its state comes about and moves on, and which kernel does it fast. */
export interface Recurrence {
  readonly about: About;
  /** The words that the kernel writes, one for each coordinate. */
  readonly output: OutputWords;
  /** A starting state, uniform over all valid ones (or as the file says otherwise). */
  stateFromKey(key: Key): State;
  /** A starting state in the published form; throws with what is allowed. */
  stateFromText(text: string): State;
  /** Further words that stand behind the state in kernel memory. */
  readonly constants?: readonly bigint[];
  kernel(exports: GeneratorExports): FillWords;
  /** The definition, in BigInt: the published integers from a state on. Plain and slow; the kernel's oracle in tests. */
  integers(state: State): Iterator<bigint, never>;
  /** The state `words` kernel words later, in O(log words). */
  advance?(state: State, words: bigint): State;
}

/** How outputs become coordinates of points; `strided` with step 1 is `successive`. */
export type Tuples =
  { readonly kind: "strided"; readonly step: number } | { readonly kind: "per-coordinate" };

/** How a generator is used: part of a source's identity. */
export interface Usage {
  readonly tuples: Tuples;
  readonly endpoint: Endpoint;
  readonly bits: Bits | null;
  /** Each coordinate rounded to single precision. */
  readonly float32: boolean;
  readonly seeding: Seeding;
}

export const USUAL: Usage = {
  tuples: { kind: "strided", step: 1 },
  endpoint: "middle",
  bits: null,
  float32: false,
  seeding: UNIFORM_STATE,
};

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

/** The request with the state that the source's seeding names, unless it names one itself. */
function seeded<R extends IntegerRequest & { readonly replicate?: number }>(seeding: Seeding, request: R): R {
  const seed = request.state ?? seedOf(seeding, request.replicate ?? 0);
  return seed === null ? request : { ...request, state: seed };
}

/**
 * As many replicates as there are seeds. One stream per coordinate takes the seeds s, s + 1, ...: a stride below the
 * dimension would hand a coordinate's stream to the next replicate.
 */
function supplyOfSeeds(
  recurrence: Recurrence,
  { seeding, tuples }: Usage,
  dimension: number,
): ReplicateSupply {
  const { id } = recurrence.about;
  const perCoordinate = tuples.kind === "per-coordinate";
  if (seeding.kind === "published" && perCoordinate && seeding.stride < BigInt(dimension)) {
    throw new RangeError(
      `source.seeding: expected a stride of at least ${dimension} for source "${id}", whose ${dimension} coordinates take one seed each, found ${seeding.stride}`,
    );
  }
  const valid = (seed: string): boolean => {
    try {
      recurrence.stateFromText(perCoordinate ? nextSeed(seed, dimension - 1) : seed);
      return true;
    } catch (error) {
      if (error instanceof RangeError) return false;
      throw error;
    }
  };
  return { count: validSeeds(seeding, valid), why: "it has no more valid seeds" };
}

function startingState(recurrence: Recurrence, { key, state }: IntegerRequest): State {
  if (state !== undefined) return recurrence.stateFromText(state);
  if (key !== null) return recurrence.stateFromKey(key);
  throw new TypeError(`key: source "${recurrence.about.id}" needs a key or a state, found neither`);
}

/** One starting state, or one per coordinate: from keys below the stream's, or from published seeds s, s + 1, ... */
function startingStates(recurrence: Recurrence, usage: Usage, asked: OpenRequest): readonly State[] {
  const request = seeded(usage.seeding, asked);
  if (usage.tuples.kind === "strided") return [startingState(recurrence, request)];
  return Array.from({ length: request.dimension }, (_, j) => {
    if (request.state !== undefined) return recurrence.stateFromText(nextSeed(request.state, j));
    return startingState(recurrence, { key: request.key?.derive(`coordinate ${j}`) ?? null });
  });
}

function nextSeed(seed: string, j: number): string {
  if (/^\d+$/.test(seed)) return (BigInt(seed) + BigInt(j)).toString();
  throw new RangeError(`state: expected one whole number with tuples per-coordinate, found "${seed}"`);
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
