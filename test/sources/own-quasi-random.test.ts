import { expect, test } from "vitest";
import type { SourceSpec } from "../../src/problem/contract.js";
import { faure } from "../../src/sources/faure.js";
import { sobolNatural } from "../../src/sources/sobol.js";
import { pointsOf } from "./points.js";
import { parseSource } from "../../src/sources/choice.js";

const vector = [1, 3, "2^7 - 1"];

test("a lattice has the name given, its randomisation in the id, and any n", () => {
  const choice = parseSource({ name: "house", lattice: { vector }, randomisation: "shift+tent" });
  expect(choice.id).toBe("house+shift+tent");
  expect(choice.source.largestDimension).toBe(3);
  expect(choice.source.nearestSize(1009)).toBe(1009);
  expect(choice.deterministic).toBe(false);
  expect(parseSource({ name: "house", lattice: { vector } }).deterministic).toBe(true);
});

const identity = [
  [1, 0, 0],
  [0, 1, 0],
  [0, 0, 1],
];

const rows = [
  [
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
  ],
  [
    [1, 1, 1],
    [0, 1, 0],
    [0, 0, 1],
  ],
];

test("generating matrices give their net in natural order: the first two coordinates of Sobol's sequence", () => {
  const choice = parseSource({ name: "house", matrices: { base: 2, rows }, randomisation: "owen" });
  expect(choice.id).toBe("house+owen");
  expect(choice.source.nearestSize(100)).toBe(8);
  expect(pointsOf(choice.source, { dimension: 2, count: 8 })).toEqual(
    pointsOf(sobolNatural, { dimension: 2, count: 8 }),
  );
});

test("generating matrices in another base: Faure's first two coordinates in base 3, plain and scrambled", () => {
  const pascal = [
    [1, 1, 1],
    [0, 1, 2],
    [0, 0, 1],
  ];
  const own = { name: "house", matrices: { base: 3, rows: [identity, pascal] } };
  const { source } = parseSource(own);
  expect(source.nearestSize(100)).toBe(27);
  const plain = pointsOf(source, { dimension: 2, count: 27 });
  // Faure in three coordinates has base 3; its first two matrices are the identity and Pascal's
  expect(plain).toEqual(pointsOf(faure, { dimension: 3, count: 27 }).map((point) => point.slice(0, 2)));
  for (const randomisation of ["digital-shift", "linear", "owen"] as const) {
    const points = pointsOf(source, { dimension: 2, count: 27, randomisations: [randomisation], key: "k" });
    const boxes = points.map(([x = 0, y = 0]) => Math.floor(9 * x) * 3 + Math.floor(3 * y));
    // a net with t = 0: each of the 27 boxes of 1/9 x 1/3 holds one point
    expect(new Set(boxes).size).toBe(27);
  }
});

const refusals: [SourceSpec, string][] = [
  [
    { name: "house", lattice: { vector }, randomisation: "owen" },
    'source: "house" does not take "owen"; expected "house" or "house+shift", "house+shift+tent"',
  ],
  [
    { name: "sobol", lattice: { vector } },
    'source.name: expected a name that no source of the program has, found "sobol"',
  ],
  [
    { name: "my house", lattice: { vector } },
    'source.name: expected 1 to 40 letters, digits, dots, dashes or underscores, beginning with a letter or digit, found "my house"',
  ],
  [
    { name: "house", lattice: { vector }, tuples: "successive" },
    'source: unknown key "tuples"; allowed are name, lattice, randomisation',
  ],
  [
    { name: "house", lattice: { vektor: vector } },
    'source.lattice: unknown key "vektor", did you mean "vector"?; allowed are vector',
  ],
  [{ name: "house", lattice: [1, 2] }, "source.lattice: expected a mapping, found [1,2]"],
  [
    { name: "house", lattice: { vector: [] } },
    "source.lattice.vector: expected a list of whole numbers, found []",
  ],
  [{ name: "house", lattice: {} }, "source.lattice: expected either vector or weights; give one of them"],
  [
    { name: "house", lattice: { vector: [1, -7] } },
    "source.lattice.vector[2]: expected a whole number from 0, found -7",
  ],
  [
    { name: "house", lattice: { vector: [1, 2.5] } },
    'source.lattice.vector[2]: expected a whole number (write large ones as text, like "2^64 - 59"), found 2.5',
  ],
  [
    { name: "house", matrices: { base: 4, rows } },
    "source.matrices.base: expected a prime from 2 to 127, found 4",
  ],
  [
    { name: "house", matrices: { base: "2", rows } },
    'source.matrices.base: expected a prime such as 2, found "2"',
  ],
  [
    { name: "house", matrices: { base: 3, rows: [[[1, 3]]] } },
    "source.matrices.rows[1][1]: expected a row of digits from 0 to 2, found [1,3]",
  ],
  [
    { name: "house", matrices: { base: 2, rows: [] } },
    "source.matrices.rows: expected a list of matrices, found []",
  ],
  [
    { name: "house", matrices: { base: 2, rows: [[1, 0]] } },
    "source.matrices.rows[1][1]: expected a row of zeros and ones, found 1",
  ],
  [
    { name: "house", matrices: { base: 2, rows: [[[1, 2]]] } },
    "source.matrices.rows[1][1]: expected a row of zeros and ones, found [1,2]",
  ],
  [
    { name: "house", matrices: { base: 2, rows: [[[1, 0], [1]]] } },
    "source.matrices.rows[1]: expected rows of the same length, found [[1,0],[1]]",
  ],
  [
    { name: "house", matrices: { base: 2, rows: [[[1, 0]], [[1]]] } },
    "generating matrix: expected the same number of columns for every coordinate, 1 to 52, found 1 for coordinate 2",
  ],
  [
    { name: "house", lattice: { vector }, randomisation: ["shift"] },
    'source.randomisation: expected a text like "shift", found ["shift"]',
  ],
];

test.each(refusals)("refuses %j", (spec, message) => {
  expect(() => parseSource(spec)).toThrow(message);
});

test("a lattice is constructed for weights of one's own, product or order-dependent", () => {
  const product = parseSource({
    name: "house",
    lattice: { weights: { product: [1, 0.5, 0.1] } },
    randomisation: "shift",
  });
  expect(product.source.largestDimension).toBe(3);
  expect(product.source.nearestSize(1000)).toBe(1024);
  expect(product.source.nearestSize(1009)).toBe(1009);
  const order = parseSource({ name: "pairs", lattice: { weights: { order: [1, 0.2] }, dimension: 4 } });
  // Every component is prime to n, so each coordinate holds every multiple of 1/n once.
  const points = pointsOf(order.source, { dimension: 4, count: 64 });
  for (const j of [0, 1, 2, 3]) {
    const cells = points.map((point) => Math.round((point[j] as number) * 64)).sort((a, b) => a - b);
    expect(cells).toEqual(Array.from({ length: 64 }, (_, k) => k));
  }
});

test.each([
  [
    { vector: [1], weights: { product: [1] } },
    "source.lattice: expected either vector or weights; give one of them",
  ],
  [{ weights: { product: [1, 0] } }, "source.lattice.weights.product[2]: expected a number above 0, found 0"],
  [
    { weights: { order: [1] } },
    "source.lattice.dimension: expected a whole number from 1 to 1000, found nothing",
  ],
  [
    { weights: { product: [1] }, dimension: 3 },
    "source.lattice.dimension: product weights have one for each coordinate; leave it out",
  ],
  [{ vector: [1], dimension: 3 }, "source.lattice.dimension: goes with weights.order; leave it out"],
  [
    { weights: { product: [1], order: [1] } },
    "source.lattice.weights: expected product or order, found both; give one of them",
  ],
])("lattice %j is refused", (lattice, message) => {
  expect(() => parseSource({ name: "house", lattice })).toThrow(message);
});
