// Measures the mathematical kernels: errors against mpmath (python3 with mpmath 1.3, by measure-kernels.py) and times per
// value relative to exp. Without arguments it measures everything and writes docs/kernels.md; with names of kernels it
// prints their rows only. --samples N sets the number of arguments per kernel (100000).
//
//     node tools/build.mjs && node tools/measure-kernels.mjs
import { Buffer } from "node:buffer";
import { spawn } from "node:child_process";
import { readFileSync, writeFileSync } from "node:fs";
import { parseArgs } from "node:util";
import { format } from "prettier";
import { mapModule } from "./map-kernels.mjs";
import { ELEMENTARY_GROUPS, randomSource } from "./kernel-samples.mjs";
import { SPECIAL_GROUPS } from "./special-samples.mjs";

const GROUPS = [...ELEMENTARY_GROUPS, ...SPECIAL_GROUPS];

const { values: options, positionals } = parseArgs({
  options: { samples: { type: "string", default: "100000" } },
  allowPositionals: true,
});
const total = Number(options.samples);
const groups = GROUPS.map((group) => ({
  ...group,
  functions: group.functions.filter(({ name }) => positionals.length === 0 || positionals.includes(name)),
})).filter((group) => group.functions.length > 0);
const functions = groups.flatMap((group) => group.functions);

const bytes = readFileSync(new URL("../dist/kernels/kernels.wasm", import.meta.url));
const names = [...new Set(["exp", ...functions.map(({ name }) => name)])];
const imports = { env: { abort: () => process.exit(1) } };
const { exports } = new WebAssembly.Instance(
  new WebAssembly.Module(mapModule(bytes, names, { inline: true })),
  imports,
);
const base = exports.heapBase();
exports.memory.grow(Math.ceil((total * 24 + 65536) / 65536));

/** Largest error of one sample, as measure-kernels.py answers. */
async function worstOf(name, sample, count, seed) {
  const memory = new Float64Array(exports.memory.buffer, base, 3 * count);
  const source = randomSource(seed);
  let arity = 1;
  for (let i = 0; i < count; i++) {
    const args = [sample(source)].flat();
    arity = args.length;
    args.forEach((x, k) => (memory[k * count + i] = x));
  }
  exports[`map_${name}`](base, base + 16 * count, count);
  const python = spawn("python3", [new URL("measure-kernels.py", import.meta.url).pathname], {
    stdio: ["pipe", "pipe", "inherit"],
  });
  python.stdin.write(JSON.stringify({ name, count, arity }) + "\n");
  python.stdin.write(Buffer.from(memory.slice(0, arity * count).buffer));
  python.stdin.end(Buffer.from(memory.slice(2 * count).buffer));
  let text = "";
  for await (const chunk of python.stdout) text += chunk;
  return JSON.parse(text);
}

/** Fastest of 25 rounds in nanoseconds per value, the kernels taking turns so that all see the same machine. */
function times(intervals) {
  const count = 1024;
  const memory = new Float64Array(exports.memory.buffer, base, 3 * count);
  const best = new Map();
  for (let round = 0; round < 25; round++) {
    for (const [name, [a, b]] of intervals) {
      const source = randomSource(round);
      for (let i = 0; i < 2 * count; i++) memory[i] = source.uniform(a, b);
      const loop = exports[`map_${name}`];
      const start = performance.now();
      for (let k = 0; k < 100; k++) loop(base, base + 16 * count, count);
      const time = ((performance.now() - start) * 1e6) / (100 * count);
      best.set(name, Math.min(best.get(name) ?? Infinity, time));
    }
  }
  return best;
}

async function rowOf({ name, bound, samples, rare }) {
  const count = Math.ceil(total / samples.length / 8) * 8;
  const results = [];
  for (const [k, [label, sample]] of samples.entries()) {
    const { worst, args, got } = await worstOf(name, sample, count, 1000 + k);
    results.push({ worst: worst ?? Infinity, at: args.join(", "), label, got });
  }
  const largest = results.reduce((a, b) => (b.worst > a.worst ? b : a));
  const each = results.map(({ label, worst }) => `${label}: ${worst.toFixed(3)}`).join("; ");
  const ratio = (of) => (of.get(name) / common.get("exp")).toFixed(1);
  const slow = rare === undefined ? "–" : `${ratio(uncommon)} (${rare.join(" to ")})`;
  if (!(largest.worst <= bound)) process.exitCode = 1;
  return `| \`${name}\` | ${bound} | ${largest.worst.toFixed(3)} | ${largest.at} | ${ratio(common)} | ${slow} | ${each} |`;
}

const HEAD = [
  "| function | bound (ulp) | largest error (ulp) | at | time (exp = 1) | on the rare path | largest error by sample |",
  "|---|---|---|---|---|---|---|",
];

const catalogue = GROUPS.flatMap((group) => group.functions).filter(({ name }) => names.includes(name));
const common = times(catalogue.map(({ name, timed }) => [name, timed]));
const uncommon = times(catalogue.filter(({ rare }) => rare).map(({ name, rare }) => [name, rare]));
const sections = [];
for (const group of groups) {
  const rows = [];
  for (const kernel of group.functions) {
    rows.push(await rowOf(kernel));
    process.stderr.write(`${rows[rows.length - 1]}\n`);
  }
  const note = group.note === undefined ? "" : `${group.note}\n\n`;
  sections.push(`## ${group.title}\n\n${note}${[...HEAD, ...rows].join("\n")}\n`);
}

if (positionals.length === 0) {
  const text = `# Errors and times of the mathematical kernels

Every function of the formula language is a kernel of our own on two lanes of doubles (\`src/kernels/assembly/math/\`), so that a
result has the same bits on every machine. This page is written by

    node tools/build.mjs && node tools/measure-kernels.mjs

with ${total.toLocaleString("en-GB")} arguments per function, in equal parts from the samples named in the last column (\`tools/kernel-samples.mjs\`,
\`tools/special-samples.mjs\`; fixed seeds), against mpmath 1.3.0 at 160 bits. An error is |result − value| in units in the last place of the value (2^-1074 where the
value is subnormal); an error of 0.5 is a correctly rounded result. NaN, infinities and the sign of zero are checked
by \`test/kernels/\`. "Bound" is what we promise and test; "largest error" is what was seen, not a proof.

Times are the fastest of 25 rounds over 1,024 values in cache, four vectors in flight, kernels taking turns in one process; they
are given relative to \`exp\`, which took ${common.get("exp").toFixed(2)} ns a value in this run (Node ${process.versions.node}). The arguments come from
the interval named with the samples and avoid the rare paths (subnormals, infinities, NaN, results near the
end of the range, |x| > 8192 in \`sin\`, \`cos\`, \`tan\`), which are calls out of the compiled formula; what they cost
is in a column of its own, with the interval of its arguments.

${sections.join("\n")}`;
  writeFileSync(new URL("../docs/kernels.md", import.meta.url), await format(text, { parser: "markdown" }));
}
