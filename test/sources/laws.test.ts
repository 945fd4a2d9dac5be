import { describe, test } from "vitest";
import type { SourceSpec } from "../../src/problem/contract.js";
import { parseSource } from "../../src/sources/choice.js";
import { allChoices, laws } from "./laws.js";

/** Users' own sources, one for each way of reduction and of use. */
const own: Readonly<Record<string, SourceSpec>> = {
  "2^64": congruential("2^64", "6364136223846793005", "1442695040888963407"),
  "2^61": congruential("2^61", 437799614237992725n.toString(), 0),
  "2^52 - 47, a prime": congruential("2^52 - 47", "4179081", 0),
  "2^32 - 5, by folding": congruential("2^32 - 5", 1588635695, 0),
  "3 * 2^29 + 11, by quotient": congruential("3 * 2^29 + 11", 16807, 12345),
  "2^63 - 25": congruential("2^63 - 25", 2307085864, 0),
  "2^64 - 59, with an increment": congruential("2^64 - 59", "13891176665706064842", "2^63 + 1"),
  "a tiny modulus": congruential(1021, 65, 0),
  "recursive of order 5": recursive("2^31 - 1", [107374182, 0, 0, 0, 104480]),
  "recursive of order 2, with an increment": {
    name: "house",
    recursive: { modulus: "2^64 - 59", multipliers: ["2^63 + 5", -7], increment: "2^62" },
  },
  "recursive of order 64": recursive(
    "2^32 - 5",
    Array.from({ length: 64 }, (_, k) => 7 * k + 1),
  ),
  "xorshift 32": { name: "house", xorshift: { bits: 32, shifts: [-9, 5, -14] } },
  "xorshift 64": { name: "house", xorshift: { bits: 64, shifts: [13, -7, 17] } },
  "strided 3": { ...congruential("2^31", 65539, 0), tuples: "strided 3" },
  "strided 500": { name: "house", source: "philox4x32", tuples: "strided 500" },
  "per coordinate": { name: "house", source: "mt19937", tuples: "per-coordinate" },
  "top 20 bits": { name: "house", source: "pcg64", bits: "top 20" },
  "low 8 bits": { ...congruential("2^32", 1664525, 1013904223), bits: "low 8" },
  "low 60 bits": { name: "house", source: "xoshiro256++", bits: "low 60" },
  "left endpoint": { name: "house", source: "mt19937", endpoint: "left" },
  "single precision": { name: "house", source: "pcg64", float32: true },
  "published seeds": { name: "house", source: "mt19937", seeding: "published" },
  "published seeds, per coordinate": {
    name: "house",
    source: "minstd-16807",
    tuples: "per-coordinate",
    seeding: { published: { base: 100, stride: 7 } },
  },
  "one given state": { name: "house", source: "mt19937", state: 5489 },
  "left endpoint, prime modulus": { ...congruential("2^31 - 1", 48271, 1), endpoint: "left" },
};

const lattice = { vector: [1, 182667, "2^40 + 3", 213, 7, 5, 0] };
/** Any nine columns of zeros and ones will do; the identity and a triangle keep the points apart. */
const rows = [1, 0, 1, 0, 1, 0, 1].map((triangle) =>
  Array.from({ length: 9 }, (_, r) =>
    Array.from({ length: 9 }, (__, c) => Number(r === c || (triangle && c > r))),
  ),
);
const ownQuasiRandom: Readonly<Record<string, SourceSpec>> = {
  "a lattice": { name: "house", lattice },
  "a shifted lattice": { name: "house", lattice, randomisation: "shift" },
  "a net": { name: "house", matrices: { base: 2, rows } },
  "a scrambled net": { name: "house", matrices: { base: 2, rows }, randomisation: "owen" },
  "a net in base 3": { name: "house", matrices: { base: 3, rows } },
  "a scrambled net in base 3": { name: "house", matrices: { base: 3, rows }, randomisation: "owen" },
  "a shifted and folded lattice": { name: "house", lattice, randomisation: "shift+tent" },
};

function congruential(modulus: string | number, multiplier: string | number, increment: string | number) {
  return { name: "house", congruential: { modulus, multiplier, increment } };
}

function recursive(modulus: string, multipliers: (string | number)[]) {
  return { name: "house", recursive: { modulus, multipliers } };
}

for (const choice of allChoices()) describe(choice.id, () => check(choice));
for (const [name, spec] of Object.entries({ ...own, ...ownQuasiRandom }))
  describe(`own: ${name}`, () => check(parseSource(spec)));

function check(choice: ReturnType<typeof parseSource>): void {
  for (const [name, law] of Object.entries(laws)) {
    if (law.appliesTo(choice)) test(name, () => law.holds(choice));
  }
}
