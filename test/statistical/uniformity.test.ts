/**
 * Uniformity of coordinates and independence of pairs by Pearson's chi-square, on fixed seeds. Counts of 2^16 points in
 * 256 cells each: cells of one coordinate, 16 x 16 cells of two. The statistic is turned into a normal deviate by the
 * cube-root transformation of E. B. Wilson and M. M. Hilferty, "The distribution of chi-square", Proceedings of the
 * National Academy of Sciences 17 (1931) 684-688, and its size held against 4: false alarms of 6.3e-5 a test, both
 * tails. Sources that are more even than random (quasi-random ones) are held against the upper tail alone.
 */
import { describe, expect, test } from "vitest";
import { instantiateKernels } from "../../src/kernels/instance.js";
import { parseSource, type SourceChoice } from "../../src/sources/choice.js";
import { makeKey } from "../../src/sources/key.js";
import { allChoices } from "../sources/laws.js";

const POINTS = 65536;
const DIMENSION = 3;
const LIMIT = 4;

/** Rows of coordinates of the first points of one stream. */
function rowsOf(choice: SourceChoice, dimension = DIMENSION): Float64Array[] {
  const kernels = instantiateKernels();
  const n = choice.source.nearestSize(POINTS);
  const stride = Math.ceil(n / 8) * 8;
  const pointer = kernels.arena.allocate(stride * dimension * 8);
  const key = makeKey({ seed: 7, purpose: "points", problem: "uniformity", source: choice.id, replicate: 0 });
  choice.open({ dimension, n, key: choice.deterministic ? null : key }, kernels).fill(pointer, stride, n);
  return Array.from({ length: dimension }, (_, j) => kernels.f64(pointer + j * stride * 8, n).slice());
}

/** Counts of points in cells^rows.length cubes. */
function countCells(rows: readonly Float64Array[], cells: number): Uint32Array {
  const counts = new Uint32Array(cells ** rows.length);
  const n = rows[0]?.length ?? 0;
  for (let i = 0; i < n; i++) {
    let cell = 0;
    for (const row of rows) cell = cell * cells + Math.floor((row[i] ?? NaN) * cells);
    counts[cell] = (counts[cell] ?? 0) + 1;
  }
  return counts;
}

/** Normal deviate of Pearson's statistic for equally likely cells. */
function deviate(counts: Uint32Array): number {
  const expected = counts.reduce((sum, count) => sum + count, 0) / counts.length;
  const statistic = counts.reduce((sum, count) => sum + (count - expected) ** 2 / expected, 0);
  const freedom = counts.length - 1;
  const spread = 2 / (9 * freedom);
  return (Math.cbrt(statistic / freedom) - (1 - spread)) / Math.sqrt(spread);
}

describe.each(
  allChoices()
    .filter(
      ({ source }) =>
        source.repeatable !== false && source.knownStructure === null && source.largestDimension >= DIMENSION,
    )
    .map((choice) => ({ name: choice.id, choice })),
)("$name", ({ choice }) => {
  const rows = rowsOf(choice);
  const bothTails = choice.source.family === "pseudo-random";

  function expectEven(counts: Uint32Array): void {
    const z = deviate(counts);
    expect(z).toBeLessThan(LIMIT);
    if (bothTails) expect(z).toBeGreaterThan(-LIMIT);
  }

  test("each coordinate fills 256 cells evenly", () => {
    for (const row of rows) expectEven(countCells([row], 256));
  });

  test("each pair of coordinates fills 16 x 16 cells evenly", () => {
    const pairs = [0, 1, 2].map((left) => rows.filter((_, j) => j !== left));
    for (const pair of pairs) expectEven(countCells(pair, 16));
  });

  if (bothTails) {
    test("the low bits of a coordinate are even too", () => {
      // the lowest eight of the bits that a coordinate holds before its midpoint
      const bits = Math.min(choice.source.outputBits, 52);
      const low = (rows[0] ?? new Float64Array()).map((u) => (u * 2 ** (bits - 8)) % 1);
      expectEven(countCells([low], 256));
    });
  }
});

describe("sources with known structure fail where their structure shows", () => {
  test("low bits of a power-of-two modulus repeat: every value of eight bits comes exactly as often as any other", () => {
    for (const source of ["lcg-69069", "lcg-1103515245", "lcg-1664525", "lcg-6364136223846793005"]) {
      const [low = new Float64Array()] = rowsOf(parseSource({ name: "low", source, bits: "low 8" }), 1);
      expect(new Set(countCells([low], 256))).toEqual(new Set([POINTS / 256]));
      const [high = new Float64Array()] = rowsOf(parseSource({ name: "high", source, bits: "top 8" }), 1);
      expect(Math.abs(deviate(countCells([high], 256)))).toBeLessThan(LIMIT);
    }
  });

  test("every 4096th output of a modulus 2^32, as in leapfrogged streams: pairs are far more even than chance", () => {
    const source = "lcg-1664525";
    const leapfrogged = rowsOf(parseSource({ name: "leapfrogged", source, tuples: "strided 4096" }), 2);
    // the multiplier 1664525^4096 is 1 modulo 2^14: the top bits move nearly in equal steps
    expect(deviate(countCells(leapfrogged, 16))).toBeLessThan(-10);
    expect(Math.abs(deviate(countCells(rowsOf(parseSource(source), 2), 16)))).toBeLessThan(LIMIT);
  });

  /** Deviate of triples in 32^3 cells: two points a cell are expected. */
  const triples = (id: string): number => deviate(countCells(rowsOf(parseSource(id)), 32));

  test("randu: pairs look even, triples are far from it", () => {
    const rows = rowsOf(parseSource("randu"));
    expect(Math.abs(deviate(countCells(rows.slice(0, 2), 16)))).toBeLessThan(LIMIT);
    expect(triples("randu")).toBeGreaterThan(100);
  });

  test("kronecker: sqrt(2) and sqrt(5) nearly line up, and the pair is uneven where its neighbours are far too even", () => {
    const [u = new Float64Array(), v = new Float64Array(), w = new Float64Array()] = rowsOf(
      parseSource("kronecker"),
    );
    expect(deviate(countCells([u, w], 32))).toBeGreaterThan(30);
    expect(deviate(countCells([u, v], 32))).toBeLessThan(-10);
    expect(deviate(countCells([v, w], 32))).toBeLessThan(-10);
  });

  test("a sound source passes the same test", () => {
    for (const id of ["philox4x32", "pcg64", "mt19937"]) expect(Math.abs(triples(id))).toBeLessThan(LIMIT);
  });
});
