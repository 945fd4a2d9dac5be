/** Invented shares of three coordinates, for tests of charts and words. */
import type { InputShare, Sensitivity, Share } from "../../src/record/sensitivity.js";

const share = (value: number, half = 0.02): Share => ({ value, interval: [value - half, value + half] });

const unit = (label: string, first: number, alone: number, total: number): InputShare => ({
  label,
  first,
  count: 1,
  alone: share(alone),
  total: share(total),
});

export function sampleSensitivity(problem: string, output: string): Sensitivity {
  const order = (value: number) => ({ order: value, interval: [value - 0.05, value + 0.05] as const });
  return {
    problem,
    output,
    confidence: 0.95,
    reason: null,
    nets: [
      { source: "sobol+owen", base: 2, digits: 16, t: [5] },
      { source: "sobol", base: 2, digits: 16, t: [5] },
    ],
    measures: {
      source: "sobol+owen",
      points: 256,
      replicates: 16,
      evaluations: 30_000,
      mean: 1,
      variance: 4,
      varianceError: 0.01,
      units: [unit("x[1]", 0, 0.5, 0.7), unit("x[2]", 1, 0.3, 0.5), unit("x[3]", 2, -0.004, 0.001)],
      grouped: false,
      inputs: [],
      pairs: [{ i: 0, j: 1, closed: share(1), interaction: share(0.2) }],
      allPairs: share(0.2),
      allAlone: share(0.796),
      meanDimension: share(1.201),
      truncation: { atLeast: 2, atMost: 2 },
      smoothness: {
        source: "sobol+owen",
        sizes: [32, 64, 128, 256],
        replicates: 32,
        integrand: order(-0.9),
        smooth: order(-1.4),
        kinked: order(-0.92),
        jumping: order(-0.6),
      },
    },
  };
}
