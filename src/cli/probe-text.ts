/** The problem files that `tolerand probe` writes. */
import { stringify } from "yaml";
import type { SourceSpec } from "../problem/contract.js";
import type { Peak, Ridges } from "../structure/peak.js";
import type { Probe } from "../structure/probe.js";

export interface ProbeFile {
  readonly probe: Probe;
  readonly source: SourceSpec;
  /** The file's name, for the commands in its head. */
  readonly path: string;
  /** Sizes at which the source shows the predicted error, as a study takes them. */
  readonly sizes: string | readonly number[];
}

/** Sources that every probe is held against: sound ones of two families. */
const SOUND: readonly SourceSpec[] = ["philox4x32", "sobol+owen"];

/** 1 + cos 2 pi (h.x - phase): exact integral 1. */
export function waveText(file: ProbeFile): string {
  const { probe } = file;
  return `${head(file, "wave")}
# Every estimate of ${probe.source} is 2 in place of 1, whatever its number of points. A sound source errs by about 0.71 / sqrt(n).

title: ${yaml(`Probe of ${probe.source} in ${probe.dimension} dimensions`)}

inputs:
  x: { distribution: uniform, length: ${probe.dimension} }

constants:
  h: [${probe.vector.join(", ")}]
  phase: ${probe.phase}

integrand: |
  1 + cos(2 * pi * (dot(h, x) - phase))

reference:
  value: 1
  basis: The mean of a cosine over whole periods is 0.

tolerance: { absolute: 0.25, confidence: 0.99 }
${study(file)}`;
}

/** Peaks between planes, with their integral as a formula of constants. */
export function peakText(file: ProbeFile, peak: Peak | Ridges): string {
  return peak.kind === "peak" ? onePeak(file, peak) : ridges(file, peak);
}

function onePeak(file: ProbeFile, peak: Peak): string {
  const { probe } = file;
  return `${head(file, "peak")}
# The peak stands half-way between two of these planes, ${short(peak.width)} wide. Over random starts ${probe.source} is off by about
# ${percent(peak.relativeError)} of the integral, whatever its number of points. A sound source errs by about ${short(Math.sqrt(peak.relativeVariance))} / sqrt(n) of it.

title: ${yaml(`Peak between two planes of ${probe.source} in ${probe.dimension} dimensions`)}

inputs:
  x: { distribution: uniform, length: ${probe.dimension} }

constants:
  centre: [${peak.centre.join(", ")}]
  width: ${peak.width}

integrand: |
  exp(-sum(((x - centre) / width) .^ 2) / 2)

reference:
  value: prod(width * sqrt(2 * pi) * (normalCdf((1 - centre) / width) - normalCdf(-centre / width)))
  basis: A product of normal densities over the cube.

tolerance: { relative: 0.15, confidence: 0.99 }
${study(file)}`;
}

function ridges(file: ProbeFile, { width, relativeError }: Ridges): string {
  const { probe } = file;
  return `${head(file, "peaks")}
# The integrand has a ridge half-way between every two of these planes (one peak would be too narrow for any run to hit).
# Every estimate of ${probe.source} is off by ${percent(relativeError)} of the integral, whatever its number of points. A sound source errs
# by about 0.64 / sqrt(n) of it.

title: ${yaml(`Ridges between the planes of ${probe.source} in ${probe.dimension} dimensions`)}

inputs:
  x: { distribution: uniform, length: ${probe.dimension} }

constants:
  h: [${probe.vector.join(", ")}]
  phase: ${probe.phase}
  width: ${width}

integrand: |
  turns = dot(h, x) - phase - 0.5
  v = turns - round(turns)
  ridge = [v - 2, v - 1, v, v + 1, v + 2] / width
  sum(exp(-ridge .^ 2 / 2))

reference:
  value: width * sqrt(2 * pi)
  basis: Gaussians repeated with period 1 integrate to what one does over the whole line.

tolerance: { relative: 0.1, confidence: 0.99 }
${study(file)}`;
}

function head({ probe, path }: ProbeFile, what: string): string {
  const { source, dimension, set, points } = probe;
  const which = points === null ? set.what : `${points.toLocaleString("en")} points, one lattice`;
  return `# A problem that finds the lattice of ${source}: a ${what} made for its planes in ${dimension} dimensions.
#   Run it:  tolerand study ${path}
#
# Its tuples (${which}) lie on the planes
#   ${planes(probe)} = ${probe.phase === 0 ? "whole number" : `whole number + ${short(probe.phase)}`},
# ${short(probe.gap)} apart: the shortest vector of the dual lattice has squared length ${probe.squaredLength}.`;
}

/** "9 x[1] - 6 x[2] + x[3]" */
export function planes({ vector }: Pick<Probe, "vector">): string {
  const terms = vector.flatMap((entry, j) => {
    if (entry === 0) return [];
    const size = Math.abs(entry) === 1 ? "" : `${Math.abs(entry)} `;
    return [{ sign: entry < 0 ? "-" : "+", text: `${size}x[${j + 1}]` }];
  });
  return terms
    .map(({ sign, text }, k) => (k === 0 ? `${sign === "-" ? "-" : ""}${text}` : `${sign} ${text}`))
    .join(" ");
}

function study({ source, sizes }: ProbeFile): string {
  const sources = [source, ...SOUND].map((one) => `\n    - ${inline(one)}`).join("");
  const list = typeof sizes === "string" ? sizes : `[${sizes.join(", ")}]`;
  return `
study:
  sources:${sources}
  sizes: ${list}
`;
}

/** A value on one line. */
function inline(value: unknown): string {
  return stringify(value, { collectionStyle: "flow", lineWidth: 0 }).trim();
}

function yaml(text: string): string {
  return inline(text);
}

function short(value: number): string {
  return String(Number(value.toPrecision(4)));
}

function percent(share: number): string {
  return `${short(100 * share)} %`;
}
