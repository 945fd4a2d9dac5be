/**
 * t of digital nets against values from outside: data/qmc.json (elimination over all compositions, in another program),
 * Faure's theorem (t = 0, Acta Arithmetica 41, 1982), Niederreiter's bound (sum of e_j - 1, Journal of Number Theory 30, 1988)
 * and Sobol's (sum of s_j - 1, s_j the degrees of the polynomials; USSR Computational Mathematics and Mathematical Physics 7,
 * 1967; the degrees are those of the table of Joe and Kuo).
 */
import { describe, expect, it } from "vitest";
import type { DigitalNet } from "../../src/sources/contract.js";
import { faure } from "../../src/sources/faure.js";
import { niederreiter } from "../../src/sources/niederreiter.js";
import { sobol, sobolNatural } from "../../src/sources/sobol.js";
import { netOfSource } from "../../src/structure/net.js";
import { pairTValues, tValue } from "../../src/structure/t-value.js";
import { reference } from "./qmc-data.js";

const { t_values_2d_projections, "t_values_first_2^m_points": firstPoints } = reference.sobol;

const upTo = (dimension: number): number[] => Array.from({ length: dimension }, (_, j) => j);

describe.each([sobol, sobolNatural])("t of Sobol' nets, qmc.json: $id", (source: DigitalNet) => {
  it.each(Object.entries(firstPoints))("%s", (dimensions, values) => {
    const dimension = Number(dimensions.slice("dims1..".length));
    for (const [m, t] of Object.entries(values)) {
      expect(tValue(netOfSource(source, dimension, 2 ** Number(m)), upTo(dimension)).t).toBe(t);
    }
  });

  it.each(Object.entries(t_values_2d_projections))("dimensions %s", (pair, values) => {
    const [i = NaN, j = NaN] = pair.split(",").map((index) => Number(index) - 1);
    for (const [m, t] of Object.entries(values)) {
      expect(tValue(netOfSource(source, j + 1, 2 ** Number(m)), [i, j]).t).toBe(t);
      if (j > 200) continue;
      const pairs = pairTValues(netOfSource(source, j + 1, 2 ** Number(m)));
      expect(pairs.values[(j * (j - 1)) / 2 + i]).toBe(t);
    }
  });

  it("at most the sum of s_j - 1: 0, 0, 1, 3, 5, 8, 11, 15, 19, 23", () => {
    const degrees = [1, 1, 2, 3, 3, 4, 4, 5, 5, 5];
    for (const [d] of degrees.entries()) {
      const bound = degrees.slice(0, d + 1).reduce((sum, degree) => sum + degree - 1, 0);
      expect(tValue(netOfSource(source, d + 1, 2 ** 16), upTo(d + 1)).t).toBeLessThanOrEqual(bound);
    }
  });
});

describe("theorems", () => {
  it.each([2, 3, 4, 5, 7, 11])("Faure in %i dimensions: t = 0 for the first b, b^2 and b^3 points", (d) => {
    const { base } = faure.generatingMatrices(d, 1);
    for (const m of [1, 2, 3]) {
      const net = netOfSource(faure, d, base ** m);
      expect(tValue(net, upTo(d))).toEqual({ t: 0, atLeast: 0, atMost: 0 });
      expect(pairTValues(net).counts.slice(1)).toEqual([]);
    }
  });

  it("Niederreiter in base 2: at most the sum of e_j - 1, for every prefix, all m to 18 and all pairs", () => {
    // degrees of the first irreducible polynomials over GF(2): x, x + 1, one of degree 2, two of 3, three of 4
    const degrees = [1, 1, 2, 3, 3, 4, 4, 4];
    const of = (indices: number[]): number => indices.reduce((sum, j) => sum + (degrees[j] ?? NaN) - 1, 0);
    for (let m = 1; m <= 18; m++) {
      const net = netOfSource(niederreiter, 8, 2 ** m);
      for (let d = 1; d <= 8; d++) {
        expect(tValue(net, upTo(d)).t).toBeLessThanOrEqual(of(upTo(d)));
      }
      const pairs = pairTValues(net);
      for (let j = 1; j < 8; j++) {
        for (let i = 0; i < j; i++) {
          expect(pairs.values[(j * (j - 1)) / 2 + i]).toBeLessThanOrEqual(of([i, j]));
        }
      }
    }
  });

  it("Niederreiter in base 2 reaches its bound: t = 0, 0, 1, 3, 5 (H. Niederreiter, Random Number Generation and Quasi-Monte Carlo Methods, 1992, table 4.1; from memory) for some m", () => {
    for (const [d, bound] of [0, 0, 1, 3, 5].entries()) {
      const found = Array.from(
        { length: 18 },
        (_, i) => tValue(netOfSource(niederreiter, d + 1, 2 ** (i + 1)), upTo(d + 1)).t ?? NaN,
      );
      expect(Math.max(...found)).toBe(bound);
    }
  });
});
