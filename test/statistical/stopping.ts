/** Simulated studies that stop at the tolerance, with errors whose law is known, so that a miss has an exact probability. */
import { insidePairs } from "../../src/findings/until.js";
import type { RawCell } from "../../src/record/types.js";
import { makeCell, makeProblem, makeSource, makeSpec, normals, uniforms } from "../findings/make.js";
import { seedOf } from "./integrands.js";

const SIZES = [256, 512, 1024, 2048, 4096, 8192, 16384, 32768, 65536];
/** Reached at some 8,000 points for variance 1, so that sizes below tempt and those above are enough. */
const TOLERANCE = 0.05;
const PROBLEM = makeProblem("p", {
  tolerance: { absolute: TOLERANCE, relative: null, to: "reference", confidence: 0.99 },
});
/** Unbiased by theorem: the total is the sampling line alone, which leaves no other line to hide behind. */
const SOURCE = makeSource("s", { randomisations: ["shift"] });

export interface Stopping {
  readonly shape: "normal" | "skewed";
  readonly studies: number;
  readonly replicates: number;
  /** False: every look at the full confidence, for comparison. */
  readonly corrected: boolean;
}

/** Studies that stopped inside, and the probability that one of them stops so and a fresh run of its n misses. */
export function stoppingStudies({ shape, studies, replicates, corrected }: Stopping): {
  stopped: number;
  missed: number;
} {
  const spec = { ...makeSpec([PROBLEM]), sizes: { p: corrected ? SIZES : [1] }, until: "tolerance" } as const;
  const missProbability = freshMisses(shape);
  let [stopped, missed] = [0, 0];
  for (let study = 0; study < studies; study++) {
    const seed = seedOf(["until", shape, study]);
    const draw = drawsOf(shape, seed);
    const rawCells: RawCell[] = [];
    for (const [n, errors] of nestedErrors(draw, replicates)) {
      const estimates = errors.map((error) => 1 + error);
      rawCells.push(makeCell({ source: "s", n, estimates, withinVariances: estimates.map(() => 1) }));
      const inside = insidePairs({
        spec,
        problems: [PROBLEM],
        sources: [SOURCE],
        rawCells,
        consensus: [],
        measurements: [],
      });
      if (inside.size === 0) continue;
      stopped++;
      missed += missProbability.get(n) ?? NaN;
      break;
    }
  }
  return { stopped, missed: missed / studies };
}

/** Errors at every size, built up from size to size as those of nested points are; their variance is 1 / n. */
function* nestedErrors(draw: () => number, replicates: number): Generator<[number, number[]]> {
  const sums = new Array<number>(replicates).fill(0);
  let before = 0;
  for (const n of SIZES) {
    for (let r = 0; r < replicates; r++) sums[r] = (sums[r] ?? 0) + Math.sqrt(n - before) * draw();
    before = n;
    yield [n, sums.map((sum) => sum / n)];
  }
}

/** The chance that a fresh run of n points misses the tolerance, from 100,000 of them for each n. */
function freshMisses(shape: Stopping["shape"]): ReadonlyMap<number, number> {
  const fresh = 100_000;
  const all = nestedErrors(drawsOf(shape, seedOf(["until", "fresh", shape])), fresh);
  return new Map(
    [...all].map(([n, errors]) => [n, errors.filter((e) => Math.abs(e) > TOLERANCE).length / fresh]),
  );
}

function drawsOf(shape: Stopping["shape"], seed: number): () => number {
  return shape === "normal" ? normals(seed) : exponentials(seed);
}

/** Exponential less its mean: mean 0, variance 1, skewness 2. */
function exponentials(seed: number): () => number {
  const uniform = uniforms(seed);
  return () => -Math.log(uniform()) - 1;
}
