// Points alone: nanoseconds per coordinate of every source and randomisation, beside NumPy, SciPy and GSL where they have
// the method. One thread each, in turn; medians. GSL (a C program) is left out, and said, where it is not installed.
import { execFileSync } from "node:child_process";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { instantiateKernels } from "../dist/kernels/instance.js";
import { parseSource } from "../dist/sources/choice.js";
import { makeKey } from "../dist/sources/key.js";
import { acceptedRandomisations } from "../dist/sources/randomisations.js";
import { listSources } from "../dist/sources/registry.js";
import {
  constructOrderVector,
  constructVector,
  inverseSquareWeights,
} from "../dist/numeric/lattice-construction.js";
import { median, table } from "./table.mjs";

const BLOCK = 512;
const COORDINATES = 1 << 22;

/** What NumPy (a bit generator's name) or SciPy calls the same method. */
const PYTHON = {
  mt19937: "MT19937",
  pcg64: "PCG64",
  "pcg64-dxsm": "PCG64DXSM",
  philox4x64: "Philox",
  sfc64: "SFC64",
  sobol: "sobol",
  "sobol+linear": "sobol-scrambled",
  halton: "halton",
  "halton+permuted": "halton-scrambled",
};

/** What GSL calls the same method. */
const GSL = {
  randu: "rng randu",
  "minstd-16807": "rng minstd",
  "lcg-62089911": "rng fishman18",
  "lcg-69069": "rng vax",
  drand48: "rng rand48",
  "knuth-array": "rng knuthran2002",
  r250: "rng r250",
  "ranlux-3": "rng ranlux",
  "ranlux-4": "rng ranlux389",
  mt19937: "rng mt19937",
  taus88: "rng taus2",
  lfsr113: "rng taus113",
  sobol: "qrng sobol",
  niederreiter: "qrng niederreiter",
  halton: "qrng halton",
};

const root = fileURLToPath(new URL("..", import.meta.url));

/** The GSL peer, or null where it cannot be built. */
function buildGsl(folder) {
  const file = join(folder, "gsl");
  try {
    const libraries = ["-lgsl", "-lgslcblas", "-lm"];
    execFileSync("gcc", ["-O3", "-march=native", "-o", file, join(root, "bench", "gsl.c"), ...libraries], {
      stdio: "ignore",
    });
  } catch {
    process.stderr.write("bench: GSL is not installed (Debian: libgsl-dev); its column stays empty\n");
    return null;
  }
  return (what, dimension) => {
    const [kind, name] = what.split(" ");
    if (kind === "qrng" && dimension > 12) return null;
    const args =
      kind === "rng" ? [kind, name, COORDINATES] : [kind, name, dimension, COORDINATES / dimension];
    return Number(execFileSync(file, args.map(String), { encoding: "utf8" }).split(" ")[1]);
  };
}

/** Ids with each accepted randomisation alone, and plain. */
function ids() {
  return listSources().flatMap((source) => {
    const random = acceptedRandomisations(source).map((names) => [source.id, ...names].join("+"));
    return source.id === "system" || source.id === "math-random" ? [] : [...new Set([source.id, ...random])];
  });
}

/** Passes over the points of one opening: a fast source makes COORDINATES in under a millisecond, a slow one stops early. */
const PASSES = 8;
const ENOUGH = 0.2;

/** Seconds for some passes over COORDINATES coordinates; the source is opened before the clock runs. */
function fillSeconds(id, dimension) {
  const choice = parseSource(id);
  const kernels = instantiateKernels();
  const n = choice.source.nearestSize(COORDINATES / dimension);
  const parts = { seed: 1, purpose: "points", problem: "", source: choice.id, replicate: 0, n };
  const key = choice.deterministic ? null : makeKey(parts);
  const pointer = kernels.arena.allocate(BLOCK * dimension * 8);
  const blocks = Math.floor(Math.min(n, COORDINATES / dimension) / BLOCK);
  const mark = kernels.arena.mark();
  // the first pass, before the engine's compiler has done its work, does not count
  let passes = -1;
  let seconds = 0;
  while (passes < PASSES && seconds < ENOUGH) {
    const stream = choice.open({ dimension, n, key }, kernels);
    const start = performance.now();
    for (let block = 0; block < blocks; block++) stream.fill(pointer, BLOCK, BLOCK);
    if (++passes > 0) seconds += (performance.now() - start) / 1000;
    kernels.arena.release(mark);
  }
  return { seconds, coordinates: passes * blocks * BLOCK * dimension };
}

const ns = (seconds, coordinates = COORDINATES) => (seconds / coordinates) * 1e9;
const text = (value) => (value === null ? "" : value.toFixed(2));

async function row(id, dimension, python, gsl, rounds) {
  if (parseSource(id).source.largestDimension < dimension) return null;
  const samples = [];
  for (let round = 0; round < rounds; round++) {
    const { seconds, coordinates } = fillSeconds(id, dimension);
    const numpy =
      PYTHON[id] === undefined
        ? null
        : ns((await python.ask("points", PYTHON[id], dimension, COORDINATES / dimension)).seconds);
    const peer = gsl === null || GSL[id] === undefined ? null : gsl(GSL[id], dimension);
    samples.push({ ours: ns(seconds, coordinates), numpy, gsl: peer === null ? null : ns(peer) });
  }
  const ratio = (of) => (of(samples[0]) === null ? null : median(samples.map((s) => of(s) / s.ours)));
  return {
    ours: median(samples.map((s) => s.ours)),
    numpy: ratio((s) => s.numpy),
    gsl: ratio((s) => s.gsl),
  };
}

/** The table of all sources at d = 8 and d = 64. */
export async function sourceTable(python, folder, rounds) {
  const gsl = buildGsl(folder);
  const rows = [];
  for (const id of ids()) {
    const small = await row(id, 8, python, gsl, rounds);
    const large = await row(id, 64, python, gsl, rounds);
    const cells = [small, large].flatMap((r) =>
      r === null ? ["", "", ""] : [text(r.ours), text(r.numpy), text(r.gsl)],
    );
    rows.push([`\`${id}\``, cells[0], cells[3], cells[1], cells[4], cells[2], cells[5]]);
    process.stderr.write(`bench: ${rows.at(-1).join("  ")}\n`);
  }
  const peers = ["NumPy/SciPy ÷ ours, d = 8", "d = 64", "GSL ÷ ours, d = 8", "d = 64"];
  return table(["source", "ns per coordinate, d = 8", "d = 64", ...peers], rows, "lrrrrrr");
}

/** Component-by-component construction: seconds, and the memory of the process afterwards. */
export function constructionTable() {
  const weights = inverseSquareWeights(250);
  const order = Float64Array.of(1, 0.1, 0.01);
  const time = (build) => {
    const start = performance.now();
    build();
    return ((performance.now() - start) / 1000).toFixed(1);
  };
  const rows = [2 ** 17, 131_071].map((n) => [
    n.toLocaleString("en"),
    time(() => constructVector(n, weights)),
    time(() => constructOrderVector(n, 250, order)),
  ]);
  return table(["points, d = 250", "product weights, s", "order-dependent weights (3), s"], rows, "rrr");
}
