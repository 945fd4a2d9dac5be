// Constructs the vectors of the built-in rank-1 lattices and writes src/sources/tables/lattice.bin (some minutes).
// Use, after a build: node tools/build-lattice-table.mjs
//
// Layout: 21 vectors of 1,000 components of 24 bits, little-endian: those for n = 2^1, ..., 2^20 points, component by
// component with weights 1/j^2, then one for all sizes 2^6, ..., 2^20 at once (src/numeric/lattice-construction.ts).
import { Buffer } from "node:buffer";
import { writeFileSync } from "node:fs";
import {
  constructEmbeddedVector,
  constructVector,
  inverseSquareWeights,
} from "../dist/numeric/lattice-construction.js";

const weights = inverseSquareWeights(1000);
const vectors = [];
for (let m = 1; m <= 20; m++) vectors.push(constructVector(2 ** m, weights));
vectors.push(constructEmbeddedVector(6, 20, weights));

const table = Buffer.alloc(3 * 1000 * vectors.length);
for (const [v, vector] of vectors.entries()) {
  for (const [j, component] of vector.entries()) table.writeUIntLE(component, 3 * (1000 * v + j), 3);
}
writeFileSync(new URL("../src/sources/tables/lattice.bin", import.meta.url), table);
