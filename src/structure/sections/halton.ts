/** Which pairs of coordinates of Halton's sequence a number of points is enough for (halton-quality.ts). */
import type { RadicalInverse, Source } from "../../sources/contract.js";
import type { SourceChoice } from "../../sources/choice.js";
import type { InspectionRequest, Part, Section } from "../contract.js";
import { haltonPairs, type HaltonPairs } from "../halton-quality.js";
import { firstPoints } from "../points.js";
import { dimensionsFor } from "./dimensions.js";
import { setText } from "./text.js";

export interface HaltonData {
  readonly halton: HaltonPairs & {
    readonly dimension: number;
    readonly points: number;
    readonly leap: number;
    readonly permuted: boolean;
    /** For each dimension: the points from which all of its pairs are usable. */
    readonly allUsableFrom: readonly { readonly dimension: number; readonly points: number }[];
  };
}

/** Points where none are asked for. */
const USUAL_POINTS = 4096;

/** Points whose correlation is looked at. */
const MOST_CORRELATED = 2 ** 14;

const WORST = 5;

export const haltonSection: Section<HaltonData> = {
  applies: ({ source }) => isRadicalInverse(source),
  otherwise: () => null,
  inspect: (choice, request) => {
    if (!isRadicalInverse(choice.source))
      throw new RangeError(`source: expected radical inverses, found "${choice.id}"`);
    return { halton: inspectHalton(choice, choice.source, request) };
  },
  show: showHalton,
};

function isRadicalInverse(source: Source): source is RadicalInverse {
  return "bases" in source;
}

function inspectHalton(
  choice: SourceChoice,
  source: RadicalInverse,
  request: InspectionRequest,
): HaltonData["halton"] {
  const n = request.points ?? USUAL_POINTS;
  const dimensions = dimensionsFor(choice, request, source.largestDimension);
  const dimension = dimensions.at(-1) ?? 1;
  const bases = source.bases(dimension);
  const permuted = choice.randomisations.includes("permuted");
  const points = permuted || n > MOST_CORRELATED ? null : firstPoints(choice, { dimension, n, key: null });
  return {
    dimension,
    points: n,
    leap: source.leap,
    permuted,
    allUsableFrom: dimensions.map((size) => {
      // the two largest bases decide
      const [second = 1, first = 1] = bases
        .slice(0, size)
        .flatMap((base) => base ?? [])
        .slice(-2);
      return { dimension: size, points: second * first };
    }),
    ...haltonPairs(bases, n, points, WORST),
  };
}

function showHalton({ halton }: HaltonData): Part[] {
  const { points, dimension, pairs, usable, usableDimension, worst, allUsableFrom, leap, permuted } = halton;
  const correlated = worst.some(({ correlation }) => correlation !== null);
  const sizes: Part = {
    title: "Halton bases",
    lines: [
      `${points} points are enough for ${usable} of ${pairs} pairs of ${dimension} coordinates${
        usable === pairs ? "" : `, and for all pairs of the first ${usableDimension}`
      }.`,
    ],
    table: {
      columns: [
        { title: "coordinates", align: "right" },
        { title: "all pairs usable from", align: "right" },
      ],
      rows: allUsableFrom.map((entry) => [String(entry.dimension), String(entry.points)]),
    },
    notes: [
      "Coordinates in the bases p and q hit each of p q boxes once in every p q points; with fewer points boxes stay empty.",
      ...(leap === 1
        ? []
        : [`Every ${leap}th point: the same p q, as no base divides ${leap}; other pairs rise in step.`]),
      ...(permuted
        ? [
            "Permuted digits: the same p q; on average over the permutations no pair rises in step, so no correlation is shown.",
          ]
        : []),
    ],
  };
  const table: Part = {
    title: "Worst pairs of bases",
    lines: [
      correlated
        ? `By the correlation of the first ${points} points.`
        : `By the points that they need${permuted ? "" : `; correlations of the first points are computed up to ${MOST_CORRELATED} points`}.`,
    ],
    table: {
      columns: [
        { title: "pair", align: "left" },
        { title: "bases", align: "left" },
        { title: "usable from", align: "right" },
        { title: "correlation", align: "right" },
      ],
      rows: worst.map(({ indices, bases, usableFrom, correlation }) => [
        setText(indices),
        bases.join(", "),
        String(usableFrom),
        correlation === null ? "–" : correlation.toFixed(3).replace("-", "−"),
      ]),
    },
    notes: [],
  };
  return worst.length === 0 ? [sizes] : [sizes, table];
}
