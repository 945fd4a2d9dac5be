/** `tolerand probe SOURCE`: a problem file whose integrand resonates with the lattice of a source. */
import { relative, resolve } from "node:path";
import { writeNew } from "../../problem/template.js";
import { jsonText } from "../../record/json.js";
import { parseSource, type SourceChoice } from "../../sources/choice.js";
import { leastCosine } from "../../study/probe-sight.js";
import { peakOf, type Peak, type Ridges } from "../../structure/peak.js";
import { probeOf, type Probe } from "../../structure/probe.js";
import { EXIT, type Arguments, type Io } from "../command.js";
import { asInput, InputError } from "../errors.js";
import { messages } from "../messages.js";
import { peakText, planes, waveText } from "../probe-text.js";
import { booleanFlag, textFlag, wholeFlag } from "../read.js";
import { sourceFromText } from "../study-flags.js";

const DEFAULT_DIMENSION = 3;
/** Points of a rank-1 lattice, whose planes depend on their number. */
const DEFAULT_POINTS = 4096;
/** Starts, and points from each, at which a source is looked at. */
const STARTS = 4;
const LOOKED_AT = 512;
/** What a wave may lose where outputs are cut to few bits (structure/probe.ts). */
const LEAST_COSINE = 0.999;

export async function run(args: Arguments, io: Io): Promise<number> {
  const choice = asInput(() => parseSource(sourceFromText(String(args["source"]), io)));
  const dimension = wholeFlag(args, "dimension", 1) ?? DEFAULT_DIMENSION;
  const points = wholeFlag(args, "points", 2) ?? DEFAULT_POINTS;
  const probe = asInput(() => probeOf(choice, dimension, points));
  const seen = sizesSeen(choice, probe);
  const peak = booleanFlag(args, "peaked") ? peakOf(probe) : null;
  const written = await writeNew(
    resolve(io.cwd, textFlag(args, "out") ?? nameOf(choice, dimension, peak)),
    (_, path) => {
      const file = { probe, source: choice.spec, path: relative(io.cwd, path), sizes: seen ?? sizesOf(peak) };
      return peak === null ? waveText(file) : peakText(file, peak);
    },
  );
  const path = relative(io.cwd, written);
  if (booleanFlag(args, "json")) io.stdout.write(`${jsonText(document(path, probe, peak), 2)}\n`);
  else io.stdout.write(`${path}\n`);
  io.stderr.write(messages.probe(probe.source, planes(probe), probe.gap, expected(peak)));
  io.stderr.write(messages.next(`tolerand study ${path}`));
  return EXIT.done;
}

/**
 * Sizes at which the points of a rank-1 lattice stand on the planes, ascending; null for sources that stand on them at
 * every size. Throws where the source's own points do not.
 */
function sizesSeen(choice: SourceChoice, probe: Probe): number[] | null {
  if (probe.points === null) {
    const starts = Array.from({ length: choice.deterministic ? 1 : STARTS }, (_, replicate) => replicate);
    const least = Math.min(...starts.map((start) => leastCosine(choice, probe, LOOKED_AT, start)));
    if (!(least >= LEAST_COSINE))
      throw new InputError(messages.probeUnseen(probe.source, planes(probe), least));
    return null;
  }
  const sizes: number[] = [];
  for (let n = probe.points; n >= 2; n = Math.floor(n / 2)) {
    const size = choice.source.nearestSize(n);
    if (!sizes.includes(size) && leastCosine(choice, probe, size, 0) >= LEAST_COSINE) sizes.unshift(size);
  }
  if (sizes.length === 0) {
    const least = leastCosine(choice, probe, probe.points, 0);
    throw new InputError(messages.probeUnseen(probe.source, planes(probe), least));
  }
  return sizes;
}

/** One peak is hit by few points: it takes more of them. */
function sizesOf(peak: Peak | Ridges | null): string {
  return peak?.kind === "peak" ? "2^10..2^20" : "2^8..2^18";
}

function nameOf(choice: SourceChoice, dimension: number, peak: Peak | Ridges | null): string {
  const id = choice.id.replace(/[^\w.-]+/g, "-");
  return `probe-${id}-${dimension}${peak === null ? "" : "-peaked"}`;
}

/** Predicted error relative to the integral. */
function expected(peak: Peak | Ridges | null): number {
  return peak === null ? 1 : peak.relativeError;
}

function document(file: string, probe: Probe, peak: Peak | Ridges | null): unknown {
  const { source, dimension, vector, squaredLength, gap, phase, points } = probe;
  const { kind, modulus } = probe.set;
  return {
    file,
    source,
    dimension,
    lattice: { kind, modulus, points },
    vector: vector.map(String),
    squaredLength: String(squaredLength),
    gap,
    phase,
    integrand: peak?.kind ?? "wave",
    predictedRelativeError: expected(peak),
  };
}
