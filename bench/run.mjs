// npm run bench: this engine against C and NumPy/SciPy on four integrands, in one run, one thread each, in turn.
// Every figure is a median over rounds; what is compared is the ratio within the run. Needs gcc and python3 with NumPy
// and SciPy, and GSL for a column more. Writes the tables to standard output and, with --write, into docs/measurements.md.
// Names of sections run these alone: npm run bench -- sources --write
import { spawn, execFileSync } from "node:child_process";
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { cpus, tmpdir } from "node:os";
import { join } from "node:path";
import { createInterface } from "node:readline";
import { fileURLToPath } from "node:url";
import { sobol } from "../dist/sources/sobol.js";
import { engineRates } from "./engine.mjs";
import { fullCycleTable } from "./full-cycle.mjs";
import { integrandTable } from "./integrands.mjs";
import { shortestVectorTable } from "./shortest-vectors.mjs";
import { quantileTable } from "./quantiles.mjs";
import { constructionTable, sourceTable } from "./sources.mjs";
import { memoryTable, studyTable, threadTable } from "./study.mjs";
import { insert, median, table } from "./table.mjs";

const ROUNDS = 7;
const root = fileURLToPath(new URL("..", import.meta.url));
const folder = mkdtempSync(join(tmpdir(), "tolerand-bench-"));

/** Points per measurement: some 100 ms for NumPy. */
const WORKLOADS = {
  peak: { title: "Gaussian peak, d = 8", dimension: 8, points: 1 << 21 },
  product: { title: "product, d = 16", dimension: 16, points: 1 << 20 },
  path: { title: "average of a geometric Brownian path, d = 64", dimension: 64, points: 1 << 17 },
  wave: { title: "oscillatory, d = 10", dimension: 10, points: 1 << 21 },
};

/** Our source and C's, and the one that NumPy or SciPy has. */
const SOURCES = [
  ["xoshiro256++", "pcg64"],
  ["mt19937", "mt19937"],
  ["sobol", "sobol"],
];

function buildPeers() {
  const source = join(root, "bench", "peer.c");
  const fast = join(folder, "peer-fast");
  const strict = join(folder, "peer-strict");
  execFileSync("gcc", ["-O3", "-march=native", "-ffast-math", "-o", fast, source, "-lm"]);
  execFileSync("gcc", ["-O3", "-march=native", "-o", strict, source, "-lm"]);
  const directions = new BigUint64Array(64 * 52);
  for (const [j, matrix] of sobol.generatingMatrices(64, 2 ** 52).matrices.entries()) {
    for (let k = 0; k < 52; k++) directions[j * 52 + k] = BigInt(`0b${matrix.getColumn(k).join("")}`);
  }
  writeFileSync(join(folder, "directions"), directions);
  return { fast, strict };
}

function runC(file, workload, source, points) {
  const args = [workload, source, String(points), join(folder, "directions")];
  const [estimate, seconds] = execFileSync(file, args, { encoding: "utf8" }).trim().split(" ").map(Number);
  return { estimate, seconds };
}

/** The NumPy/SciPy peer: one process, asked line by line. */
async function startPython() {
  const python = spawn("python3", [join(root, "bench", "peer.py")], { stdio: ["pipe", "pipe", "inherit"] });
  const lines = createInterface({ input: python.stdout })[Symbol.asyncIterator]();
  const versions = (await lines.next()).value;
  return {
    versions,
    async ask(...words) {
      python.stdin.write(`${words.join(" ")}\n`);
      const [estimate, seconds] = (await lines.next()).value.split(" ").map(Number);
      return { estimate, seconds };
    },
    close: () => python.stdin.end(),
  };
}

async function workloadTable(peers, python) {
  const rows = [];
  for (const [name, { title, points }] of Object.entries(WORKLOADS)) {
    for (const [ours, numpys] of SOURCES) {
      const engine = await engineRates(name, ours);
      const rounds = [];
      for (let round = 0; round < ROUNDS; round++) {
        const own = engine.measure(points);
        const fast = runC(peers.fast, name, ours, points);
        const strict = runC(peers.strict, name, ours, points);
        const numpy = await python.ask(name, numpys, points);
        for (const peer of ours === "sobol" ? [fast, strict, numpy] : []) {
          const apart = Math.abs(peer.estimate - own.estimate) / Math.abs(own.estimate);
          if (!(apart < 1e-9)) throw new Error(`${name}: estimates differ by ${apart}`);
        }
        rounds.push({ ours: own, fast, strict, numpy });
      }
      const ratio = (of) => median(rounds.map(of)).toFixed(2);
      rows.push([
        title,
        ours === numpys ? ours : `${ours} (NumPy: ${numpys})`,
        (median(rounds.map((r) => r.ours.seconds / points)) * 1e9).toFixed(1),
        ratio((r) => r.numpy.seconds / r.ours.seconds),
        ratio((r) => r.ours.seconds / r.fast.seconds),
        ratio((r) => r.ours.seconds / r.strict.seconds),
      ]);
      process.stderr.write(`bench: ${rows.at(-1).join("  ")}\n`);
    }
  }
  const head = [
    "integrand",
    "points",
    "ns per point",
    "NumPy/SciPy time ÷ ours",
    "our time ÷ C -ffast-math",
    "our time ÷ C strict",
  ];
  return table(head, rows, "llrrrr");
}

const peers = buildPeers();
const python = await startPython();
try {
  const all = {
    workloads: () => workloadTable(peers, python),
    sources: () => sourceTable(python, folder, 5),
    construction: () => constructionTable(),
    quantiles: () => quantileTable(ROUNDS),
    integrands: () => integrandTable(ROUNDS, folder),
    threads: () => threadTable(ROUNDS),
    memory: () => memoryTable(),
    study: () => studyTable(),
    "full-cycle": () => fullCycleTable(ROUNDS),
    "shortest-vectors": () => shortestVectorTable(ROUNDS),
  };
  const asked = process.argv.slice(2).filter((word) => word !== "--write");
  const unknown = asked.find((name) => !Object.hasOwn(all, name));
  if (unknown !== undefined)
    throw new Error(`no section "${unknown}"; there are ${Object.keys(all).join(", ")}`);
  const sections = {};
  for (const name of asked.length === 0 ? Object.keys(all) : asked) sections[name] = await all[name]();
  const machine = `${cpus()[0].model.trim()}, ${cpus().length} processors, Node ${process.version}, NumPy and SciPy ${python.versions}`;
  for (const [name, text] of Object.entries(sections)) process.stdout.write(`\n${name}\n${text}`);
  if (process.argv.includes("--write")) {
    const file = join(root, "docs", "measurements.md");
    let page = readFileSync(file, "utf8");
    for (const [name, text] of Object.entries({ machine: `${machine}.\n`, ...sections }))
      page = insert(page, name, text);
    writeFileSync(file, page);
  }
} finally {
  python.close();
  rmSync(folder, { recursive: true });
}
