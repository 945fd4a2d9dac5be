/**
 * Faure's sequence (H. Faure, "Discrépance de suites associées à un système de numération (en dimension s)", Acta
 * Arithmetica 41, 1982, 337-351): a digital sequence in the least prime base b >= d whose generating matrix j = 0...d - 1
 * is the j-th power of Pascal's matrix, with entries binomial(c, r) j^(c-r) modulo b. Its t is 0. Natural order, the origin
 * kept.
 *
 * Good for: n a power of b, few coordinates. Bad for: many, where b^2 points and more are needed before pairs of
 * coordinates are covered. The base depends on the number of coordinates.
 */
import { Matrix } from "ml-matrix";
import { isPrime } from "../numeric/factor.js";
import { checkCapacity } from "./capacity.js";
import type { DigitalNet } from "./contract.js";
import { digitsIn, openNetB } from "./netb.js";

export const faure: DigitalNet = {
  id: "faure",
  title: "Faure sequence",
  citation:
    "H. Faure, Discrepance de suites associees a un systeme de numeration (en dimension s), Acta Arithmetica 41 (1982) 337-351",
  family: "quasi-random",
  method: "digital net",
  outputBits: 52,
  period: null,
  largestDimension: 127,
  nesting: "sequence",
  randomisations: ["digital-shift", "linear", "owen"],
  knownStructure: null,
  nearestSize: (n) => n,
  open: (request, kernels) => {
    checkCapacity(faure, request.dimension, request.n);
    const base = baseFor(request.dimension);
    return openNetB(faure, base, pascalPowers(base, request.dimension, digitsIn(base)), request, kernels);
  },
  generatingMatrices(dimension, n) {
    checkCapacity(faure, dimension, n);
    const base = baseFor(dimension);
    const digits = digitsIn(base);
    let used = 0;
    for (let power = 1; power < n && used < digits; power *= base) used++;
    const matrices = pascalPowers(base, dimension, digits).map((matrix) =>
      used === 0 ? Matrix.zeros(digits, 0) : matrix.subMatrix(0, digits - 1, 0, used - 1),
    );
    return { base, order: "natural", matrices };
  },
};

/** The least prime at or above the dimension. */
function baseFor(dimension: number): number {
  let base = Math.max(2, dimension);
  while (!isPrime(BigInt(base))) base++;
  return base;
}

function pascalPowers(base: number, dimension: number, size: number): Matrix[] {
  const binomial = Matrix.zeros(size, size);
  for (let c = 0; c < size; c++) {
    binomial.set(0, c, 1);
    for (let r = 1; r <= c; r++) {
      binomial.set(r, c, (binomial.get(r - 1, c - 1) + (r < c ? binomial.get(r, c - 1) : 0)) % base);
    }
  }
  return Array.from({ length: dimension }, (_, j) => {
    const powers = [1];
    for (let k = 1; k < size; k++) powers.push(((powers[k - 1] ?? 0) * j) % base);
    const matrix = Matrix.zeros(size, size);
    for (let c = 0; c < size; c++) {
      for (let r = 0; r <= c; r++) matrix.set(r, c, (binomial.get(r, c) * (powers[c - r] ?? 0)) % base);
    }
    return matrix;
  });
}
