// Whole studies: threads, memory against n, and the default study of 12 problems x 12 sources.
import { spawnSync } from "node:child_process";
import { mkdtempSync, readFileSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { median, table } from "./table.mjs";

const program = fileURLToPath(new URL("../dist/cli/main.js", import.meta.url));

/** Runs a study into a folder of its own; gives the seconds of the run and the peak memory of the process in MiB. */
function study(args) {
  const folder = mkdtempSync(join(tmpdir(), "tolerand-bench-"));
  try {
    const started = performance.now();
    const command = [process.execPath, program, "study", ...args, "--out", folder];
    const { stderr, status } = spawnSync("/usr/bin/time", ["-f", "peak %M", ...command], {
      encoding: "utf8",
    });
    if (status !== 0 && status !== 1) throw new Error(stderr);
    const seconds = (performance.now() - started) / 1000;
    const record = JSON.parse(readFileSync(join(folder, "record.json"), "utf8"));
    const peak = Number(/peak (\d+)/.exec(stderr)[1]) / 1024;
    return {
      seconds,
      peak,
      run: record.environment.seconds,
      cells: record.cells.length,
      digest: record.digest,
    };
  } finally {
    rmSync(folder, { recursive: true });
  }
}

/** One study on one and on two threads, in turn; the digests must agree. */
export function threadTable(rounds) {
  const args = [
    "classic/genz-gaussian-d10",
    "--sources",
    "philox4x32,pcg64,sobol+owen",
    "--sizes",
    "2^20",
    "--replicates",
    "32",
  ];
  const pairs = [];
  for (let round = 0; round < Math.min(rounds, 5); round++) {
    const one = study([...args, "--threads", "1"]);
    const two = study([...args, "--threads", "2"]);
    if (one.digest !== two.digest) throw new Error("threads change the record");
    pairs.push({ one, two });
  }
  const row = (name, of) => [name, median(pairs.map(of)).toFixed(2)];
  return table(
    ["", "figure"],
    [
      row("one thread, s", (p) => p.one.run),
      row("two threads, s", (p) => p.two.run),
      row("one ÷ two", (p) => p.one.run / p.two.run),
    ],
    "lr",
  );
}

/** Peak memory of the process while n grows by a factor of 64. */
export function memoryTable() {
  const args = [
    "classic/genz-gaussian-d10",
    "--sources",
    "philox4x32,sobol+owen",
    "--replicates",
    "4",
    "--threads",
    "1",
  ];
  const rows = ["2^14", "2^17", "2^20"].map((size) => [
    size,
    study([...args, "--sizes", size]).peak.toFixed(0),
  ]);
  return table(["points per replicate", "peak memory, MiB"], rows, "rr");
}

const SOURCES =
  "philox4x32,pcg64,mt19937,xoshiro256++,randu,minstd-16807,minstd-48271,sobol+owen,sobol+linear,sobol+digital-shift,halton+permuted,lattice+shift";

/** 12 Genz problems (d = 5 and 10) x 12 sources x 32 replicates up to 2^16 points, two threads, report included. */
export function studyTable() {
  const families = ["oscillatory", "product-peak", "corner-peak", "gaussian", "continuous", "discontinuous"];
  const problems = families.flatMap((family) => [`classic/genz-${family}-d5`, `classic/genz-${family}-d10`]);
  const { seconds, run, cells } = study([
    ...problems,
    "--sources",
    SOURCES,
    "--sizes",
    "2^8..2^16",
    "--threads",
    "2",
  ]);
  return table(
    ["", "figure"],
    [
      ["cells", cells],
      ["run, s", run.toFixed(1)],
      ["with start and report, s", seconds.toFixed(1)],
    ],
    "lr",
  );
}
