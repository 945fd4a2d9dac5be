/**
 * A made-up record for the report's tests: figures follow simple laws (bias + c n^p with a fixed pseudo-random ripple),
 * not a run. It holds what a report must cope with: every family, a deterministic source, an undecided and a confirmed
 * case, exact zeros, non-finite cells, a missing reference, what is in use, and texts that try to be markup.
 */
import { sampleSensitivity } from "./sample-sensitivity.js";
import { sampleExplanation } from "./sample-explanation.js";
import type { Family } from "../../src/sources/contract.js";
import type { Problem } from "../../src/problem/contract.js";
import {
  RECORD_SCHEMA,
  type BiasTest,
  type Budget,
  type Cell,
  type Convergence,
  type RecordSource,
  type StudyRecord,
} from "../../src/record/types.js";

export const HOSTILE = `<script>alert("x")</script> & <img src=x onerror='alert(1)'> </script>`;

/** A ripple in (-1, 1) that depends on its parts only. */
function ripple(...parts: readonly (string | number)[]): number {
  let h = 2166136261;
  for (const c of parts.join("/")) h = Math.imul(h ^ c.charCodeAt(0), 16777619) >>> 0;
  h = Math.imul(h ^ (h >>> 15), 2246822519) >>> 0;
  return ((h ^ (h >>> 13)) >>> 0) / 2147483648 - 1;
}

interface Law {
  readonly family: Family;
  readonly order: number;
  readonly scale: number;
  /** Share of the problem's size that the source is off by on problems where it fails. */
  readonly bias: number;
  readonly deterministic?: boolean;
}

const LAWS: Record<string, Law> = {
  philox4x32: { family: "pseudo-random", order: -0.5, scale: 1, bias: 0 },
  mt19937: { family: "pseudo-random", order: -0.5, scale: 1.1, bias: 0 },
  randu: { family: "pseudo-random", order: -0.5, scale: 0.9, bias: -0.05 },
  "sobol+owen": { family: "quasi-random", order: -1.4, scale: 3, bias: 0 },
  halton: { family: "quasi-random", order: -0.9, scale: 1.5, bias: 0, deterministic: true },
  "lattice+shift+tent": { family: "quasi-random", order: -1.2, scale: 2, bias: 0 },
  "latin-hypercube": { family: "stratified", order: -0.6, scale: 0.6, bias: 0 },
  house: { family: "own", order: -0.5, scale: 1, bias: 0.02 },
};

function lawOf(id: string): Law {
  const names = Object.keys(LAWS);
  const law = LAWS[id] ?? LAWS[names[Math.abs(Math.round(ripple(id) * 1e6)) % names.length] ?? ""];
  if (law === undefined) throw new Error(`sample: no law for ${id}`);
  return law;
}

function sourceFor(id: string): RecordSource {
  const law = lawOf(id);
  return {
    id,
    title: id === "house" ? `House generator ${HOSTILE}` : `Source ${id}`,
    citation: "A. Author: A method of making points. Journal of Points 1 (1970), 1-10.",
    family: law.family,
    method: law.family === "pseudo-random" ? "congruential" : "digital net",
    outputBits: 31,
    period: law.family === "pseudo-random" ? "536870912" : null,
    largestDimension: 1111,
    nesting: "sequence",
    randomisations: id.split("+").slice(1),
    knownStructure: id === "randu" ? "all triples lie on 15 planes" : null,
    deterministic: law.deterministic ?? false,
  };
}

function problemFor(id: string, at: number): Problem {
  const hostile = at === 1;
  return {
    id,
    title: hostile
      ? `Season guarantee ${HOSTILE}`
      : (["Gaussian ridge", "", "Price floor", "Weakest link"][at] ?? `Contract ${id}`),
    about: hostile
      ? HOSTILE
      : "What the cooperative receives when mean output over 64 weeks falls below the guaranteed level.",
    dimension: 3 + at,
    inputs: [
      { name: "z", distribution: "normal", length: 2 + at, first: 0 },
      { name: "u", distribution: "uniform", length: null, first: 2 + at },
    ],
    constants: { start: 100, guaranteed: 95, weights: [0.5, 0.25, 0.25] },
    integrand: hostile
      ? "x = 1 < 2 & 3 > 1\nx"
      : "level = start * exp(cumsum(0.1 * z))\nmax(guaranteed - mean(level), 0) * u",
    quantity: "mean",
    reference:
      at === 2
        ? null
        : {
            value: 4.05174 + at,
            text: "4.05174",
            uncertainty: at === 3 ? 1e-5 : 0,
            basis: "closed form (Gaussian integral)",
          },
    tolerance: { absolute: 0.01, relative: null, to: "reference", confidence: 0.99 },
    inUse: at === 0 ? { source: "mt19937", points: 100000, secondsPerPoint: 2e-5 } : null,
    study: {},
  };
}

export interface SampleSize {
  readonly problems: number;
  readonly sources: readonly string[];
  readonly sizes: readonly number[];
}

export const SMALL: SampleSize = {
  problems: 4,
  sources: Object.keys(LAWS),
  sizes: [256, 512, 1024, 2048, 4096, 8192, 16384, 32768, 65536],
};

/** Twenty by twenty, the largest page that has a size budget. */
export const LARGE: SampleSize = {
  problems: 20,
  sources: [
    ...Object.keys(LAWS),
    ...Array.from({ length: 12 }, (_, i) => `extra-${String.fromCharCode(97 + i)}`),
  ],
  sizes: Array.from({ length: 11 }, (_, i) => 256 * 2 ** i),
};

/** Builds the record. Equal arguments give equal records. */
export function sampleRecord(size: SampleSize = SMALL): StudyRecord {
  const ids = Array.from(
    { length: size.problems },
    (_, i) => ["ridge", "guarantee", "floor", "weakest"][i] ?? `contract-${i + 1}`,
  );
  const problems = ids.map(problemFor);
  const sources = size.sources.map(sourceFor);
  const cells: Cell[] = [];
  const tests: BiasTest[] = [];
  const convergence: Convergence[] = [];
  const budgets: Budget[] = [];
  problems.forEach((problem, at) => {
    for (const source of sources) {
      const law = lawOf(source.id);
      const biased = law.bias !== 0 && at % 2 === 0;
      const exact = at === 3 && source.id === "lattice+shift+tent";
      const broken = at === 1 && source.id === "house";
      const reference = problem.reference?.value ?? 6.0519;
      const key = { problem: problem.id, source: source.id, estimator: "crude", output: "value" };
      const at0 = size.sizes.map((n): Cell => {
        const s = exact ? 0 : law.scale * n ** law.order * (1 + 0.15 * ripple(problem.id, source.id, n));
        const bias = exact ? 0 : (biased ? law.bias : 0) + (s / 5.7) * 1.5 * ripple(n, source.id, problem.id);
        const rmse = broken || law.deterministic === true ? null : Math.hypot(s, bias);
        const bar = !law.deterministic && !broken;
        return {
          ...key,
          n,
          dimension: problem.dimension,
          indicator: false,
          estimates: Array.from({ length: 4 }, (_, r) => reference + bias + s * ripple(r, n, source.id)),
          withinVariances: [1, 1, null, 1],
          secondsPerPoint: 1e-7 * (1 + Math.abs(ripple(source.id))),
          nonFinite: broken
            ? { count: 3, first: { replicate: 1, index: 77, inputs: [0.5, -8.1, 0.25], value: "NaN" } }
            : null,
          replicates: law.deterministic ? 1 : 32,
          reference,
          mean: broken ? null : reference + bias,
          bias: broken ? null : bias,
          biasStandardError: bar ? Math.max(s / 5.7, 1e-9) : null,
          rmse,
          rmseInterval: bar && !exact && rmse !== null ? [rmse * 0.78, rmse * 1.28] : null,
          replicateDeviation: bar ? s : null,
          integrandDeviation: 1,
          varianceAgainstCrude: bar ? s * s * n : null,
          varianceAgainstCrudeInterval: null,
          coverage: null,
          heavyTailed: source.id === "mt19937" && at === 2,
          digest: "0".repeat(64),
        };
      });
      cells.push(...at0);
      const last = at0[at0.length - 1];
      if (last === undefined) continue;
      const tested = last.biasStandardError !== null && !exact;
      tests.push({
        ...key,
        n: last.n,
        kind: tested ? "student" : "none",
        pValue: tested ? (biased ? 1e-12 : 0.4) : null,
        pValueAdjusted: tested ? (biased ? 3e-11 : 1) : null,
        detectableBias: tested ? 5 * (last.biasStandardError ?? 0) : null,
        candidate: tested && biased,
        confirmation:
          tested && biased
            ? {
                replicates: 256,
                estimates: [],
                bias: law.bias,
                standardError: (last.biasStandardError ?? 0) / 3,
                pValue: 1e-40,
              }
            : null,
        confirmed: tested && biased,
        reason: tested
          ? null
          : law.deterministic
            ? "a deterministic source has no error bar"
            : "no spread over replicates",
      });
      const reach = (0.0039 / law.scale) ** (1 / law.order);
      const known = !biased && !broken && !exact;
      convergence.push({
        ...key,
        order:
          broken || exact
            ? null
            : biased
              ? -0.2 + 0.05 * ripple(source.id, at)
              : law.order + 0.04 * ripple(source.id, at),
        orderInterval: tested && !broken ? [law.order - 0.09, (biased ? -0.1 : law.order) + 0.09] : null,
        floor: biased ? Math.abs(law.bias) : null,
        floorLower: biased ? Math.abs(law.bias) * 0.9 : null,
        reach: known
          ? { n: Math.round(reach), interval: [reach * 0.8, reach * 1.3], extrapolated: reach > 4 * last.n }
          : null,
        never: biased,
        cost: known ? reach * (last.secondsPerPoint ?? 0) : null,
      });
      const total =
        last.rmse === null || last.biasStandardError === null
          ? null
          : Math.abs(last.bias ?? 0) + 2.6 * (last.replicateDeviation ?? 0);
      const interval: [number, number] | null = total === null ? null : [total * 0.8, total * 1.3];
      const verdict =
        interval === null
          ? "none"
          : interval[1] < 0.01
            ? "within"
            : interval[0] > 0.01
              ? "outside"
              : "undecided";
      const lines = [
        {
          line: "sampling",
          kind: "random",
          value: last.replicateDeviation,
          interval: null,
          basis: "replicates",
          remedy: null,
        },
        {
          line: "source structure",
          kind: "bias",
          value: biased ? Math.abs(law.bias) * 1.05 : 0.0001,
          interval: null,
          basis: "upper limit",
          remedy: null,
        },
        { line: "reference", kind: "bias", value: 0, interval: null, basis: "exact", remedy: null },
      ] as const;
      const budget: Budget = {
        ...key,
        n: last.n,
        tolerance: 0.01,
        confidence: 0.99,
        lines,
        total,
        totalInterval: interval,
        verdict,
        headroom: total === null ? null : 0.01 - total,
        coverageFactor: 2.744,
        degrees: 31,
        largestLine: total === null ? null : biased ? "source structure" : "sampling",
        reason:
          verdict === "undecided"
            ? "the interval of the total straddles the tolerance"
            : verdict === "none"
              ? "no error bar"
              : null,
        inUse: false,
      };
      budgets.push(budget);
      if (problem.inUse?.source === source.id) {
        budgets.push({
          ...budget,
          n: 100000,
          inUse: true,
          verdict: "outside",
          total: 0.045,
          totalInterval: [0.04, 0.05],
          headroom: -0.035,
        });
      }
    }
  });
  const spec = {
    problems,
    sources: Object.fromEntries(ids.map((id) => [id, size.sources])),
    sizes: Object.fromEntries(ids.map((id) => [id, size.sizes])),
    replicates: Object.fromEntries(ids.map((id) => [id, 32])),
    estimators: Object.fromEntries(ids.map((id) => [id, ["crude"]])),
    falseAlarms: 0.01,
    seed: 20260401,
  };
  return {
    schema: RECORD_SCHEMA,
    spec,
    specDigest: "ab".repeat(32),
    digest: "cd".repeat(32),
    environment: {
      program: "0.1.0",
      node: "v24.0.0",
      platform: "linux x64",
      threads: 2,
      started: "2026-04-01T08:00:00.000Z",
      finished: "2026-04-01T08:00:42.000Z",
      seconds: 42,
      command: `tolerand study tour --seed 20260401 --name '${HOSTILE}'`,
      complete: true,
    },
    problems,
    sources,
    consensus: ids.flatMap((id, at) =>
      at === 2
        ? [
            {
              problem: id,
              value: 6.0519,
              standardError: 0.0003,
              members: ["philox4x32", "sobol+owen", "lattice+shift+tent"].map((source) => ({
                source,
                n: 65536,
                mean: 6.0519,
                standardError: 0.0005,
              })),
              q: 1.2,
              pValue: 0.55,
              agreed: true,
            },
          ]
        : [],
    ),
    cells,
    tests,
    spreadTests: [],
    measurements: [],
    sensitivity: (size.problems > 10 ? ids : ids.slice(0, 1)).map((id) => sampleSensitivity(id, "value")),
    family: { tests: tests.filter((t) => t.kind !== "none").length, level: 0.01 },
    convergence,
    budgets,
    explanations: tests
      .filter(({ source }) => source === "randu")
      .map(({ problem, output, confirmation }) =>
        sampleExplanation(problem, output, confirmation?.bias ?? null),
      ),
    warnings: ["sobol: its first point lies near z = -8 in every coordinate"],
  };
}
