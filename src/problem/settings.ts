/** Which setting holds: flag before problem before suite before default, and where each came from. */
import type { StudySettings } from "./contract.js";
import { DEFAULT_SETTINGS } from "./defaults.js";
import type { FullSettings } from "./defaults.js";

type Origin = "flag" | "problem" | "suite" | "default";

interface Resolved<T> {
  readonly value: T;
  readonly from: Origin;
}

export type ResolvedSettings = { readonly [K in keyof FullSettings]: Resolved<FullSettings[K]> };

export interface SettingsLayers {
  readonly flags?: StudySettings;
  readonly problem?: StudySettings;
  readonly suite?: StudySettings;
}

/** Every setting of a study with its value and its origin. */
export function resolveSettings({ flags, problem, suite }: SettingsLayers): ResolvedSettings {
  const layers: readonly [Origin, Partial<FullSettings> | undefined][] = [
    ["flag", flags],
    ["problem", problem],
    ["suite", suite],
  ];
  const resolve = <K extends keyof FullSettings>(key: K): Resolved<FullSettings[K]> => {
    for (const [from, layer] of layers) {
      const value: FullSettings[K] | undefined = layer?.[key];
      if (value !== undefined) return { value, from };
    }
    return { value: DEFAULT_SETTINGS[key], from: "default" };
  };
  return {
    sources: resolve("sources"),
    sizes: resolve("sizes"),
    replicates: resolve("replicates"),
    estimators: resolve("estimators"),
    falseAlarms: resolve("falseAlarms"),
    seed: resolve("seed"),
  };
}

/** The values alone. */
export function settingValues(resolved: ResolvedSettings): FullSettings {
  return {
    sources: resolved.sources.value,
    sizes: resolved.sizes.value,
    replicates: resolved.replicates.value,
    estimators: resolved.estimators.value,
    falseAlarms: resolved.falseAlarms.value,
    seed: resolved.seed.value,
  };
}
