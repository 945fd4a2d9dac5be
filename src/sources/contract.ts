/**
 * The contract of a source: what it says of itself, and what it can do. A source that cannot do a thing does not
 * have the method for it, so asking for it does not type-check.
 */
import type { Matrix } from "ml-matrix";
import type { Kernels } from "../kernels/instance.js";
import type { Key } from "./key.js";

/** Families as reports show them; each has its own hue, dash and point shape. */
export type Family = "pseudo-random" | "quasi-random" | "stratified" | "own";

/** `sequence`: any prefix is valid. `per-size`: the points are built for one n. */
export type Nesting = "sequence" | "per-size";

export type Randomisation = "shift" | "tent" | "digital-shift" | "linear" | "owen" | "permuted";

/** What a source says of itself; listings, help texts, docs tables and test laws come from it. */
export interface SourceDescription {
  /** Lower-case name used in problem files and on the command line, without randomisations. */
  readonly id: string;
  readonly title: string;
  /** Author, title, journal, volume, year, pages of the published method. */
  readonly citation: string;
  readonly family: Family;
  /** Kind inside the family, e.g. "congruential", "linear feedback", "counter-based", "digital net", "rank-1 lattice". */
  readonly method: string;
  /** Bits of one output that carry information (at most 52 reach a coordinate). */
  readonly outputBits: number;
  /** Exact period of the underlying recurrence; null where there is none (quasi-random sources). */
  readonly period: bigint | null;
  readonly largestDimension: number;
  readonly nesting: Nesting;
  /** Randomisations that apply, alone or in the combinations that `parseSource` accepts; empty for pseudo-random ones. */
  readonly randomisations: readonly Randomisation[];
  /** Known structure in a few words ("all triples lie on 15 planes"), or null where the source is held to be sound. */
  readonly knownStructure: string | null;
  /** False where a key has no effect: such a source gives other points every time, and cannot be resumed or split. */
  readonly repeatable?: false;
  /** True where a given starting state is part of the source: one replicate, and no error bar. */
  readonly fixed?: true;
}

/** What a stream is opened with. */
export interface OpenRequest {
  /** Coordinates per point, 1 to the source's largest. */
  readonly dimension: number;
  /** Points that will be asked for in all; a `per-size` source builds its points for exactly this n. */
  readonly n: number;
  readonly randomisations: readonly Randomisation[];
  /** Where the randomness comes from; null only for an unrandomised quasi-random source. */
  readonly key: Key | null;
  /** A starting state in the source's published form; wins over the key. */
  readonly state?: string;
  /** Outputs to pass over before the first; only for pseudo-random sources that can jump. */
  readonly jump?: bigint;
  /** Which replicate of the whole study this is, 0-based (0 if absent); published seeds are numbered by it. */
  readonly replicate?: number;
  /** Whether the command line allowed programs to be started; false if absent. */
  readonly allowPrograms?: boolean;
}

/** A stream of points in kernel memory. */
export interface PointStream {
  readonly dimension: number;
  /**
   * Writes the next `count` points: coordinate j of point i goes to byte address `pointer + (j * stride + i) * 8`, a
   * double in (0, 1). `stride` (in points) is at least `count` rounded up to a multiple of 8; what stands in a row
   * behind the last point is undefined.
   */
  fill(pointer: number, stride: number, count: number): void;
}

/** A stream that can go on at any index in O(log n) or better. */
export interface Seekable {
  /** The next `fill` begins with point `index` (0-based). */
  seek(index: number): void;
}

/** A stream whose state can be kept as JSON and restored to the bit. */
export interface Resumable {
  save(): string;
  restore(saved: string): void;
}

/** A stream whose coordinates may be exactly 0 or 1, which others never are. */
export interface EndpointCounter {
  /** Coordinates so far that were 0 or 1. */
  endpointsHit(): number;
}

/** A stream that holds something beside memory (a file, a process) until it is closed. */
export interface Closable {
  close(): void;
}

/** What `open` gives. */
export type OpenStream = PointStream & Partial<Seekable & Resumable & EndpointCounter & Closable>;

/** How many replicates there are to be had. */
export interface ReplicateSupply {
  readonly count: number;
  /** Why there are no more, in a few words. */
  readonly why: string;
  /** False where a study can be served but no second look at it: the draws pass by once. */
  readonly fresh?: false;
}

/** A source: its description and how to open it. Kernel memory is taken from the arena; the caller releases it. */
export interface Source extends SourceDescription {
  /** The valid size nearest to `n` (at least 1); `n` itself where every size is valid. */
  nearestSize(n: number): number;
  open(request: OpenRequest, kernels: Kernels): OpenStream;
  /** Absent where there is no end of replicates. Throws a RangeError where a run of this form cannot be served at all. */
  replicateSupply?(dimension: number, n: number): ReplicateSupply;
  /** True where replicates can only be read one after the other, by one task. */
  readonly singlePass?: boolean;
  /** The program that opening starts, which needs the leave of the command line. */
  readonly program?: { readonly command: string; readonly folder: string };
  /** The message for two replicates that begin alike, where that is an error; absent where it is a warning. */
  repetition?(first: number, second: number, dimension: number, n: number): string;
}

/** A source whose valid starting states can all be gone through. */
export interface FullCycle extends Source {
  /** Throws a RangeError with what can be done instead where this one's states cannot. */
  cycle(): Cycle;
}

/** Every valid starting state once, in a fixed order: point i is the tuple that state i begins. */
export interface Cycle {
  readonly states: number;
  open(dimension: number, kernels: Kernels): PointStream & Seekable & Partial<EndpointCounter>;
}

/** A source whose own integer outputs can be seen, as published. */
export interface IntegerSource extends Source {
  /** The source's own integers from a key or a published state, in order. */
  openIntegers(request: IntegerRequest): IntegerStream;
}

export interface IntegerRequest {
  readonly key: Key | null;
  readonly state?: string;
  /** As in `OpenRequest`. */
  readonly jump?: bigint;
}

export interface IntegerStream {
  next(): bigint;
}

/** A source whose points are a digital net or sequence, known by its generating matrices. */
export interface DigitalNet extends Source {
  /**
   * The unrandomised generating matrices of the first `dimension` coordinates, with the columns that the first `n`
   * points use.
   */
  generatingMatrices(dimension: number, n: number): GeneratingMatrices;
  /** How many coordinates of another net take turns in the digits of one; absent where none do. */
  readonly interlacing?: number;
}

/** A source whose coordinates are radical inverses of the index. */
export interface RadicalInverse extends Source {
  /** The base of each of the first coordinates; null for one that is i/n. */
  bases(dimension: number): readonly (number | null)[];
  /** 1, or k where only every k-th point is taken. */
  readonly leap: number;
}

/** A source whose first n points, randomisations apart, are the rank-1 lattice {k z / n}, in whatever order. */
export interface RankOneLattice extends Source {
  /** z for n points (a valid size; where any prefix is valid, a power of two), each component from 0 to n - 1. */
  generatingVector(n: number, dimension: number): readonly bigint[];
}

/**
 * Digit r + 1 (after the point) of coordinate j of point i is row r of matrices[j] times the digits of i in `base`, least
 * significant first; in `gray` order, times the digits of the Gray code of i.
 */
export interface GeneratingMatrices {
  readonly base: number;
  readonly order: "natural" | "gray";
  readonly matrices: readonly Matrix[];
}
