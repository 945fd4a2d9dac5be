/**
 * The laws that every source keeps, as functions of a choice (a source with its randomisations). laws.test.ts runs them
 * for each entry of the registry and each combination of randomisations that it accepts, so a new source gets all of
 * them with no new line.
 */
import fc from "fast-check";
import { expect } from "vitest";
import { instantiateKernels } from "../../src/kernels/instance.js";
import type { SourceSpec } from "../../src/problem/contract.js";
import { parseSource, type SourceChoice } from "../../src/sources/choice.js";
import type { PointStream, Resumable, Seekable } from "../../src/sources/contract.js";
import { makeKey, type Key } from "../../src/sources/key.js";
import { isPseudoRandom, type Usage } from "../../src/sources/pseudo-random.js";
import { acceptedRandomisations } from "../../src/sources/randomisations.js";
import { findSource, sourceIds } from "../../src/sources/registry.js";
import { coordinateOf, wordsOf } from "./oracle.js";

/** Every source of the registry with every combination of randomisations that it accepts. */
export function allChoices(): SourceChoice[] {
  return sourceIds().flatMap((id) => {
    const source = findSource(id);
    if (source === undefined) throw new Error(`no source ${id}`);
    return acceptedRandomisations(source).map((names) => parseSource([id, ...names].join("+")));
  });
}

export interface Law {
  readonly holds: (choice: SourceChoice) => void;
  readonly appliesTo: (choice: SourceChoice) => boolean;
}

const always = (): boolean => true;

/** A source whose key has an effect. */
const repeatable = ({ source }: SourceChoice): boolean => source.repeatable !== false;

/** Points that a law looks at: more than a block of any kernel's, and an odd number where the source allows it. */
const POINTS = 413;

function keyOf(choice: SourceChoice, replicate = 0): Key | null {
  if (choice.deterministic) return null;
  return makeKey({ seed: 20260401, purpose: "study", problem: "laws", source: choice.id, replicate });
}

/** Small, middling and odd dimensions within the source's capacity. */
function dimensionsOf(choice: SourceChoice): number[] {
  return [1, 2, 7].filter((dimension) => dimension <= choice.source.largestDimension);
}

/** A stream, and its next points as rows of coordinates. */
class Reader {
  readonly stream: PointStream & Partial<Seekable & Resumable>;
  readonly #kernels = instantiateKernels();
  readonly #pointer: number;
  readonly #stride: number;

  constructor(
    choice: SourceChoice,
    readonly dimension: number,
    readonly n: number,
    key = keyOf(choice),
    replicate = 0,
  ) {
    this.stream = choice.open({ dimension, n, key, replicate }, this.#kernels);
    this.#stride = Math.ceil(n / 8) * 8;
    this.#pointer = this.#kernels.arena.allocate(this.#stride * dimension * 8);
  }

  /** The next `count` points, one after the other. */
  read(count: number): number[] {
    this.stream.fill(this.#pointer, this.#stride, count);
    const rows = this.#kernels.f64(this.#pointer, this.#stride * this.dimension);
    const points: number[] = [];
    for (let i = 0; i < count; i++) {
      for (let j = 0; j < this.dimension; j++) points.push(rows[j * this.#stride + i] ?? NaN);
    }
    return points;
  }
}

function sameKeySamePoints(choice: SourceChoice): void {
  const n = choice.source.nearestSize(POINTS);
  for (const dimension of dimensionsOf(choice)) {
    expect(new Reader(choice, dimension, n).read(n)).toEqual(new Reader(choice, dimension, n).read(n));
    // what is posted to a worker thread opens the same points there
    const again = parseSource(JSON.parse(JSON.stringify(choice.spec)) as SourceSpec);
    expect(again.id).toBe(choice.id);
    expect(new Reader(again, dimension, n).read(n)).toEqual(new Reader(choice, dimension, n).read(n));
  }
}

function replicatesDiffer(choice: SourceChoice): void {
  const n = choice.source.nearestSize(64);
  const replicates = Array.from({ length: 20 }, (_, r) =>
    new Reader(choice, 2, n, keyOf(choice, r), r).read(n).join(" "),
  );
  expect(new Set(replicates).size).toBe(20);
}

function insideTheOpenInterval(choice: SourceChoice): void {
  const n = choice.source.nearestSize(5000);
  for (const dimension of dimensionsOf(choice)) {
    const outside = new Reader(choice, dimension, n).read(n).filter((u) => !(u > 0 && u < 1));
    expect(outside).toEqual([]);
  }
}

/** Any cutting of a run into calls of `fill` gives the same points. */
function blocksDoNotMatter(choice: SourceChoice): void {
  const n = choice.source.nearestSize(POINTS);
  for (const dimension of dimensionsOf(choice)) {
    const whole = new Reader(choice, dimension, n).read(n);
    fc.assert(
      fc.property(fc.array(fc.integer({ min: 1, max: n }), { minLength: 1, maxLength: 12 }), (sizes) => {
        const reader = new Reader(choice, dimension, n);
        const parts: number[] = [];
        let left = n;
        for (let k = 0; left > 0; k++) {
          const size = Math.min(sizes[k % sizes.length] ?? 1, left);
          parts.push(...reader.read(size));
          left -= size;
        }
        expect(parts).toEqual(whole);
      }),
      { numRuns: 10, seed: 11 },
    );
  }
}

function seekEqualsSkipping(choice: SourceChoice): void {
  const n = choice.source.nearestSize(POINTS);
  for (const dimension of dimensionsOf(choice)) {
    const whole = new Reader(choice, dimension, n).read(n);
    const reader = new Reader(choice, dimension, n);
    fc.assert(
      fc.property(fc.nat(n - 1), fc.integer({ min: 1, max: 40 }), (index, wanted) => {
        const count = Math.min(wanted, n - index);
        reader.stream.seek?.(index);
        expect(reader.read(count)).toEqual(whole.slice(index * dimension, (index + count) * dimension));
      }),
      {
        numRuns: 15,
        seed: 12,
        examples: [
          [0, 1],
          [n - 1, 1],
        ],
      },
    );
  }
}

/** A saved state restores the stream to the bit, in another stream of the same choice too. */
function stateRoundTrips(choice: SourceChoice): void {
  const n = choice.source.nearestSize(POINTS);
  const cut = Math.floor(n / 3);
  for (const dimension of dimensionsOf(choice)) {
    const reader = new Reader(choice, dimension, n);
    reader.read(cut);
    const saved = reader.stream.save?.() ?? "";
    const next = reader.read(n - cut);
    JSON.parse(saved);
    const other = new Reader(choice, dimension, n);
    other.stream.restore?.(saved);
    expect(other.read(n - cut)).toEqual(next);
    reader.stream.restore?.(saved);
    expect(reader.read(n - cut)).toEqual(next);
  }
  const reader = new Reader(choice, 1, n);
  for (const wrong of ["", "no JSON", "[]", '{"source":"another","states":[]}']) {
    expect(() => reader.stream.restore?.(wrong)).toThrow(RangeError);
  }
}

/** Dimension and n are refused at the door, word for word; every size that a source proposes is valid. */
function capacityIsChecked(choice: SourceChoice): void {
  const { id, largestDimension } = choice.source;
  const kernels = instantiateKernels();
  const key = keyOf(choice);
  const n = choice.source.nearestSize(64);
  const allowed = `expected an integer from 1 to ${largestDimension} for source "${id}"`;
  for (const dimension of [0, -1, largestDimension + 1]) {
    const message = `dimension: ${allowed}, found ${dimension}`;
    expect(() => choice.open({ dimension, n, key }, kernels)).toThrow(new RangeError(message));
  }
  for (const dimension of [1.5, NaN, Infinity]) {
    const message = `dimension: ${allowed}, found ${dimension}`;
    expect(() => choice.open({ dimension, n, key }, kernels)).toThrow(new TypeError(message));
  }
  for (const wrong of [0, -5]) {
    const message = `n: expected an integer from 1 to 9007199254740991 for source "${id}", found ${wrong}`;
    expect(() => choice.open({ dimension: 1, n: wrong, key }, kernels)).toThrow(new RangeError(message));
  }
  for (const size of [1, 2, 100, 1009, 65536, 1_000_000]) {
    const nearest = choice.source.nearestSize(size);
    expect(nearest).toBeGreaterThanOrEqual(1);
    expect(choice.source.nearestSize(nearest)).toBe(nearest);
    if (nearest === size) continue;
    expect(() => choice.open({ dimension: 1, n: size, key }, kernels)).toThrow(
      new RangeError(`n: expected a valid size for source "${id}", found ${size}; the nearest is ${nearest}`),
    );
  }
  const published = isPseudoRandom(choice.source) && choice.source.usage.seeding.kind !== "uniform-state";
  if (!choice.deterministic && !published && repeatable(choice)) {
    expect(() => choice.open({ dimension: 1, n, key: null }, kernels)).toThrow(TypeError);
  }
}

/** The kernel's points are those of the definition in BigInt, on long stretches from random states. */
function kernelEqualsDefinition(choice: SourceChoice): void {
  const { source } = choice;
  if (!isPseudoRandom(source)) throw new Error(`${source.id} has no definition in BigInt`);
  const { recurrence, usage } = source;
  fc.assert(
    fc.property(
      fc.nat(),
      fc.integer({ min: 1, max: 9 }),
      fc.integer({ min: 1, max: 700 }),
      (r, dimension, n) => {
        const key = makeKey({ seed: r, purpose: "study", problem: "words", source: choice.id, replicate: 0 });
        const points = new Reader(choice, dimension, n, key).read(n);
        expect(points).toEqual(definedPoints(usage, dimension, n));

        function definedPoints({ tuples }: Usage, columns: number, count: number): number[] {
          const coordinate = (word: bigint): number => coordinateOf(word, recurrence, usage);
          if (tuples.kind === "per-coordinate") {
            const streams = Array.from({ length: columns }, (_, j) =>
              wordsOf(recurrence, recurrence.stateFromKey(key.derive(`coordinate ${j}`))),
            );
            return Array.from({ length: count }, () => streams.map((s) => coordinate(s.next().value))).flat();
          }
          const words = wordsOf(recurrence, recurrence.stateFromKey(key));
          return Array.from({ length: count * columns }, () => {
            const word = words.next().value;
            for (let k = 1; k < tuples.step; k++) words.next();
            return coordinate(word);
          });
        }
      },
    ),
    { numRuns: 12, seed: 13 },
  );
}

export const laws: Readonly<Record<string, Law>> = {
  "same key, same points; the serialised choice opens them too": {
    holds: sameKeySamePoints,
    appliesTo: repeatable,
  },
  "replicates differ": { holds: replicatesDiffer, appliesTo: (choice) => !choice.deterministic },
  "0 < u < 1": {
    holds: insideTheOpenInterval,
    // `endpoint: left` and `float32` hit 0 and 1, and are there to show it
    appliesTo: ({ source }) =>
      !isPseudoRandom(source) || (source.usage.endpoint === "middle" && !source.usage.float32),
  },
  "block boundaries do not matter": { holds: blocksDoNotMatter, appliesTo: repeatable },
  "seek equals skipping": { holds: seekEqualsSkipping, appliesTo: (choice) => canDo(choice, "seek") },
  "a saved state restores the stream": {
    holds: stateRoundTrips,
    appliesTo: (choice) => canDo(choice, "save"),
  },
  "capacity is checked": { holds: capacityIsChecked, appliesTo: always },
  "kernel words equal the definition in BigInt": {
    holds: kernelEqualsDefinition,
    appliesTo: ({ source }) => isPseudoRandom(source) && source.usage.seeding.kind === "uniform-state",
  },
};

function canDo(choice: SourceChoice, ability: "seek" | "save"): boolean {
  return new Reader(choice, 1, choice.source.nearestSize(64)).stream[ability] !== undefined;
}
