/** Histograms of h.u for the vector at fault: over the points of a source, beside those of a sound one. */
import { instantiateKernels } from "../kernels/instance.js";
import type { Alias, PlaneComb } from "../record/explanation.js";
import { parseSource, type SourceChoice } from "../sources/choice.js";
import { makeKey } from "../sources/key.js";
import type { BinOf } from "./alias-estimate.js";

const BINS = 48;
const POINTS = 2 ** 14;
const BLOCK = 512;
/** A source whose points are held to be independent. */
const SOUND = "philox4x32";

export interface CombRequest {
  readonly choice: SourceChoice;
  readonly problem: string;
  readonly dimension: number;
  /** Points of a source that is built for one size. */
  readonly n: number;
  readonly seed: number;
  readonly alias: Alias;
  /** Mean of the integrand in each of equal bins. */
  readonly profile: (bins: number, binOf: BinOf) => readonly number[];
}

export function planeComb(request: CombRequest): PlaneComb {
  const { choice, n, alias, profile } = request;
  const points = choice.source.nesting === "per-size" ? n : POINTS;
  return {
    points,
    source: histogram(choice, points, request),
    sound: histogram(parseSource(SOUND), points, request),
    soundSource: SOUND,
    profile: profile(BINS, (rows, stride, i) => binOf(alias, rows, stride, i)),
  };
}

function histogram(
  source: SourceChoice,
  points: number,
  { problem, dimension, seed, alias }: CombRequest,
): number[] {
  const kernels = instantiateKernels();
  const rowsAt = kernels.arena.allocate(BLOCK * dimension * 8);
  const key = makeKey({ seed, purpose: "explain", problem, source: source.id, replicate: 0 });
  const stream = source.open({ dimension, n: points, key: source.deterministic ? null : key }, kernels);
  const bins = zeros();
  for (let begin = 0; begin < points; begin += BLOCK) {
    const count = Math.min(BLOCK, points - begin);
    stream.fill(rowsAt, BLOCK, count);
    const rows = kernels.f64(rowsAt, BLOCK * dimension);
    for (let i = 0; i < count; i++) {
      const bin = binOf(alias, rows, BLOCK, i);
      bins[bin] = (bins[bin] ?? 0) + 1;
    }
  }
  stream.close?.();
  return bins;
}

function zeros(): number[] {
  return Array.from({ length: BINS }, () => 0);
}

/** The bin of h.u - phase, half a bin on, so that whole numbers lie in the middle of the middle one. */
function binOf({ indices, entries, phase }: Alias, rows: Float64Array, stride: number, i: number): number {
  let turns = -phase;
  indices.forEach((index, k) => (turns += (entries[k] ?? 0) * (rows[index * stride + i] ?? 0)));
  const shifted = turns + 0.5 + 0.5 / BINS;
  return Math.min(BINS - 1, Math.floor((shifted - Math.floor(shifted)) * BINS));
}
