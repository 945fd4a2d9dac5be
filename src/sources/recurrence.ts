/** What a generator says of itself, and how it is used; pseudo-random.ts makes sources of it. */
import type { FillWords, GeneratorExports } from "../kernels/generator-exports.js";
import type { SourceDescription } from "./contract.js";
import type { Bits, Endpoint, OutputWords } from "./conversion.js";
import type { Key } from "./key.js";
import type { LinearRecurrence } from "./linear.js";
import { UNIFORM_STATE, type Seeding } from "./seeding.js";
import type { StateSpace } from "./states.js";

/** A generator's state as 64-bit words, in the layout of its kernel. */
export type State = readonly bigint[];

export type About = Pick<
  SourceDescription,
  "id" | "title" | "citation" | "method" | "outputBits" | "period" | "knownStructure"
>;

/** A generator as a linear map over GF(2). */
export interface BinaryLinear {
  /** Bits of the state that the map moves. */
  readonly stateBits: number;
  /**
   * `outputs`: every bit of an output is linear in the state. `bijection`: an output is a bijection of one such word. `state`:
   * outputs mix words of the state in other ways.
   */
  readonly of: "outputs" | "bijection" | "state";
  readonly wordBits: number;
  /** Where bits of a word never meet: how many registers of their own there are, each with its share of the state. */
  readonly registers?: number;
  /** Linear words, one for each output: the outputs, the word that they are a bijection of, or a word of the state. */
  words(state: State): Iterator<bigint, never>;
}

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
  /** The linear recurrence of one output to the next; absent where there is none (modulo a whole number). */
  readonly linear?: LinearRecurrence;
  /** The linear map over GF(2) behind the generator; absent where there is none. */
  readonly binary?: BinaryLinear;
  /** The state `words` kernel words later, in O(log words). */
  advance?(state: State, words: bigint): State;
  /**
   * All that `stateFromKey` may draw, as they matter where these bits of an output are used (null for all). Throws
   * RangeError where the map is not one to one on them, so that later outputs are spread otherwise than first ones.
   */
  states?(bits: Bits | null): StateSpace;
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
