/** P_2, P_4, P_6 and Zaremba's index of a rank-1 lattice by dimension, and its worst pairs of coordinates (lattice-quality.ts). */
import type { RankOneLattice } from "../../sources/contract.js";
import type { SourceChoice } from "../../sources/choice.js";
import type { InspectionRequest, Part, Section } from "../contract.js";
import {
  LARGEST_LATTICE,
  pAlpha,
  pAlphaDimensions,
  rankOne,
  worstLatticePairs,
  zarembaIndex,
  type LatticePair,
} from "../lattice-quality.js";
import { isRankOne, latticeSize } from "../lattice-structure.js";
import { dimensionsFor } from "./dimensions.js";
import { setText, vectorText } from "./text.js";

interface LatticeFigures {
  /** Null where n times the dimension is too large, or P is. */
  readonly P2: number | null;
  readonly P4: number | null;
  readonly P6: number | null;
  readonly zaremba: number;
  readonly zarembaVector: readonly number[];
  /** False where the enumeration was cut short: the index is then at most this. */
  readonly zarembaComplete: boolean;
}

export interface LatticeQualityData {
  /** Null where n is beyond what can be computed. */
  readonly latticeQuality:
    readonly (LatticeFigures & { readonly dimension: number; readonly points: number })[] | null;
  readonly latticeQualityIndices: (LatticeFigures & { readonly indices: readonly number[] }) | null;
  readonly latticeWorstPairs: readonly (LatticePair & {
    /** Share of P_2 that is this pair's alone. */
    readonly P2: number | null;
  })[];
}

const WORST = 5;

export const latticeQualitySection: Section<LatticeQualityData> = {
  applies: ({ source }) => isRankOne(source),
  otherwise: () => null,
  inspect: (choice, request) => {
    if (!isRankOne(choice.source))
      throw new RangeError(`source: expected a rank-1 lattice, found "${choice.id}"`);
    return inspectLattice(choice, choice.source, request);
  },
  show: showLattice,
};

function inspectLattice(
  choice: SourceChoice,
  source: RankOneLattice,
  request: InspectionRequest,
): LatticeQualityData {
  const n = latticeSize(source, request.points);
  const dimensions = dimensionsFor(choice, request, source.largestDimension);
  if (n > LARGEST_LATTICE)
    return { latticeQuality: null, latticeQualityIndices: null, latticeWorstPairs: [] };
  const { indices } = request;
  const reach = Math.max(dimensions.at(-1) ?? 1, 1 + Math.max(0, ...(indices ?? [])));
  const vector = source.generatingVector(n, reach).map(Number);
  const longest = rankOne(n, vector.slice(0, dimensions.at(-1)));
  const feasible = pAlphaDimensions(n);
  const P = pAlpha(rankOne(n, longest.z.slice(0, feasible)));
  const indexed =
    indices === null
      ? null
      : rankOne(
          n,
          indices.map((index) => vector[index] ?? 0),
        );
  return {
    latticeQuality: dimensions.map((dimension) => ({
      dimension,
      points: n,
      ...(P[dimension - 1] ?? NONE),
      ...zarembaOf(rankOne(n, vector.slice(0, dimension))),
    })),
    latticeQualityIndices:
      indexed === null || indices === null
        ? null
        : {
            indices,
            ...((indices.length <= feasible ? pAlpha(indexed).at(-1) : undefined) ?? NONE),
            ...zarembaOf(indexed),
          },
    latticeWorstPairs: worstLatticePairs(longest, WORST).map((pair) => {
      const two = rankOne(
        n,
        pair.indices.map((index) => vector[index] ?? 0),
      );
      return { ...pair, P2: feasible >= 2 ? (pAlpha(two, true).at(-1)?.P2 ?? null) : null };
    }),
  };
}

const NONE = { P2: null, P4: null, P6: null };

function zarembaOf(
  lattice: ReturnType<typeof rankOne>,
): Pick<LatticeFigures, "zaremba" | "zarembaVector" | "zarembaComplete"> {
  const { rho, vector, complete } = zarembaIndex(lattice);
  return { zaremba: rho, zarembaVector: vector, zarembaComplete: complete };
}

function showLattice(data: LatticeQualityData): Part[] {
  const { latticeQuality: entries, latticeQualityIndices: indexed, latticeWorstPairs: pairs } = data;
  if (entries === null) {
    const line =
      "Not computed beyond 2^26 points: P and Zaremba's index. The dual lattice above is exact at any size.";
    return [{ title: "Lattice quality", lines: [line], table: null, notes: [] }];
  }
  const missing = [...entries, ...(indexed === null ? [] : [indexed])].some(({ P2 }) => P2 === null);
  const rows = [
    ...entries.map((entry) => [String(entry.dimension), ...cells(entry)]),
    ...(indexed === null ? [] : [[setText(indexed.indices), ...cells(indexed)]]),
  ];
  const quality: Part = {
    title: `Lattice quality, ${entries[0]?.points ?? 0} points`,
    lines: [],
    table: {
      columns: [
        { title: "coordinates", align: "right" },
        ...["P₂", "P₄", "P₆", "ρ"].map((title) => ({ title, align: "right" as const })),
        { title: "vector of ρ", align: "left" },
      ],
      rows,
    },
    notes: [
      "P: error for the worst periodic function with Fourier coefficients up to Π max(1, |h|)^−2, −4, −6; grows with the dimension. ρ: least Π max(1, |h|) of a dual vector (Zaremba's index); in many dimensions vectors of zeros and ones make it 1.",
      ...(missing
        ? [
            "P is left out where points times coordinates exceed 2^25, and beyond 470 coordinates, where it is no longer a double.",
          ]
        : []),
      ...(entries.some(({ zarembaComplete }) => !zarembaComplete)
        ? ["≤: the enumeration reached its bound."]
        : []),
    ],
  };
  if (pairs.length === 0) return [quality];
  const worst: Part = {
    title: "Worst pairs of the lattice",
    lines: [],
    table: {
      columns: [
        { title: "pair", align: "left" },
        { title: "ρ", align: "right" },
        { title: "P₂ of the pair", align: "right" },
        { title: "dual vector", align: "left" },
      ],
      rows: pairs.map(({ indices, rho, P2, vector }) => [
        setText(indices),
        String(rho),
        figure(P2),
        vectorText(vector.map(BigInt)),
      ]),
    },
    notes: ["Of all pairs of coordinates, counted from 0; ρ of a good pair is near n / log n."],
  };
  return [quality, worst];
}

function cells({ P2, P4, P6, zaremba, zarembaComplete, zarembaVector }: LatticeFigures): string[] {
  const vector = vectorText(zarembaVector.map(BigInt));
  return [figure(P2), figure(P4), figure(P6), `${zarembaComplete ? "" : "≤ "}${zaremba}`, vector];
}

const figure = (value: number | null): string => (value === null ? "–" : value.toPrecision(4));
