/**
 * The user's own quasi-random source, as a mapping in a problem file or inline on the command line:
 *
 *     { name: house, lattice: { vector: [1, 182667, 469891] }, randomisation: shift+tent }
 *     { name: house, lattice: { weights: { product: [1, 0.5, 0.25] } }, randomisation: shift }
 *     { name: house, lattice: { weights: { order: [1, 0.1] }, dimension: 20 }, randomisation: shift }
 *     { name: house, matrices: { base: 2, rows: [[[1, 0], [0, 1]], [[0, 1], [1, 0]]] }, randomisation: owen }
 *
 * Weights give a vector that is constructed for each n asked for: one weight a coordinate, or one for each number of
 * coordinates that act together. The rows of the matrices stand coordinate by coordinate, the first digit's row first.
 */
import { Matrix } from "ml-matrix";
import { parseInteger } from "../numeric/integer-formula.js";
import { nearest } from "../numeric/nearest.js";
import type { Randomisation, Source } from "./contract.js";
import { ownLattice } from "./lattice.js";
import { LARGEST_ORDER, LARGEST_WEIGHTED, weightedLattice, type LatticeWeights } from "./weighted-lattice.js";
import { ownNet } from "./own-net.js";
import { checkRandomisations } from "./randomisations.js";
import { isSourceId } from "./registry.js";

type Mapping = Readonly<Record<string, unknown>>;

/** A source that a mapping describes, and the randomisations it asks for. */
export interface OwnQuasiRandom {
  readonly source: Source;
  readonly randomisations: readonly Randomisation[];
}

/** How each kind of mapping is read: its own key, and what stands below it. */
const kinds: Readonly<Record<string, (name: string, body: Mapping) => Source>> = {
  lattice: latticeOf,
  matrices: netOf,
};

/** The kind of quasi-random source that a mapping describes; undefined for another mapping. */
function kindOf(written: Mapping): string | undefined {
  return Object.keys(kinds).find((kind) => Object.hasOwn(written, kind));
}

export function isOwnQuasiRandom(written: Mapping): boolean {
  return kindOf(written) !== undefined;
}

/** Throws TypeError or RangeError with the key, what was found and what is allowed. */
export function parseOwnQuasiRandom(written: Mapping): OwnQuasiRandom {
  const kind = kindOf(written) ?? "";
  checkKeys("source", written, ["name", kind, "randomisation"]);
  const { name, randomisation = "" } = written;
  if (typeof name !== "string" || !/^[A-Za-z0-9][A-Za-z0-9_.-]{0,39}$/.test(name)) {
    const allowed = "1 to 40 letters, digits, dots, dashes or underscores, beginning with a letter or digit";
    throw new TypeError(`source.name: expected ${allowed}, found ${found(name)}`);
  }
  if (isSourceId(name)) {
    throw new RangeError(`source.name: expected a name that no source of the program has, found "${name}"`);
  }
  if (typeof randomisation !== "string") {
    throw new TypeError(`source.randomisation: expected a text like "shift", found ${found(randomisation)}`);
  }
  const source = kinds[kind]?.(name, mappingAt(`source.${kind}`, written[kind]));
  if (source === undefined) throw new TypeError("source: expected a mapping with a quasi-random source");
  const names = randomisation === "" ? [] : randomisation.split("+");
  return { source, randomisations: checkRandomisations(source, names) };
}

function latticeOf(name: string, body: Mapping): Source {
  checkKeys("source.lattice", body, ["vector", "weights", "dimension"]);
  const { vector, weights, dimension } = body;
  if ((vector === undefined) === (weights === undefined)) {
    throw new TypeError("source.lattice: expected either vector or weights; give one of them");
  }
  if (weights !== undefined) return weightedLattice(name, weightsOf(weights, dimension));
  if (dimension !== undefined)
    throw new TypeError("source.lattice.dimension: goes with weights.order; leave it out");
  return ownLattice(
    name,
    listAt("source.lattice.vector", vector, "a list of whole numbers").map((component, j) =>
      parseInteger(component, `source.lattice.vector[${j + 1}]`),
    ),
  );
}

function weightsOf(written: unknown, dimension: unknown): LatticeWeights {
  const body = mappingAt("source.lattice.weights", written);
  checkKeys("source.lattice.weights", body, ["product", "order"]);
  const kind = body["product"] === undefined ? "order" : "product";
  const key = `source.lattice.weights.${kind}`;
  if (body["product"] !== undefined && body["order"] !== undefined) {
    throw new TypeError("source.lattice.weights: expected product or order, found both; give one of them");
  }
  const weights = listAt(key, body[kind], "a list of numbers above 0, such as [1, 0.25]").map((weight, j) => {
    if (typeof weight === "number" && weight > 0 && Number.isFinite(weight)) return weight;
    throw new RangeError(`${key}[${j + 1}]: expected a number above 0, found ${found(weight)}`);
  });
  if (kind === "product") {
    if (dimension !== undefined) {
      throw new TypeError(
        "source.lattice.dimension: product weights have one for each coordinate; leave it out",
      );
    }
    return { kind, weights, dimension: weights.length };
  }
  if (weights.length > LARGEST_ORDER) {
    throw new RangeError(`${key}: expected at most ${LARGEST_ORDER} weights, found ${weights.length}`);
  }
  if (
    typeof dimension === "number" &&
    Number.isInteger(dimension) &&
    dimension >= 1 &&
    dimension <= LARGEST_WEIGHTED
  ) {
    return { kind, weights, dimension };
  }
  throw new RangeError(
    `source.lattice.dimension: expected a whole number from 1 to ${LARGEST_WEIGHTED}, found ${found(dimension)}`,
  );
}

function netOf(name: string, body: Mapping): Source {
  checkKeys("source.matrices", body, ["base", "rows"]);
  const { base, rows } = body;
  if (typeof base !== "number") {
    throw new TypeError(`source.matrices.base: expected a prime such as 2, found ${found(base)}`);
  }
  const matrices = listAt("source.matrices.rows", rows, "a list of matrices").map((matrix, j) => {
    const key = `source.matrices.rows[${j + 1}]`;
    const entries = listAt(key, matrix, "a matrix, a list of rows").map((row, r) => {
      const expected = base === 2 ? "a row of zeros and ones" : `a row of digits from 0 to ${base - 1}`;
      const digits = listAt(`${key}[${r + 1}]`, row, expected);
      if (digits.every((digit) => isDigit(digit, base))) return digits as number[];
      throw new RangeError(`${key}[${r + 1}]: expected ${expected}, found ${found(row)}`);
    });
    if (entries.some((row) => row.length !== entries[0]?.length)) {
      throw new RangeError(`${key}: expected rows of the same length, found ${found(matrix)}`);
    }
    return new Matrix(entries);
  });
  return ownNet(name, base, matrices);
}

function isDigit(value: unknown, base: number): boolean {
  return typeof value === "number" && Number.isInteger(value) && value >= 0 && value < base;
}

function listAt(key: string, value: unknown, expected: string): readonly unknown[] {
  if (Array.isArray(value) && value.length > 0) return value;
  throw new TypeError(`${key}: expected ${expected}, found ${found(value)}`);
}

function mappingAt(key: string, value: unknown): Mapping {
  if (typeof value === "object" && value !== null && !Array.isArray(value)) return value as Mapping;
  throw new TypeError(`${key}: expected a mapping, found ${found(value)}`);
}

function checkKeys(key: string, written: Mapping, known: readonly string[]): void {
  const unknown = Object.keys(written).find((name) => !known.includes(name));
  if (unknown === undefined) return;
  const guess = nearest(unknown, known);
  const proposal = guess === null ? "" : `, did you mean "${guess}"?`;
  throw new TypeError(`${key}: unknown key "${unknown}"${proposal}; allowed are ${known.join(", ")}`);
}

function found(value: unknown): string {
  return value === undefined ? "nothing" : JSON.stringify(value).slice(0, 60);
}
