// Packs the direction numbers of Joe and Kuo (2008) from their text form into src/sources/tables/joe-kuo.bin.
// Use: node tools/pack-joe-kuo.mjs new-joe-kuo-6.21201 > src/sources/tables/joe-kuo.bin
//
// Input: lines "d s a m_1 ... m_s" for d = 2, 3, ... (comment lines begin with "#", a heading line with "d").
// Output, for r rows: the count r (32 bits, little-endian); r bytes, the steps of the sequence 2^(s-1) + a, which
// increases from row to row and starts at 0; then a bit stream, least significant bit first, of the m's: m_k is odd
// and below 2^k, so its k - 1 upper bits are stored.
import { Buffer } from "node:buffer";
import { readFileSync } from "node:fs";

const rows = readFileSync(process.argv[2], "utf8")
  .split("\n")
  .filter((line) => /^\d/.test(line))
  .map((line) => line.trim().split(/\s+/).map(Number));

const steps = [];
const bits = [];
let previous = 0;
for (const [index, [dimension, degree, a, ...m]] of rows.entries()) {
  const code = 2 ** (degree - 1) + a;
  const step = code - previous;
  if (dimension !== index + 2 || m.length !== degree || step < 1 || step > 255) {
    throw new Error(`row ${index + 1} is not as expected: ${rows[index].join(" ")}`);
  }
  steps.push(step);
  previous = code;
  for (const [k, value] of m.entries()) {
    if (value % 2 !== 1 || value >= 2 ** (k + 1)) throw new Error(`row ${index + 1}: m_${k + 1} = ${value}`);
    for (let bit = 1; bit <= k; bit++) bits.push((value >> bit) & 1);
  }
}

const stream = new Uint8Array(Math.ceil(bits.length / 8));
for (const [at, bit] of bits.entries()) stream[at >> 3] |= bit << (at & 7);
const count = Buffer.alloc(4);
count.writeUInt32LE(rows.length);
process.stdout.write(Buffer.concat([count, Buffer.from(steps), stream]));
