// Structure of sources: t of all pairs of a net, and L2 discrepancies beside SciPy's, one thread, in turn.
import { parseSource } from "../dist/sources/choice.js";
import { sobol } from "../dist/sources/sobol.js";
import { discrepancies } from "../dist/structure/discrepancy.js";
import { netOfSource } from "../dist/structure/net.js";
import { firstPoints } from "../dist/structure/points.js";
import { pairTValues } from "../dist/structure/t-value.js";
import { median, table } from "./table.mjs";

const N = 2 ** 14;
const DIMENSION = 20;
const POINTS = "2^14 points, d = 20";

/** Our kinds and SciPy's names; it has no modified star L2. */
const KINDS = [
  ["centred", "CD"],
  ["wraparound", "WD"],
  ["mixture", "MD"],
  ["star", "L2-star"],
];

export async function structureTable(python, rounds) {
  const rows = [];
  const add = (...row) => {
    rows.push(row);
    process.stderr.write(`bench: ${row.join("  ")}\n`);
  };

  const seconds = Array.from({ length: rounds }, () => {
    const start = performance.now();
    pairTValues(netOfSource(sobol, 1000, 2 ** 16));
    return (performance.now() - start) / 1000;
  });
  add("t of all 499,500 pairs", "1,000 Sobol' dimensions, m = 16", median(seconds).toFixed(2), "–");

  const points = firstPoints(parseSource("sobol"), { dimension: DIMENSION, n: N, key: null });
  for (const [kind, method] of KINDS) {
    const own = [];
    const ratios = [];
    for (let round = 0; round < rounds; round++) {
      const start = performance.now();
      const [{ squared, root }] = discrepancies(points, [kind]);
      own.push((performance.now() - start) / 1000);
      const scipy = await python.ask("discrepancy", method, DIMENSION, N);
      const apart = Math.abs(scipy.estimate / (method === "L2-star" ? root : squared) - 1);
      // SciPy adds up 2.7e8 terms plainly; its wrap-around value is 8e-9 off the exact one
      if (!(apart < 1e-7)) throw new Error(`${kind}: differs from SciPy by ${apart}`);
      ratios.push(scipy.seconds / own.at(-1));
    }
    add(`${kind} discrepancy`, POINTS, median(own).toFixed(2), median(ratios).toFixed(1));
  }
  return table(["figure", "of", "seconds", "SciPy time ÷ ours"], rows, "llrr");
}
