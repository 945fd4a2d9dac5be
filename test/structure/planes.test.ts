/** Points as the sources give them lie on the planes that the dual lattice names, whatever way the source is used. */
import { describe, expect, test } from "vitest";
import { absoluteSum } from "../../src/numeric/lattice-enumeration.js";
import { parseSource } from "../../src/sources/choice.js";
import { dualFigure } from "../../src/structure/dual-lattice.js";
import { hasLattice, latticeStructure } from "../../src/structure/lattice-structure.js";
import { sourceIds } from "../../src/sources/registry.js";
import { shiftedHyperplanes } from "../../src/structure/shifted-hyperplanes.js";
import { congruentialLattices } from "../../src/structure/congruential-lattices.js";
import { recurrenceTuples } from "../../src/structure/tuples.js";
import { pointsOf } from "../sources/points.js";

const COUNT = 64;

/** How far h.u modulo 1 lies from its value for the first point, at most over all points. */
function spread(h: readonly bigint[], points: readonly (readonly number[])[]): number {
  const at = (i: number): number =>
    h.reduce((sum, entry, j) => sum + Number(entry) * (points[i]?.[j] ?? NaN), 0);
  const first = at(0);
  let most = 0;
  for (let i = 1; i < COUNT; i++) {
    const off = at(i) - first;
    most = Math.max(most, Math.abs(off - Math.round(off)));
  }
  return most;
}

/** Source and dimension, and how far a coordinate is from a point of the lattice. */
const CASES: readonly (readonly [
  source: Parameters<typeof parseSource>[0],
  dimension: number,
  off: number,
])[] = [
  ["randu", 3, 0],
  ["minstd-16807", 6, 0],
  ["lcg-1664525", 5, 0],
  ["lcg-6364136223846793005", 12, 0],
  ["drand48", 8, 0],
  ["lrand48", 8, 2 ** -31],
  ["wichmann-hill", 6, 1e-12],
  ["lecuyer1988", 8, 8e-8],
  ["mrg32k3a", 20, 6e-6],
  ["knuth-subtractive", 56, 0],
  ["ranlux24-base", 25, 2 ** -24],
  ["ranlux24", 46, 2 ** -24],
  ["ranlux48-base", 13, 2 ** -48],
  ["lattice", 7, 0],
  ["lattice-sequence", 5, 0],
  ["korobov+shift", 6, 0],
  [{ name: "a", source: "randu", tuples: "strided 3" }, 4, 0],
  [{ name: "b", source: "lcg-1664525", bits: "low 16" }, 4, 0],
  [{ name: "c", source: "lcg-1664525", bits: "top 20" }, 5, 2 ** -20],
  [{ name: "d", source: "randu", float32: true }, 3, 2 ** -24],
  [{ name: "e", congruential: { modulus: 1021, multiplier: 65, increment: 7 } }, 3, 0],
  [{ name: "f", recursive: { modulus: 1009, multipliers: [3, 0, 5] } }, 5, 0],
  [{ name: "g", recursive: { modulus: 1009, multipliers: [3, 5], increment: 9 }, tuples: "strided 2" }, 4, 0],
  [{ name: "h", lattice: { vector: [1, 433, 229] } }, 3, 0],
];

describe("the shortest dual vector", () => {
  for (const [spec, dimension, off] of CASES) {
    const choice = parseSource(spec);
    test(`${choice.id}, ${dimension} coordinates: one value of h.u modulo 1`, () => {
      const { tuples } = latticeStructure(choice, COUNT, dimension);
      const size = Math.min(dimension, 48);
      // the lags of the one recurrence of 55 terms stand in its own index set
      const indices =
        choice.id === "knuth-subtractive" ? [0, 31, 55] : Array.from({ length: size }, (_, j) => j);
      const { vector } = dualFigure(tuples, indices, { squaredLength: 2 ** 22, absoluteSum: 0 });
      const h = Array.from({ length: dimension }, (_, j) => vector[indices.indexOf(j)] ?? 0n);
      const points = pointsOf(choice.source, {
        dimension,
        count: COUNT,
        randomisations: choice.randomisations,
        key: "planes",
      });
      const length = Number(absoluteSum(vector));
      const allowed = length * (2 * off + 1e-13);
      // chance alone would give close to 1/2
      expect(allowed).toBeLessThan(0.3);
      expect(spread(h, points)).toBeLessThanOrEqual(allowed);
    });
  }

  test("every source with a lattice is among the cases, or of the kind of one", () => {
    const kinds = new Set(CASES.map(([spec]) => parseSource(spec).source.method));
    const missing = sourceIds().filter((id) => {
      const choice = parseSource(id);
      return hasLattice(choice) && !kinds.has(choice.source.method);
    });
    expect(missing).toEqual([]);
  });
});

describe("hyperplanes of shifted lattices, counted one by one", () => {
  test.each([
    [5n, 7],
    [13n, 8],
    [3n, 8],
    [11n, 9],
    [27n, 8],
    [7n, 7],
    [17n, 8],
  ])("a = %d, modulus 2^%d", (a, e) => {
    const m = 1n << BigInt(e);
    const recurrence = { multipliers: [a], increment: 0n, modulus: m, note: null };
    const tuples = recurrenceTuples(recurrence);
    for (const lattice of congruentialLattices(recurrence, 1).slice(1)) {
      if (lattice.kind === "knuth") continue;
      for (const t of [2, 3]) {
        const indices = Array.from({ length: t }, (_, j) => j);
        const { l1Vector: h } = dualFigure({ ...tuples, modulus: lattice.modulus }, indices);
        const most = shiftedHyperplanes(h, lattice, tuples);
        const seen = new Set<string>();
        // points of the whole shifted lattice in the cube: (s + 2^j k) v + m z for the states s of the kind
        for (const u of latticePoints(a, m, lattice, t)) {
          const value = h.reduce((sum, entry, j) => sum + entry * (u[j] ?? 0n), 0n);
          seen.add(String(value));
        }
        expect(BigInt(seen.size)).toBeLessThanOrEqual(most);
        // all planes but those that only touch the cube at places without a point
        expect(Number(seen.size)).toBeGreaterThanOrEqual(Number(most) - 2 * lattice.copies);
      }
    }
  });
});

/** The tuples of one run from state 1, or of all odd states, times m. */
function* latticePoints(a: bigint, m: bigint, { kind }: { readonly kind: string }, t: number) {
  const visited = new Set<bigint>();
  if (kind === "seed-averaged") for (let s = 1n; s < m; s += 2n) visited.add(s);
  else for (let x = 1n; !visited.has(x); x = (a * x) % m) visited.add(x);
  for (const s of visited) {
    const u: bigint[] = [];
    for (let [x, j] = [s, 0]; j < t; j++, x = (a * x) % m) u.push(x);
    yield u;
  }
}
