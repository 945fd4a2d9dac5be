import { describe, expect, it } from "vitest";
import {
  explanationHeadline,
  explanationLines,
  hazardText,
  modulusText,
  vectorText,
} from "../../src/findings/explanation-words.js";
import { sampleExplanation } from "../report/sample-explanation.js";

const spaced = (text: string): string => text.replaceAll("\u00a0", " ");

describe("explanations in words", () => {
  const explained = sampleExplanation("p", "mean", -0.246);

  it("name a vector by its coordinates, counted from 1", () => {
    expect(spaced(vectorText({ indices: [0, 1, 2], entries: [9, -6, 1], walsh: null }))).toBe(
      "9 u₁ − 6 u₂ + u₃",
    );
    expect(spaced(vectorText({ indices: [9, 10], entries: [-1, 16807], walsh: null }))).toBe(
      "−u₁₀ + 16,807 u₁₁",
    );
  });

  it("name a Walsh function by its index in each coordinate", () => {
    expect(vectorText({ indices: [0, 11], entries: [5, 2048], walsh: 2 })).toBe("wal(5 in x₁, 2,048 in x₁₂)");
  });

  it("say how much of the bias comes from which planes", () => {
    expect(spaced(explanationHeadline(explained))).toBe(
      // 98 % from the vector itself, 1 % from its double
      "99 % of the bias comes from 9 u₁ − 6 u₂ + u₃: 15 planes, gap 0.092.",
    );
    const [own, double] = explained.aliases;
    const other = { ...double!, indices: [1, 2, 3], entries: [2, -5, 3], planes: 9, contribution: -0.05 };
    expect(spaced(explanationHeadline({ ...explained, aliases: [own!, other] }))).toBe(
      "98 % of the bias comes from 9 u₁ − 6 u₂ + u₃: 15 planes, gap 0.092; 20 % from 2 u₂ − 5 u₃ + 3 u₄: 9 planes, gap 0.046.",
    );
  });

  it("set predicted, measured and full-cycle bias beside each other", () => {
    expect(explanationLines(explained)).toEqual([
      "measured bias −0.2460 (standard error 0.0025, 256 replicates of 32,768 points)",
      "predicted bias −0.2435 (99 % interval −0.2499 to −0.2371) from 1 pair of dual vectors, estimated with 32 × 16,384 points of sobol+owen",
      "unresolved tail 0.0000 (99 % interval −0.0025 to 0.0025) from as many again: stable",
      "bias over all 536,870,912 states −0.246 (exact average)",
      "measured less predicted −0.0025 (99 % interval −0.0123 to 0.0074): explained",
    ]);
  });

  it("do not call explained what is not", () => {
    const measured = { ...explained.measured, value: 0.1, interval: [0.09, 0.11] } as const;
    const difference = { value: 0.34, interval: [0.33, 0.35] } as const;
    const off = {
      ...explained,
      explained: false,
      difference,
      measured: { ...explained.measured!, ...measured },
    };
    expect(explanationHeadline(off)).toBe(
      "Not explained in full: measured and predicted bias differ by 0.34 (0.3300 to 0.3500).",
    );
    const predicted = { ...explained.predicted!, stable: false };
    expect(explanationHeadline({ ...off, predicted })).toContain("still moves when twice as many are taken");
    const none = { ...explained.predicted!, value: 0, interval: [-0.01, 0.01] as const };
    expect(explanationHeadline({ ...off, predicted: none })).toContain("nothing that shows beside the noise");
  });

  it("say what was predicted where no bias was found", () => {
    const quiet = { ...explained.measured!, value: 0, interval: [-0.5, 0.5] as const };
    const none = { ...explained.predicted!, value: 0, interval: [-0.012, 0.01] as const };
    const nothing = { ...explained, explained: false, measured: quiet };
    expect(explanationHeadline({ ...nothing, predicted: none })).toBe(
      "No bias is predicted and none was found: the vectors taken add less than 0.012 to this integrand.",
    );
    expect(explanationHeadline(nothing)).toBe(
      "A bias of −0.2435 is predicted, too small for this measurement to show.",
    );
  });

  it("say what known structure could still spoil", () => {
    const known = sampleExplanation("p", "mean", null);
    expect(explanationHeadline(known)).toBe("No prediction: no bias was confirmed.");
    expect(spaced(hazardText(known) ?? "")).toBe(
      "all its points lie on the 15 planes 9 u₁ − 6 u₂ + u₃ = whole number, 0.092 apart; an integrand that varies from plane to plane would be off, whatever the number of points",
    );
  });

  it("write moduli as powers of two where they are", () => {
    expect(modulusText("1073741824")).toBe("2^30");
    expect(modulusText("2147483647")).toBe("2^31 − 1");
    expect(modulusText("1000000007")).toBe("1,000,000,007");
    expect(modulusText("64")).toBe("64");
  });
});
