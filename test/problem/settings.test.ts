import { expect, test } from "vitest";
import { DEFAULT_SETTINGS, DEFAULT_SIZES_TEXT } from "../../src/problem/defaults.js";
import { resolveSettings, settingValues } from "../../src/problem/settings.js";
import { parseSizes } from "../../src/problem/sizes.js";

test("nothing said: every setting is the default", () => {
  const resolved = resolveSettings({});
  expect(settingValues(resolved)).toEqual(DEFAULT_SETTINGS);
  expect(Object.values(resolved).map(({ from }) => from)).toEqual(Array(6).fill("default"));
});

test("flag before problem before suite before default, each setting on its own", () => {
  const resolved = resolveSettings({
    flags: { seed: 1 },
    problem: { seed: 2, replicates: 20, sources: ["mt19937"] },
    suite: { seed: 3, replicates: 30, sources: ["pcg64"], sizes: [64] },
  });
  expect(resolved).toEqual({
    seed: { value: 1, from: "flag" },
    replicates: { value: 20, from: "problem" },
    sources: { value: ["mt19937"], from: "problem" },
    sizes: { value: [64], from: "suite" },
    estimators: { value: ["crude"], from: "default" },
    falseAlarms: { value: 0.01, from: "default" },
  });
});

test("a value of 0 is a value", () => {
  expect(resolveSettings({ flags: { seed: 0 }, problem: { seed: 5 } }).seed).toEqual({
    value: 0,
    from: "flag",
  });
});

test("the default sizes are those that their text names", () => {
  expect(parseSizes(DEFAULT_SIZES_TEXT)).toEqual(DEFAULT_SETTINGS.sizes);
});
