// Shortest vectors of the dual lattices of congruential generators modulo about 2^64 in all dimensions up to 32, beside
// fplll (Debian fplll-tools) on the same bases, the least of all rounds on both sides. fplll starts once per dimension; the
// time of a start, that of a lattice of one dimension, is taken off. Without fplll its columns are left empty.
import { execFileSync, spawnSync } from "node:child_process";
import { performance } from "node:perf_hooks";
import { KernelLattice } from "../dist/numeric/kernel-lattice.js";
import { shortestVectors } from "../dist/numeric/lattice-enumeration.js";
import { ReducedBasis } from "../dist/numeric/lattice-reduction.js";
import { dualFigures } from "../dist/structure/dual-lattice.js";
import { recurrenceTuples } from "../dist/structure/tuples.js";
import { table } from "./table.mjs";

const LARGEST = 32;
const STEPS = 2 ** 27;

const CASES = [
  ["6364136223846793005 mod 2^64", 6364136223846793005n, 2n ** 64n],
  ["2862933555777941757 mod 2^64", 2862933555777941757n, 2n ** 64n],
  ["3935559000370003845 mod 2^64", 3935559000370003845n, 2n ** 64n],
  ["437799614237992725 mod 2^61 − 1", 437799614237992725n, 2n ** 61n - 1n],
];

/** Squared lengths of all dimensions from 2, and seconds; `afresh` begins anew in each dimension, as fplll does. */
function ours(tuples, afresh) {
  const started = performance.now();
  const lengths = [];
  let [lattice, basis] = [];
  const grow = (t) => basis.append(lattice.append(tuples.vector(t - 1)));
  for (let t = 1; t <= LARGEST; t++) {
    if (t === 1 || afresh) {
      lattice = new KernelLattice(tuples.modulus, 1);
      basis = new ReducedBasis();
      for (let k = 1; k < t; k++) grow(k);
    }
    grow(t);
    if (t === 1) continue;
    const { norm, complete } = shortestVectors(basis, "squared-length", STEPS);
    if (!complete) throw new Error(`dimension ${t}: stopped at its bound`);
    lengths.push(norm);
  }
  return { lengths, seconds: (performance.now() - started) / 1000 };
}

/** All that inspect says of these dimensions, planes included. */
function wholeSeconds(tuples, largest) {
  const started = performance.now();
  const indices = Array.from({ length: largest }, (_, j) => j);
  for (const figures of dualFigures(tuples, indices)) if (!figures.complete) throw new Error("stopped");
  return (performance.now() - started) / 1000;
}

/** Rows m e_1 and e_j - v_j e_1: what fplll begins with, as we do. */
function basisText(tuples, t) {
  const rows = Array.from({ length: t }, (_, i) =>
    Array.from({ length: t }, (_, j) => {
      if (j === 0) return i === 0 ? tuples.modulus : -tuples.vector(i)[0];
      return i === j ? 1n : 0n;
    }),
  );
  return `[${rows.map((row) => `[${row.join(" ")}]`).join("\n")}]\n`;
}

function fplll(text) {
  const started = performance.now();
  const out = execFileSync("fplll", ["-a", "svp"], { input: text, encoding: "utf8" });
  const vector = out.match(/-?\d+/g).map(BigInt);
  return {
    norm: vector.reduce((sum, entry) => sum + entry * entry, 0n),
    seconds: (performance.now() - started) / 1000,
  };
}

/** Squared lengths and seconds by dimension from 2, and the seconds of a start. */
function theirs(tuples) {
  const runs = Array.from({ length: LARGEST - 1 }, (_, k) => fplll(basisText(tuples, k + 2)));
  return {
    lengths: runs.map(({ norm }) => norm),
    start: Math.min(...Array.from({ length: 5 }, () => fplll("[[1]]\n").seconds)),
    seconds: runs.map(({ seconds }) => seconds),
  };
}

/** The least of all rounds, dimension by dimension, less a start each. */
function leastOf(others) {
  const start = Math.min(...others.map((other) => other.start));
  return others[0].seconds.reduce(
    (sum, _, k) => sum + Math.min(...others.map((o) => o.seconds[k])) - start,
    0,
  );
}

export function shortestVectorTable(rounds) {
  const there = spawnSync("fplll", ["--version"]).error === undefined;
  if (!there) process.stderr.write("bench: no fplll (Debian fplll-tools); its columns stay empty\n");
  const rows = CASES.map(([title, a, m]) => {
    const tuples = recurrenceTuples({ multipliers: [a], modulus: m });
    const runs = Array.from({ length: rounds }, () => {
      const own = ours(tuples, false);
      const afresh = ours(tuples, true);
      const other = there ? theirs(tuples) : null;
      if (other !== null && other.lengths.join() !== own.lengths.join())
        throw new Error(`${title}: lengths differ`);
      return { own, afresh, other };
    });
    const own = Math.min(...runs.map((run) => run.own.seconds));
    const afresh = Math.min(...runs.map((run) => run.afresh.seconds));
    const other = there ? leastOf(runs.map((run) => run.other)) : null;
    return [
      title,
      own.toFixed(3),
      afresh.toFixed(3),
      other === null ? "–" : other.toFixed(3),
      other === null ? "–" : (own / other).toFixed(2),
      other === null ? "–" : (afresh / other).toFixed(2),
      wholeSeconds(tuples, 16).toFixed(2),
    ];
  });
  const head = [
    "generator",
    "shortest vectors, s",
    "each dimension anew, s",
    "fplll, s",
    "our time ÷ fplll",
    "anew ÷ fplll",
    "all figures to 16 dimensions, s",
  ];
  return table(head, rows, "lrrrrrr");
}
