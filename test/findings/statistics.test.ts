/** Rules of single findings: cells, spread, consensus and references, each against a value worked out beside it. */
import { describe, expect, it } from "vitest";
import { toCells } from "../../src/findings/cells.js";
import { consensusOf } from "../../src/findings/consensus.js";
import { makeContext } from "../../src/findings/context.js";
import { referencesOf, toleranceOf } from "../../src/findings/reference.js";
import { seriesOf } from "../../src/findings/series.js";
import { spreadOf } from "../../src/findings/spread.js";
import { makeCell, makeProblem, makeSeries, makeSource, normals, uniforms } from "./make.js";

const problems = [makeProblem("p")];
const sources = [makeSource("philox4x32"), makeSource("randu", { knownStructure: "planes" })];
const context = makeContext(problems, sources, []);

describe("cells", () => {
  it("hold mean, bias, its standard error and RMSE of the errors against the reference", () => {
    // Errors 0.1, 0.3, -0.1, 0.1 against 1: mean 0.1, sample variance 0.08/3, mean square 0.03.
    const [cell] = toCells([makeCell({ estimates: [1.1, 1.3, 0.9, 1.1] })], context);
    expect(cell?.mean).toBeCloseTo(1.1, 14);
    expect(cell?.bias).toBeCloseTo(0.1, 14);
    expect(cell?.replicateDeviation).toBeCloseTo(Math.sqrt(0.08 / 3), 14);
    expect(cell?.biasStandardError).toBeCloseTo(Math.sqrt(0.08 / 3 / 4), 14);
    expect(cell?.rmse).toBeCloseTo(Math.sqrt(0.03), 14);
  });

  it("add the uncertainty of the reference to the standard error in quadrature", () => {
    const reference = { value: 1, text: "1", uncertainty: 0.3, basis: "" };
    const uncertain = makeContext([makeProblem("p", { reference })], sources, []);
    const [cell] = toCells([makeCell({ estimates: [1.4, 0.6, 1.4, 0.6] })], uncertain);
    // s^2/R = 0.64/3/4.
    expect(cell?.biasStandardError).toBeCloseTo(Math.sqrt(0.64 / 12 + 0.09), 14);
  });

  it("take sigma from a sound source, not from the one that is looked at", () => {
    const estimates = [1.1, 0.9, 1.1, 0.9];
    const cells = toCells(
      [
        makeCell({ source: "randu", n: 100, estimates, withinVariances: [9, 9, 9, 9] }),
        makeCell({ n: 100, estimates, withinVariances: [4, 4, 4, 4] }),
      ],
      context,
    );
    // s^2 n / sigma^2 = (0.04/3) 100 / 4.
    expect(cells.map((cell) => cell.varianceAgainstCrude)).toEqual([
      expect.closeTo(1 / 3, 12),
      expect.closeTo(1 / 3, 12),
    ]);
    expect(cells[0]?.integrandDeviation).toBe(3);
  });

  it("bound the spread against crude Monte Carlo by bootstrap, at the largest n only", () => {
    // 128 normal replicates of sigma = 1, each variance within known: 95 % of s^2 n lie within about 1 +/- 2 sqrt(2/127).
    const normal = normals(21);
    const cells = [256, 512].map((n) =>
      makeCell({
        n,
        estimates: Array.from({ length: 128 }, () => 1 + normal() / Math.sqrt(n)),
        withinVariances: new Array<number>(128).fill(1),
      }),
    );
    const [small, large] = toCells(cells, context);
    expect(small?.varianceAgainstCrudeInterval).toBeNull();
    const [low, high] = large?.varianceAgainstCrudeInterval ?? expect.fail();
    expect(low).toBeLessThan(1);
    expect(high).toBeGreaterThan(1);
    expect((high - low) / 4).toBeGreaterThan(0.7 * Math.sqrt(2 / 127));
    expect((high - low) / 4).toBeLessThan(1.3 * Math.sqrt(2 / 127));
    expect(toCells(cells, context)[1]?.varianceAgainstCrudeInterval).toEqual([low, high]);
  });

  it("count the claimed intervals that held the reference, from 200 replicates on", () => {
    const normal = normals(7);
    const estimates = Array.from({ length: 2000 }, () => 1 + normal() / 32);
    const honest = makeCell({ estimates, withinVariances: estimates.map(() => 1) });
    const narrow = makeCell({ estimates, withinVariances: estimates.map(() => 0.25) });
    const few = makeCell({
      estimates: estimates.slice(0, 199),
      withinVariances: estimates.slice(0, 199).map(() => 1),
    });
    const [a, b, c] = toCells([honest, narrow, few], context).map((cell) => cell.coverage);
    // 99 % claimed; half the width holds P(|Z| < 1.288) = 0.802. Three standard errors of a share of 2,000: 0.007, 0.027.
    expect(Math.abs((a ?? 0) - 0.99)).toBeLessThan(0.007);
    expect(Math.abs((b ?? 0) - 0.802)).toBeLessThan(0.027);
    expect(c).toBeNull();
  });

  it("mark heavy tails by a sample kurtosis above 6", () => {
    const spike = [0, 0, 0, 0, 0, 0, 0, 0, 0, 1];
    // One of R values: kurtosis R - 2 + 1/(R - 1) = 8.1 for R = 10.
    expect(toCells([makeCell({ estimates: spike })], context)[0]?.heavyTailed).toBe(true);
    expect(toCells([makeCell({ estimates: [0, 1, 0, 1] })], context)[0]?.heavyTailed).toBe(false);
  });
});

describe("the spread over n", () => {
  it("finds a plateau and how much of it is sure", () => {
    // s^2 = 0.02^2 + 1/n: at n = 2^20 the plateau is 20 times the rest.
    const normal = normals(11);
    const sizes = Array.from({ length: 13 }, (_, i) => 2 ** (8 + i));
    const shared = Array.from({ length: 64 }, () => 0.02 * normal());
    const cells = sizes.map((n) =>
      makeCell({ n, estimates: shared.map((own) => 1 + own + normal() / Math.sqrt(n)) }),
    );
    const [series] = seriesOf(toCells(cells, context));
    const spread = series === undefined ? null : spreadOf(series, true);
    expect(spread?.plateau?.value).toBeGreaterThan(0.015);
    expect(spread?.plateau?.value).toBeLessThan(0.025);
    expect(spread?.plateau?.lower).toBeGreaterThan(0.01);
    expect(spread?.reach(0.005)).toBeNull();
    expect(spread?.at(2 ** 30)?.value).toBeCloseTo(spread?.plateau?.value ?? 0, 3);
  });

  it("finds none in a thousandth of pure n^-1/2 curves, which a free order would", () => {
    let found = 0;
    for (let seed = 0; seed < 500; seed++) {
      const [series] = seriesOf(
        toCells(makeSeries({ seed, sizes: [256, 512, 1024, 2048, 4096, 8192] }), context),
      );
      if (series !== undefined && spreadOf(series, true)?.plateau) found++;
    }
    // At most 1 % is asked for; fixed seeds.
    expect(found).toBeLessThanOrEqual(5);
  });

  it("reads a quasi-random curve between its sizes and beyond them by its own slope", () => {
    // s halves, then falls to an eighth per doubling: order 1, then 3.
    const shape = [-1, 1, -1, 1];
    const cells = [
      [100, 8],
      [200, 4],
      [400, 0.5],
    ].map(([n = 1, size = 1]) => makeCell({ n, estimates: shape.map((x) => 1 + x * size) }));
    const [series] = seriesOf(toCells(cells, context));
    const spread = series === undefined ? null : spreadOf(series, false);
    const unit = Math.sqrt(4 / 3);
    expect(spread?.at(200)?.value).toBeCloseTo(4 * unit, 12);
    expect(spread?.at(100 * Math.SQRT2)?.value).toBeCloseTo(4 * Math.SQRT2 * unit, 10);
    expect(spread?.reach(4 * unit)?.value).toBeCloseTo(200, 8);
    // Slope over the three sizes: -2.
    expect(spread?.at(800)?.value).toBeCloseTo(0.125 * unit, 10);
    expect(spread?.reach(0.125 * unit)?.value).toBeCloseTo(800, 7);
  });
});

describe("a consensus", () => {
  const spreadAround = (centre: number, size: number, seed: number) => {
    const uniform = uniforms(seed);
    return Array.from({ length: 32 }, () => centre + size * (uniform() - 0.5));
  };

  it("weighs its members by their variances and stands in for the reference", () => {
    const consensus = consensusOf("q", [
      { source: "philox4x32", n: 1024, estimates: spreadAround(2, 0.1, 1) },
      { source: "sobol+owen", n: 1024, estimates: spreadAround(2, 0.001, 2) },
      { source: "lattice+shift", n: 1021, estimates: spreadAround(2, 0.01, 3) },
    ]);
    expect(consensus.agreed).toBe(true);
    expect(Math.abs((consensus.value ?? 0) - 2)).toBeLessThan(4 * (consensus.standardError ?? 0));
    expect(consensus.standardError).toBeLessThan(consensus.members[1]?.standardError ?? 0);
    const known = referencesOf([makeProblem("q", { reference: null })], [consensus]).get("q");
    expect(known).toMatchObject({
      value: consensus.value,
      uncertainty: consensus.standardError,
      basis: "consensus of philox4x32, sobol+owen, lattice+shift",
      consensus: true,
    });
  });

  it("is refused where its members contradict each other, fail or are too few", () => {
    const good = { source: "a", n: 8, estimates: spreadAround(2, 0.1, 4) };
    const far = { source: "b", n: 8, estimates: spreadAround(2.2, 0.1, 5) };
    const broken = { source: "c", n: 8, estimates: [1, NaN, 2, 3, 4] };
    for (const members of [[good, far], [good, broken], [good]]) {
      const consensus = consensusOf("q", members);
      expect(consensus).toMatchObject({ agreed: false, value: null, standardError: null });
      expect(referencesOf([makeProblem("q", { reference: null })], [consensus]).size).toBe(0);
    }
  });
});

describe("a relative tolerance", () => {
  const relative = (to: string, constants = {}) =>
    makeProblem("p", { constants, tolerance: { absolute: null, relative: 0.01, to, confidence: 0.99 } });
  const reference = { value: -200, uncertainty: 0, basis: "", consensus: false };

  it("is resolved against the reference or a constant, or not at all", () => {
    expect(toleranceOf(relative("reference"), reference)).toBe(2);
    expect(toleranceOf(relative("notional", { notional: 1000 }), reference)).toBe(10);
    expect(toleranceOf(relative("reference"), undefined)).toBeNull();
    expect(toleranceOf(relative("reference"), { ...reference, value: 0 })).toBeNull();
  });
});
