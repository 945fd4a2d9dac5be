/**
 * Discrepancies of point sets against data/qmc.json: L2 ones in exact rational arithmetic (SciPy 1.17.1 agrees there to
 * 3.4e-11), star and extreme ones as exact fractions found by trying all boxes.
 */
import { describe, expect, it } from "vitest";
import { parseSource } from "../../src/sources/choice.js";
import { discrepancies, type DiscrepancyKind } from "../../src/structure/discrepancy.js";
import { firstPoints, pointSet, type PointSet } from "../../src/structure/points.js";
import { extremeDiscrepancy, starDiscrepancy } from "../../src/structure/star-discrepancy.js";
import { reference, type DiscrepancyReference } from "./qmc-data.js";

const { sets, one_dimensional } = reference.discrepancy;

/** Points `from`... of a source, `n` of them. */
function ofSource(id: string, n: number, dimension: number, from = 0): PointSet {
  const all = firstPoints(parseSource(id), { dimension, n: n + from, key: null });
  const points = Array.from({ length: n }, (_, i) =>
    Array.from({ length: dimension }, (_, j) => all.coordinates[j * all.n + i + from] ?? NaN),
  );
  return pointSet(points);
}

function ofLattice(n: number, z: number[]): PointSet {
  return pointSet(Array.from({ length: n }, (_, k) => z.map((component) => ((k * component) % n) / n)));
}

/** Tuples of x <- 16807 x mod 2^31 - 1 from 1, the seed left out, as in the file. */
function ofMinstd(n: number, dimension: number): PointSet {
  let x = 1;
  return pointSet(
    Array.from({ length: n }, () =>
      Array.from({ length: dimension }, () => (x = (x * 16807) % (2 ** 31 - 1)) / (2 ** 31 - 1)),
    ),
  );
}

const makers: Record<string, (n: number, d: number) => PointSet> = {
  "sobol-n16-d2 (gray, n=0..15)": (n, d) => ofSource("sobol", n, d),
  "sobol-n64-d3": (n, d) => ofSource("sobol", n, d),
  "sobol-n100-d2": (n, d) => ofSource("sobol", n, d),
  "sobol-n32-d10": (n, d) => ofSource("sobol", n, d),
  "sobol-n15-d2 from n=1": (n, d) => ofSource("sobol", n, d, 1),
  "halton-n16-d2 (n=0..15)": (n, d) => ofSource("halton", n, d),
  "halton-n50-d4 from n=1": (n, d) => ofSource("halton", n, d, 1),
  "halton-n20-d20 from n=1": (n, d) => ofSource("halton", n, d, 1),
  "lattice-n21-z(1,13)": () => ofLattice(21, [1, 13]),
  "lattice-n55-z(1,34)": () => ofLattice(55, [1, 34]),
  "lattice-n89-z(1,55)": () => ofLattice(89, [1, 55]),
  "minstd16807-seed1-n64-d2 (x_n/(2^31-1), consecutive non-overlapping)": ofMinstd,
  "minstd16807-seed1-n40-d5": ofMinstd,
  "centre-n1-d3": () => pointSet([[0.5, 0.5, 0.5]]),
  "corner-n1-d2 (origin)": () => pointSet([[0, 0]]),
  "centred-grid-3x3": () =>
    pointSet(Array.from({ length: 9 }, (_, i) => [(2 * Math.floor(i / 3) + 1) / 6, ((i % 3) * 2 + 1) / 6])),
  "scipy-doc-space1 [[1,3],[2,6],[3,2],[4,5],[5,1],[6,4]] scaled": () =>
    pointSet(
      [
        [1, 3],
        [2, 6],
        [3, 2],
        [4, 5],
        [5, 1],
        [6, 4],
      ].map((point) => point.map((x) => (x - 0.5) / 6)),
    ),
};

const published: Record<DiscrepancyKind, (set: DiscrepancyReference) => [string, string]> = {
  centred: (set) => [set.centered_L2_squared, set.centered_L2],
  wraparound: (set) => [set.wraparound_L2_squared, set.wraparound_L2],
  mixture: (set) => [set.mixture_L2_squared, set.mixture_L2],
  star: (set) => [set.L2_star_squared_warnock, set.L2_star_warnock],
  "modified-star": (set) => [set.modified_L2_star_squared_hickernell, set.modified_L2_star_hickernell],
};

describe.each(Object.entries(sets))("discrepancies of %s, qmc.json", (name, set) => {
  const points = makers[name]?.(set.n, set.d) ?? pointSet([[0]]);

  it.each(Object.entries(published))("%s L2, its square and root", (kind, of) => {
    const [found] = discrepancies(points, [kind as DiscrepancyKind]);
    const [squared, root] = of(set).map(Number);
    // coordinates in base 61 are themselves up to 61 * 2^-53 off the exact ones
    const allowed = 4 * (found?.rounding ?? NaN);
    expect(Math.abs((found?.squared ?? NaN) - (squared ?? NaN))).toBeLessThan(allowed);
    expect((found?.root ?? NaN) / (root ?? NaN)).toBeCloseTo(1, 9);
  });

  it("SciPy's values: squares, and of star L2 the root", () => {
    const [centred, wraparound, mixture, star] = discrepancies(points);
    expect((centred?.squared ?? NaN) / set.scipy_CD).toBeCloseTo(1, 9);
    expect((wraparound?.squared ?? NaN) / set.scipy_WD).toBeCloseTo(1, 9);
    expect((mixture?.squared ?? NaN) / set.scipy_MD).toBeCloseTo(1, 9);
    expect((star?.root ?? NaN) / set["scipy_L2-star"]).toBeCloseTo(1, 9);
  });

  if (set.star_discrepancy === undefined) return;

  it("star discrepancy", () => {
    expect(starDiscrepancy(points)).toBeCloseTo(Number(set.star_discrepancy), 14);
  });
});

/** The radical inverses of from...from + count - 1. */
function corput(base: number, from: number, count: number): number[] {
  return Array.from({ length: count }, (_, i) => {
    let [value, weight] = [0, 1];
    for (let rest = i + from; rest > 0; rest = Math.floor(rest / base)) {
      weight /= base;
      value += (rest % base) * weight;
    }
    return value;
  });
}

const lines: Record<string, number[]> = {
  "van-der-corput-base2-n=0..15": corput(2, 0, 16),
  "van-der-corput-base2-n=1..100": corput(2, 1, 100),
  "van-der-corput-base3-n=0..49": corput(3, 0, 50),
  "centred-grid-n10": Array.from({ length: 10 }, (_, i) => (i + 0.5) / 10),
  "left-grid-n10": Array.from({ length: 10 }, (_, i) => i / 10),
  "single-0.3": [0.3],
  "ties 0.5,0.5,0.9": [0.5, 0.5, 0.9],
  "minstd16807-seed1-n100": [...ofMinstd(100, 1).coordinates],
  "golden-rotation-n50 frac(i*(sqrt5-1)/2) rounded to 2^-32": Array.from(
    { length: 50 },
    (_, i) => Math.floor(((i * ((Math.sqrt(5) - 1) / 2)) % 1) * 2 ** 32) / 2 ** 32,
  ),
};

describe.each(Object.entries(one_dimensional))("one dimension, qmc.json: %s", (name, set) => {
  const points = pointSet((lines[name] ?? []).map((x) => [x]));

  it("star and extreme discrepancy", () => {
    expect(starDiscrepancy(points)).toBeCloseTo(Number(set.star), 14);
    expect(extremeDiscrepancy(points)).toBeCloseTo(Number(set.extreme), 14);
  });
});
