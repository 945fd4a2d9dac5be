/**
 * Discrepancies of a source's first n points where they are asked for, since they cost O(n^2) (discrepancy.ts,
 * star-discrepancy.ts): by dimension, of an index set, and of single coordinates.
 */
import { makeKey } from "../../sources/key.js";
import type { SourceChoice } from "../../sources/choice.js";
import type { InspectionRequest, Part, Section } from "../contract.js";
import { discrepancies, type DiscrepancyKind } from "../discrepancy.js";
import { firstPoints, type PointSet } from "../points.js";
import { extremeDiscrepancy, starDiscrepancy, starDiscrepancyFeasible } from "../star-discrepancy.js";
import { dimensionsFor } from "./dimensions.js";
import { setText } from "./text.js";

interface L2 {
  readonly squared: number;
  readonly root: number;
}

interface Discrepancies {
  readonly dimension: number;
  readonly centred: L2;
  readonly wraparound: L2;
  readonly mixture: L2;
  readonly star: L2;
  readonly modifiedStar: L2;
  /** The exact star discrepancy (largest, not L2); null where it takes too long. */
  readonly starExact: number | null;
}

export interface DiscrepancyData {
  readonly discrepancy: {
    readonly points: number;
    /** Null where the points need none. */
    readonly seed: number | null;
    readonly byDimension: readonly Discrepancies[];
    readonly indices: (Discrepancies & { readonly indices: readonly number[] }) | null;
    /** Exact, of each coordinate alone. */
    readonly coordinates: readonly {
      readonly index: number;
      readonly star: number;
      readonly extreme: number;
    }[];
  } | null;
}

/** Points where none are asked for. */
const USUAL_POINTS = 1024;

const MOST_POINTS = 2 ** 17;

/** n^2 times the sum of the dimensions: some two minutes. */
const LARGEST_WORK = 2 ** 39;

/** Doubles that the points take in memory. */
const LARGEST_SET = 2 ** 26;

export const discrepancySection: Section<DiscrepancyData> = {
  applies: () => true,
  otherwise: () => null,
  inspect: (choice, request) => ({
    discrepancy: request.discrepancy === undefined ? null : inspectPoints(choice, request),
  }),
  show: showDiscrepancy,
};

function inspectPoints(choice: SourceChoice, request: InspectionRequest): DiscrepancyData["discrepancy"] {
  const { seed = 0, allowPrograms = false } = request.discrepancy ?? {};
  const { indices } = request;
  const n = request.points ?? choice.source.nearestSize(USUAL_POINTS);
  const dimensions = dimensionsFor(choice, request, choice.source.largestDimension);
  const total = dimensions.reduce((sum, dimension) => sum + dimension, indices?.length ?? 0);
  const reach = Math.max(dimensions.at(-1) ?? 1, 1 + Math.max(0, ...(indices ?? [])));
  if (n > MOST_POINTS || n * n * total > LARGEST_WORK || n * reach > LARGEST_SET) {
    throw new RangeError(
      `points: discrepancies of ${n} points in dimensions that add up to ${total} take too long; expected at most 2^17 points, and n^2 times that sum at most 2^39; take fewer points or dimensions`,
    );
  }
  const { source } = choice;
  const parts = { seed, purpose: "points", problem: "", source: choice.id, replicate: 0 } as const;
  const key = choice.deterministic ? null : makeKey(source.nesting === "per-size" ? { ...parts, n } : parts);
  const state = request.state === null ? {} : { state: request.state };
  const points = firstPoints(choice, { dimension: reach, n, key, allowPrograms, ...state });
  return {
    points: n,
    seed: choice.deterministic ? null : seed,
    byDimension: dimensions.map((dimension) => allOf(leading(points, dimension))),
    indices: indices === null ? null : { indices, ...allOf(chosen(points, indices)) },
    coordinates: Array.from({ length: dimensions.at(-1) ?? 1 }, (_, index) => {
      const alone = chosen(points, [index]);
      return { index, star: starDiscrepancy(alone), extreme: extremeDiscrepancy(alone) };
    }),
  };
}

function leading({ n, coordinates }: PointSet, dimension: number): PointSet {
  return { n, dimension, coordinates: coordinates.subarray(0, n * dimension) };
}

function chosen({ n, coordinates }: PointSet, indices: readonly number[]): PointSet {
  const picked = new Float64Array(n * indices.length);
  for (const [at, j] of indices.entries()) picked.set(coordinates.subarray(j * n, (j + 1) * n), at * n);
  return { n, dimension: indices.length, coordinates: picked };
}

const KINDS = [
  "centred",
  "wraparound",
  "mixture",
  "star",
  "modified-star",
] as const satisfies DiscrepancyKind[];

function allOf(points: PointSet): Discrepancies {
  const [centred, wraparound, mixture, star, modifiedStar] = discrepancies(points, KINDS).map(
    ({ squared, root }) => ({ squared, root }),
  );
  const none = { squared: NaN, root: NaN };
  return {
    dimension: points.dimension,
    centred: centred ?? none,
    wraparound: wraparound ?? none,
    mixture: mixture ?? none,
    star: star ?? none,
    modifiedStar: modifiedStar ?? none,
    starExact: starDiscrepancyFeasible(points) ? starDiscrepancy(points) : null,
  };
}

function showDiscrepancy({ discrepancy }: DiscrepancyData): Part[] {
  if (discrepancy === null) return [];
  const { points, seed, byDimension, indices, coordinates } = discrepancy;
  const [worst] = [...coordinates].sort((a, b) => b.star - a.star);
  return [
    {
      title: `Discrepancy of the first ${points} points`,
      lines: [
        ...(seed === null ? [] : [`Seed ${seed}, replicate 0, the points that "tolerand points" writes.`]),
        ...(worst === undefined
          ? []
          : [
              `Of single coordinates the worst is ${worst.index}: star discrepancy ${worst.star.toPrecision(4)}, extreme ${worst.extreme.toPrecision(4)}, both exact.`,
            ]),
      ],
      table: {
        columns: [
          { title: "coordinates", align: "right" },
          ...["centred", "wrap-around", "mixture", "star L₂", "modified star L₂", "star, exact"].map(
            (title) => ({ title, align: "right" as const }),
          ),
        ],
        rows: [
          ...byDimension.map((entry) => [String(entry.dimension), ...cells(entry)]),
          ...(indices === null ? [] : [[setText(indices.indices), ...cells(indices)]]),
        ],
      },
      notes: [
        "L₂ discrepancies, the roots of the squares (--json has both); compare them at the same number of points and coordinates only. – : too many boxes to try.",
      ],
    },
  ];
}

function cells({ centred, wraparound, mixture, star, modifiedStar, starExact }: Discrepancies): string[] {
  const roots = [centred, wraparound, mixture, star, modifiedStar].map(({ root }) => root.toPrecision(4));
  return [...roots, starExact === null ? "–" : starExact.toPrecision(4)];
}
