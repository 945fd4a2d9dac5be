/**
 * Points seen along the planes of a dual vector h: across the picture h.u, so that planes are upright lines one unit apart,
 * and upwards a direction inside the planes. Only points between some neighbouring planes are kept, as many as make a
 * picture; beside them points of a sound source, drawn alike.
 */
import { instantiateKernels } from "../kernels/instance.js";
import { parseSource, type SourceChoice } from "../sources/choice.js";
import { makeKey } from "../sources/key.js";
import type { Inspection } from "./inspection.js";

export interface Slice {
  readonly vector: readonly bigint[];
  /** Values of h.u that are shown: from, to. */
  readonly window: readonly [number, number];
  /** Across and upwards, upwards from 0 to 1 of its range. */
  readonly points: readonly (readonly [number, number])[];
  readonly sound: readonly (readonly [number, number])[];
  readonly soundSource: string;
}

const SOUND = "philox4x32";

/** Planes between which points are shown, points of a picture, and points that are looked at for them at most. */
const PLANES = 12;
const SHOWN = 500;
const LOOKED_AT = 2 ** 18;
/** With fewer a picture shows nothing. */
const FEWEST = 100;
const BLOCK = 512;

/** The shortest vector in the dimension of the worst figure. */
export function worstVector({ findings: { dual } }: Inspection): readonly bigint[] | null {
  const worst = dual?.dual.find(({ dimension }) => dimension === dual.worstFigure?.dimension);
  return worst?.vector ?? null;
}

/** Null where too few points fall between so few of the planes, as these are too many. `n` is the size of a point set. */
export function sliceOf(choice: SourceChoice, vector: readonly bigint[], n: number | null): Slice | null {
  const h = vector.map(Number);
  const [low, high] = [
    h.reduce((sum, entry) => sum + Math.min(0, entry), 0),
    h.reduce((sum, entry) => sum + Math.max(0, entry), 0),
  ];
  const width = Math.min(PLANES, high - low);
  const from = Math.floor((low + high - width) / 2);
  const window = [from, from + width] as const;
  const points = shownPoints(choice, h, window, n);
  if (points.length < FEWEST) return null;
  const sound = shownPoints(parseSource(SOUND), h, window, null).slice(0, points.length);
  return { vector, window, points, sound, soundSource: SOUND };
}

function shownPoints(
  choice: SourceChoice,
  h: readonly number[],
  [from, to]: readonly [number, number],
  n: number | null,
): (readonly [number, number])[] {
  const dimension = h.length;
  const total = n ?? LOOKED_AT;
  const kernels = instantiateKernels();
  const pointer = kernels.arena.allocate(BLOCK * dimension * 8);
  const key = makeKey({ seed: 1, purpose: "points", problem: "", source: choice.id, replicate: 0 });
  const stream = choice.open({ dimension, n: total, key: choice.deterministic ? null : key }, kernels);
  const up = inside(h);
  const [least, most] = [
    up.reduce((sum, entry) => sum + Math.min(0, entry), 0),
    up.reduce((sum, entry) => sum + Math.max(0, entry), 0),
  ];
  const shown: (readonly [number, number])[] = [];
  // the first points of a point set may lie at one end of it: it is looked at whole
  const enough = n === null ? SHOWN : Infinity;
  for (let done = 0; done < Math.min(total, LOOKED_AT) && shown.length < enough; done += BLOCK) {
    const count = Math.min(BLOCK, total - done);
    stream.fill(pointer, BLOCK, count);
    const block = kernels.f64(pointer, BLOCK * dimension);
    const along = (weights: readonly number[], i: number): number =>
      weights.reduce((sum, weight, j) => sum + weight * (block[j * BLOCK + i] as number), 0);
    for (let i = 0; i < count && shown.length < enough; i++) {
      const across = along(h, i);
      if (across < from || across > to) continue;
      shown.push([across, (along(up, i) - least) / (most - least)]);
    }
  }
  stream.close?.();
  const step = Math.max(1, shown.length / SHOWN);
  return Array.from(
    { length: Math.min(SHOWN, shown.length) },
    (_, k) => shown[Math.floor(k * step)] ?? [0, 0],
  );
}

/** A direction inside the planes: the coordinate that h weighs least, without its part along h. */
function inside(h: readonly number[]): number[] {
  const least = h.reduce((best, entry, j) => (Math.abs(entry) < Math.abs(h[best] ?? 0) ? j : best), 0);
  const square = h.reduce((sum, entry) => sum + entry * entry, 0);
  return h.map((entry, j) => (j === least ? 1 : 0) - ((h[least] ?? 0) * entry) / square);
}
