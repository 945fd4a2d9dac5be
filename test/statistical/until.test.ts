// How often a study that stops at the tolerance says "inside" and a run of its n misses the tolerance. Fixed seeds.
import { describe, expect, it } from "vitest";
import { stoppingStudies } from "./stopping.js";

const STUDIES = Number(process.env["TOLERAND_STUDIES"] ?? 300);

describe("stopping at the tolerance (99 % in all, 9 looks)", () => {
  it.each(["normal", "skewed"] as const)("keeps its confidence, errors %s", (shape) => {
    const { stopped, missed } = stoppingStudies({ shape, studies: STUDIES, replicates: 32, corrected: true });
    if (process.env["TOLERAND_STUDIES"] !== undefined)
      console.log(
        shape,
        stopped,
        missed,
        stoppingStudies({ shape, studies: STUDIES, replicates: 32, corrected: false }),
      );
    // Nearly all stop: the largest size is well inside. The share missed is a mean of known probabilities.
    expect(stopped).toBeGreaterThan(0.9 * STUDIES);
    expect(missed).toBeLessThan(0.01);
  });
});
