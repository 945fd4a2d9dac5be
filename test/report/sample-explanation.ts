/** Explanations for the report's sample record; every figure is made up. */
import type { Explanation } from "../../src/record/explanation.js";
import type { ResolutionCost } from "../../src/record/resolution.js";

const BINS = 48;

const base = { structure: { kind: "seed-averaged", modulus: "1073741824", what: "all odd states" } } as const;

/** Of the one generator with planes in the sample: explained where its bias is, known structure elsewhere. */
export function sampleExplanation(problem: string, output: string, bias: number | null): Explanation {
  const alias = {
    walsh: null,
    indices: [0, 1, 2],
    entries: [9, -6, 1],
    copies: 1,
    size: 1,
    phase: 0,
    planes: 15,
    gap: 118 ** -0.5,
  };
  const names = { problem, source: "randu", estimator: "crude", output, ...base };
  const nothing = {
    predicted: null,
    difference: null,
    explained: false,
    comb: null,
    resolution: null,
    fullCycle: null,
  };
  if (bias === null) {
    const aliases = [{ ...alias, contribution: null, standardError: null }];
    return { ...names, ...nothing, reason: "no bias was confirmed", measured: null, aliases };
  }
  const error = Math.abs(bias) / 100;
  const around = (value: number, half: number) => ({
    value,
    interval: [value - half, value + half] as const,
  });
  return {
    ...names,
    reason: null,
    predicted: {
      ...around(0.99 * bias, 2.6 * error),
      standardError: error,
      confidence: 0.99,
      pairs: 1,
      doubled: { ...around(0.99 * bias, 3 * error), pairs: 2 },
      tail: around(0, error),
      stable: true,
      origin: 0,
      source: "sobol+owen",
      points: 16384,
      replicates: 32,
    },
    measured: { ...around(bias, 2.6 * error), standardError: error, n: 32768, replicates: 256 },
    difference: around(0.01 * bias, 4 * error),
    explained: true,
    aliases: [
      { ...alias, contribution: 0.98 * bias, standardError: error },
      {
        ...alias,
        entries: [18, -12, 2],
        planes: 31,
        gap: alias.gap / 2,
        contribution: 0.01 * bias,
        standardError: error,
      },
    ],
    comb: {
      points: 16384,
      source: Array.from({ length: BINS }, (_, bin) => (bin === BINS / 2 ? 16384 : 0)),
      sound: Array.from({ length: BINS }, (_, bin) => 341 + (bin % 3)),
      soundSource: "philox4x32",
      profile: Array.from({ length: BINS }, (_, bin) => 1 + bias * Math.cos((2 * Math.PI * bin) / BINS)),
    },
    resolution: { own: 31, costs: [8, 31].map(cost) },
    fullCycle: {
      states: 2 ** 29,
      mean: 1 + bias,
      bias,
      referenceUncertainty: 0,
      deviation: 1,
      nonFinite: 0,
      offending: null,
      endpoints: 0,
    },
  };
}

function cost(bits: number): ResolutionCost {
  const paired = (bias: number) => ({
    bias,
    standardError: -bias / 50,
    interval: [1.1 * bias, 0.9 * bias] as const,
  });
  return {
    bits,
    endpoint: "middle",
    confidence: 0.99,
    ...paired(-(4 ** -bits)),
    unreachableTail: { ...paired(-(8 ** -bits)), probability: 3 * 2 ** -bits },
    points: 4096,
    replicates: 16,
    nonFinite: 0,
  };
}
