/** The flags that `study` and `check` share: settings that come before those of problem and suite. */
import { parse } from "yaml";
import type { SourceSpec, StudySettings } from "../problem/contract.js";
import { parseSizes } from "../problem/sizes.js";
import { comparableSources, parseSource } from "../sources/choice.js";
import type { Arguments, Io } from "./command.js";
import { asInput, InputError } from "./errors.js";
import { textFlag, textFlags, textOrFile, wholeFlag } from "./read.js";

/** What the command line says of the settings. Throws InputError with the flag's name. */
export function settingsFromFlags(args: Arguments, io: Io): StudySettings {
  const settings: { -readonly [K in keyof StudySettings]: StudySettings[K] } = {};
  const sources = sourcesFromFlags(args, io);
  if (sources.length > 0) settings.sources = sources;
  const sizes = textFlag(args, "sizes");
  if (sizes !== null)
    settings.sizes = asInput(() => parseSizes(sizes.includes(",") ? sizes.split(",") : sizes));
  const replicates = wholeFlag(args, "replicates", 2);
  if (replicates !== null) settings.replicates = replicates;
  const estimators = textFlag(args, "estimators");
  if (estimators !== null) settings.estimators = list(estimators);
  const falseAlarms = textFlag(args, "false-alarms");
  if (falseAlarms !== null) settings.falseAlarms = level(falseAlarms);
  const seed = wholeFlag(args, "seed", 0);
  if (seed !== null) settings.seed = seed;
  return settings;
}

function sourcesFromFlags(args: Arguments, io: Io): SourceSpec[] {
  const ids = textFlags(args, "sources")
    .flatMap(list)
    .flatMap((id) => (id === "all" ? comparableSources() : [id]));
  const own = textFlags(args, "source").map((text) => sourceFromText(text, io));
  const specs = [...own, ...ids];
  for (const spec of specs) asInput(() => parseSource(spec));
  return specs;
}

/** A source as the command line takes it: an id, an inline mapping, or @file. */
export function sourceFromText(text: string, io: Io): SourceSpec {
  if (!text.startsWith("@") && !text.trimStart().startsWith("{")) return text;
  const content = textOrFile(text, "source", io);
  try {
    return parse(content, { maxAliasCount: 0 }) as SourceSpec;
  } catch (error) {
    const first = (error instanceof Error ? error.message : String(error)).split("\n", 1)[0] ?? "";
    throw new InputError(
      `--source: expected a mapping such as { name: house, congruential: { … } }, found "${short(text)}" (${first})`,
    );
  }
}

function short(text: string): string {
  return text.length > 60 ? `${text.slice(0, 57)}...` : text;
}

function list(text: string): string[] {
  return text
    .split(",")
    .map((part) => part.trim())
    .filter((part) => part !== "");
}

function level(text: string): number {
  const value = Number(text);
  if (!(value > 0 && value < 0.5)) {
    throw new InputError(`--false-alarms: expected a number above 0 and below 0.5, found "${text}"`);
  }
  return value;
}
