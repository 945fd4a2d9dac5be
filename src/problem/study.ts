/** The `study` settings of a file, read and held against their ranges. */
import type { SourceSpec, StudySettings } from "./contract.js";
import { ESTIMATORS, LIMITS } from "./defaults.js";
import type { Path } from "./document.js";
import { show } from "./errors.js";
import type { Findings } from "./findings.js";
import { nearest } from "../numeric/nearest.js";
import { wholeFrom } from "./numbers.js";
import type { NumberReader, Range } from "./numbers.js";
import type { StudyFile } from "./schema.js";
import { parseSizes } from "./sizes.js";

const FALSE_ALARMS: Range = {
  what: "a number above 0 and below 0.5, such as 0.01",
  holds: (x) => x > 0 && x < 0.5,
};
const REPLICATES = wholeFrom(2, LIMITS.replicates);
const SEED = wholeFrom(0, Number.MAX_SAFE_INTEGER, "2^53 - 1");

/**
 * Refuses a source that does not exist by throwing a TypeError or RangeError. The registry of sources is another room's:
 * a caller that knows it hands in its parser, so that an unknown source is shown at its line.
 */
export type SourceCheck = (source: SourceSpec) => unknown;

/** Notes at `path` what `check` has against `source`. */
export function checkSource(source: SourceSpec, path: Path, check: SourceCheck, findings: Findings): void {
  try {
    check(source);
  } catch (error) {
    if (!(error instanceof RangeError || error instanceof TypeError)) throw error;
    findings.add(path, error.message.replace(/^source: /, ""));
  }
}

function checkSources(sources: readonly SourceSpec[], check: SourceCheck, findings: Findings): void {
  const seen = new Set<string>();
  for (const [i, source] of sources.entries()) {
    const path = ["study", "sources", i];
    const text = JSON.stringify(source);
    if (seen.has(text))
      findings.add(path, `expected each source once, found ${show(source)} again; remove it`);
    seen.add(text);
    checkSource(source, path, check, findings);
  }
}

/** The settings that a file gives; what it does not give is left out. */
export async function checkStudy(
  file: NonNullable<StudyFile>,
  numbers: NumberReader,
  check: SourceCheck,
  findings: Findings,
): Promise<StudySettings> {
  const path = ["study"];
  const settings: { -readonly [K in keyof StudySettings]: StudySettings[K] } = {};
  if (file.sources !== undefined) {
    checkSources(file.sources, check, findings);
    settings.sources = file.sources;
  }
  if (file.sizes !== undefined) {
    try {
      settings.sizes = parseSizes(file.sizes);
    } catch (error) {
      if (!(error instanceof RangeError)) throw error;
      findings.add([...path, "sizes"], error.message);
    }
  }
  if (file.estimators !== undefined) {
    for (const [i, estimator] of file.estimators.entries()) {
      if (ESTIMATORS.includes(estimator)) continue;
      const guess = nearest(estimator, ESTIMATORS);
      const hint = guess === null ? "" : `; did you mean "${guess}"?`;
      findings.add(
        [...path, "estimators", i],
        `expected one of ${ESTIMATORS.join(", ")}, found ${show(estimator)}${hint}`,
      );
    }
    settings.estimators = file.estimators;
  }
  const read = async (key: "replicates" | "falseAlarms" | "seed", range: Range): Promise<void> => {
    const raw = file[key];
    if (raw === undefined) return;
    const value = await numbers.read(raw, [...path, key], range);
    if (value !== null) settings[key] = value;
  };
  await read("replicates", REPLICATES);
  await read("falseAlarms", FALSE_ALARMS);
  await read("seed", SEED);
  return settings;
}
