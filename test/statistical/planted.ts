/** Studies with one source that is biased by a stated number of detectable units among three sound ones. */
import { CONFIRMATION_REPLICATES } from "../../src/findings/bias.js";
import { screenFamily } from "../../src/findings/family.js";
import { assembleRecord, candidatesOf } from "../../src/findings/assemble.js";
import { toCells } from "../../src/findings/cells.js";
import { makeContext } from "../../src/findings/context.js";
import { seriesOf } from "../../src/findings/series.js";
import { makeAssembly, makeCell, makeSource, makeSpec, makeProblem, normals } from "../findings/make.js";
import { seedOf } from "./integrands.js";

const SOURCES = ["biased", "sound-1", "sound-2", "sound-3"];
const REPLICATES = 32;

/**
 * How often a bias of `units` detectable biases is confirmed. The unit is the detectable bias of the family for the true
 * deviation 1 (a study only knows its own s, which scatters around it).
 */
export function powerOf(units: number, trials: number, falseAlarms: number) {
  const problems = [makeProblem("p")];
  const sources = SOURCES.map((id) => makeSource(id));
  const spec = makeSpec(problems, falseAlarms);
  const unit = unitOf(falseAlarms);
  const kinds = new Set<string>();
  let found = 0;
  for (let trial = 0; trial < trials; trial++) {
    const estimatesOf = (source: string, purpose: string, count: number) => {
      const normal = normals(seedOf([source, purpose, trial, units]));
      const shift = source === "biased" ? units * unit : 0;
      return Array.from({ length: count }, () => 1 + shift + normal());
    };
    const rawCells = SOURCES.map((source) =>
      makeCell({ source, estimates: estimatesOf(source, "study", REPLICATES) }),
    );
    const assembly = makeAssembly(rawCells, { problems, sources, spec });
    const confirmations = candidatesOf(assembly).map((test) => ({
      ...test,
      estimates: estimatesOf(test.source, "confirmation", CONFIRMATION_REPLICATES),
    }));
    const { tests } = assembleRecord({ ...assembly, confirmations });
    for (const test of tests) kinds.add(test.kind);
    if (tests.some((test) => test.source === "biased" && test.confirmed)) found++;
  }
  return { found, kinds: [...kinds] };
}

/** The detectable bias that the program states for estimates whose sample deviation is exactly 1. */
function unitOf(falseAlarms: number): number {
  const half = Math.sqrt((REPLICATES - 1) / REPLICATES);
  const estimates = Array.from({ length: REPLICATES }, (_, r) => 1 + (r % 2 === 0 ? half : -half));
  const cells = SOURCES.map((source) => makeCell({ source, estimates }));
  const sources = SOURCES.map((id) => makeSource(id));
  const context = makeContext([makeProblem("p")], sources, []);
  return (
    screenFamily(seriesOf(toCells(cells, context)), context, falseAlarms).tests[0]?.detectableBias ?? NaN
  );
}
