/** Invented problems, sources and raw cells for tests of findings, and a small generator of its own for estimates. */
import type { Assembly } from "../../src/findings/assemble.js";
import { CONFIRMATION_REPLICATES, type Confirmation } from "../../src/findings/bias.js";
import type { Problem } from "../../src/problem/contract.js";
import type { RawCell, RecordSource, StudySpec } from "../../src/record/types.js";

/** SplitMix64's idea on 32 bits: a Weyl sequence through a mixing function (test use only). Uniform on (0, 1). */
export function uniforms(seed: number): () => number {
  let state = seed >>> 0;
  const word = () => {
    state = (state + 0x9e3779b9) >>> 0;
    let z = state;
    z = Math.imul(z ^ (z >>> 16), 0x21f0aaad);
    z = Math.imul(z ^ (z >>> 15), 0x735a2d97);
    return (z ^ (z >>> 15)) >>> 0;
  };
  return () => (word() + 0.5 + (word() >>> 11) / 2 ** 21 - 0.5) / 2 ** 32 + 2 ** -54;
}

/** Standard normal draws by Box & Muller (1958). */
export function normals(seed: number): () => number {
  const uniform = uniforms(seed);
  let spare: number | null = null;
  return () => {
    if (spare !== null) {
      const value = spare;
      spare = null;
      return value;
    }
    const radius = Math.sqrt(-2 * Math.log(uniform()));
    const angle = 2 * Math.PI * uniform();
    spare = radius * Math.sin(angle);
    return radius * Math.cos(angle);
  };
}

export function makeProblem(id: string, changes: Partial<Problem> = {}): Problem {
  return {
    id,
    title: `Problem ${id}`,
    about: "",
    dimension: 2,
    inputs: [{ name: "u", distribution: "uniform", length: 2, first: 0 }],
    constants: {},
    integrand: "sum(u)",
    quantity: "mean",
    reference: { value: 1, text: "1", uncertainty: 0, basis: "closed form" },
    tolerance: { absolute: 0.01, relative: null, to: "reference", confidence: 0.99 },
    inUse: null,
    study: {},
    ...changes,
  };
}

export function makeSource(id: string, changes: Partial<RecordSource> = {}): RecordSource {
  return {
    id,
    title: id,
    citation: "",
    family: "pseudo-random",
    method: "counter-based",
    outputBits: 52,
    period: String(2n ** 128n),
    largestDimension: 1000,
    nesting: "sequence",
    knownStructure: null,
    deterministic: false,
    randomisations: [],
    ...changes,
  };
}

export function makeCell(changes: Partial<RawCell> = {}): RawCell {
  return {
    problem: "p",
    source: "philox4x32",
    estimator: "crude",
    output: "mean",
    n: 1024,
    dimension: 2,
    indicator: false,
    estimates: [],
    withinVariances: [],
    secondsPerPoint: 1e-8,
    nonFinite: null,
    ...changes,
  };
}

export function makeSpec(problems: readonly Problem[], falseAlarms = 0.01): StudySpec {
  return {
    problems,
    sources: {},
    sizes: {},
    replicates: {},
    estimators: {},
    falseAlarms,
    seed: 1,
  };
}

/** Estimates 1 + bias + noise n^-order z for each size, one z per replicate and size. */
export function makeSeries(
  options: {
    sizes?: readonly number[];
    replicates?: number;
    bias?: number;
    noise?: number;
    order?: number;
    seed?: number;
  } & Partial<RawCell>,
): RawCell[] {
  const {
    sizes = [256, 512, 1024, 2048, 4096],
    replicates = 32,
    bias = 0,
    noise = 1,
    order = 0.5,
    seed = 1,
  } = options;
  const { problem = "p", source = "philox4x32", secondsPerPoint = 1e-8 } = options;
  const normal = normals(seed);
  return sizes.map((n) =>
    makeCell({
      problem,
      source,
      secondsPerPoint,
      n,
      estimates: Array.from({ length: replicates }, () => 1 + bias + noise * n ** -order * normal()),
      withinVariances: Array.from({ length: replicates }, () => noise ** 2),
    }),
  );
}

/** What `assembleRecord` needs around raw cells. */
export function makeAssembly(rawCells: RawCell[], changes: Partial<Assembly> = {}): Assembly {
  const problems = changes.problems ?? [makeProblem("p")];
  return {
    spec: makeSpec(problems),
    environment: {
      program: "tolerand",
      node: "v20",
      platform: "test",
      threads: 1,
      started: "",
      finished: "",
      seconds: 0,
      command: "",
      complete: true,
    },
    problems,
    sources: [makeSource("philox4x32")],
    rawCells,
    consensus: [],
    confirmations: [],
    explanations: [],
    measurements: [],
    sensitivity: [],
    warnings: [],
    ...changes,
  };
}

/** Fresh estimates for problem "p", normal around 1 + bias. */
export function makeConfirmation(
  bias: number,
  deviation: number,
  source = "philox4x32",
  n = 4096,
): Confirmation {
  const normal = normals(99);
  const estimates = Array.from({ length: CONFIRMATION_REPLICATES }, () => 1 + bias + deviation * normal());
  return { problem: "p", source, estimator: "crude", output: "mean", n, estimates };
}
