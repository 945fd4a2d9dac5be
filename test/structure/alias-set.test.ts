import { expect, test } from "vitest";
import { parseSource } from "../../src/sources/choice.js";
import { isPseudoRandom } from "../../src/sources/pseudo-random.js";
import { aliasSetOf, type AliasSet } from "../../src/structure/alias-set.js";
import { aliasVectors, productWeight, squaredLength } from "../../src/structure/alias-vectors.js";

type Description = Readonly<Record<string, unknown>>;

function setOf(description: Description, dimension: number): AliasSet {
  const set = aliasSetOf(parseSource({ name: "house", ...description }), dimension, 1);
  if ("reason" in set) throw new Error(set.reason);
  return set;
}

/** Tuples of coordinates from each of these states, by the generator's own integers. */
function tuplesFrom(description: Description, states: readonly string[], dimension: number): number[][] {
  const { source } = parseSource({ name: "house", ...description });
  if (!isPseudoRandom(source)) throw new Error("not a generator");
  const { usage, recurrence } = source;
  const step = usage.tuples.kind === "strided" ? usage.tuples.step : 1;
  const modulus = Number(usage.bits === null ? recurrence.output.modulus : 2 ** usage.bits.count);
  const offset = usage.endpoint === "left" || (recurrence.output.zeroless && usage.bits === null) ? 0 : 0.5;
  return states.map((state) => {
    const integers = source.openIntegers({ key: null, state });
    const outputs = Array.from({ length: (dimension - 1) * step + 1 }, () => Number(integers.next()));
    return Array.from({ length: dimension }, (_, j) => ((outputs[j * step] ?? 0) + offset) / modulus);
  });
}

/** The mean of e^(2 pi i h.u) over all tuples. */
function meanWave(tuples: readonly number[][], h: readonly number[]): [number, number] {
  let [re, im] = [0, 0];
  for (const u of tuples) {
    const angle = 2 * Math.PI * h.reduce((sum, entry, j) => sum + entry * (u[j] ?? 0), 0);
    re += Math.cos(angle) / tuples.length;
    im += Math.sin(angle) / tuples.length;
  }
  return [re, im];
}

function vectorsUpTo(reach: number, dimension: number): number[][] {
  let all: number[][] = [[]];
  for (let j = 0; j < dimension; j++) {
    all = all.flatMap((h) => Array.from({ length: 2 * reach + 1 }, (_, k) => [...h, k - reach]));
  }
  return all.filter((h) => h.some((entry) => entry !== 0));
}

const numbers = (first: number, last: number): string[] =>
  Array.from({ length: last - first + 1 }, (_, k) => String(first + k));
const coprimeTo = (m: number): string[] =>
  numbers(1, m - 1).filter((x) => {
    const gcd = (a: number, b: number): number => (b === 0 ? a : gcd(b, a % b));
    return gcd(Number(x), m) === 1;
  });

/** Weights are exact up to `missing`, which the origin that is left out takes. */
const CASES: readonly { what: string; source: Description; states: readonly string[]; missing?: number }[] = [
  {
    what: "with increment",
    source: { congruential: { modulus: 64, multiplier: 13, increment: 7 } },
    states: numbers(0, 63),
  },
  {
    what: "with increment, modulus no power of two",
    source: { congruential: { modulus: 45, multiplier: 16, increment: 4 } },
    states: numbers(0, 44),
  },
  {
    what: "power of two, a mod 8 = 5",
    source: { congruential: { modulus: 64, multiplier: 13 } },
    states: coprimeTo(64),
  },
  {
    what: "power of two, a mod 8 = 3",
    source: { congruential: { modulus: 64, multiplier: 19 } },
    states: coprimeTo(64),
  },
  {
    what: "every third output",
    source: { congruential: { modulus: 64, multiplier: 13, increment: 7 }, tuples: "strided 3" },
    states: numbers(0, 63),
  },
  {
    what: "left ends",
    source: { congruential: { modulus: 64, multiplier: 13, increment: 7 }, endpoint: "left" },
    states: numbers(0, 63),
  },
  {
    what: "low bits",
    source: { congruential: { modulus: 256, multiplier: 13, increment: 7 }, bits: "low 5" },
    states: numbers(0, 255),
  },
  { what: "composite", source: { congruential: { modulus: 90, multiplier: 7 } }, states: coprimeTo(90) },
  {
    what: "prime",
    source: { congruential: { modulus: 61, multiplier: 17 } },
    states: coprimeTo(61),
    missing: 1 / 60,
  },
];

test.each(CASES)("$what: waves average to their weights", ({ source, states, missing = 0 }) => {
  const set = setOf(source, 3);
  const tuples = tuplesFrom(source, states, 3);
  for (const h of vectorsUpTo(4, 3)) {
    const indices = [0, 1, 2].filter((j) => h[j] !== 0);
    const entries = indices.map((j) => h[j] ?? 0);
    const inDual =
      indices.reduce((sum, j) => sum + BigInt(h[j] ?? 0) * (set.tuples.vector(j)[0] ?? 0n), 0n) %
        set.modulus ===
      0n;
    const [re, im] = meanWave(tuples, h);
    const { size, phase } = set.weight({ indices, entries });
    // off the dual lattice only the missing origin is left
    const [x, y] = inDual
      ? [size * Math.cos(2 * Math.PI * phase), size * Math.sin(2 * Math.PI * phase)]
      : [-missing, 0];
    expect(re).toBeCloseTo(x, 9);
    expect(im).toBeCloseTo(y, 9);
  }
});

test("sources without a lattice say why", () => {
  const reason = (spec: string | Description): string => {
    const set = aliasSetOf(parseSource(typeof spec === "string" ? spec : { name: "house", ...spec }), 3, 64);
    return "reason" in set ? set.reason : "";
  };
  const congruential = { modulus: "2^31", multiplier: 65539 };
  expect(reason("mt19937")).toContain("no lattice structure");
  expect(reason("sobol+owen")).toContain("no lattice structure");
  expect(reason("lattice+shift")).toContain("0 by theorem");
  expect(reason({ congruential, tuples: "per-coordinate" })).toContain("a stream of its own");
  expect(reason({ congruential, state: 1 })).toContain("one given state");
  expect(reason({ congruential: { modulus: 64, multiplier: 6, increment: 1 } })).toContain("shares a factor");
  expect(reason({ congruential: { modulus: 61, multiplier: 17 }, bits: "top 4" })).toContain(
    "no power of two",
  );
});

test("published seeds are said to be no average over all starts", () => {
  const set = setOf({ congruential: { modulus: 61, multiplier: 17 }, seeding: "published" }, 3);
  expect(set.what).toContain("start at published seeds");
});

test("short vectors come first, by product weight or by length, at every place along the coordinates", () => {
  const set = setOf({ congruential: { modulus: "2^31", multiplier: 65539 } }, 5);
  const { vectors, shortest } = aliasVectors(set, 5, 64);
  expect(vectors.slice(0, 3)).toEqual(
    [0, 1, 2].map((first) => ({ indices: [first, first + 1, first + 2], entries: [9, -6, 1] })),
  );
  // Knuth, The Art of Computer Programming, vol. 2, 3.3.4, table 1, line 10: nu_3^2 = 118, nu_4^2 = 116
  expect(Math.min(...vectors.map(squaredLength))).toBe(116);
  expect(shortest === null ? null : squaredLength(shortest)).toBe(116);
  expect(Math.min(...vectors.map(productWeight))).toBe(54);
});

test("pairs of a multiplicative generator are found at any distance", () => {
  const set = setOf({ congruential: { modulus: "2^31 - 1", multiplier: 16807 } }, 8);
  const { vectors } = aliasVectors(set, 8, 400);
  expect(vectors).toContainEqual({ indices: [3, 4], entries: [16807, -1] });
});

test("the lags of an additive generator are looked at", () => {
  const set = aliasSetOf(parseSource("knuth-subtractive"), 60, 1);
  if ("reason" in set) throw new Error(set.reason);
  expect(aliasVectors(set, 60, 10).vectors[0]).toEqual({ indices: [0, 31, 55], entries: [1, -1, -1] });
  expect(aliasVectors(set, 20, 10).vectors).toEqual([]);
});
