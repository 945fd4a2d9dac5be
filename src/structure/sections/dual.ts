/**
 * The dual lattices of a source by dimension (dual-lattice.ts says what the figures are), of all its states, of Knuth's
 * modulus, of one run and averaged over seeds where these differ (congruential-lattices.ts), and the index sets that stand
 * out. Hyperplanes: for the full modulus those of the lattice through the origin; for shifted lattices those that their
 * shift gives.
 */
import type { SourceChoice } from "../../sources/choice.js";
import type { TupleLattice } from "../congruential-lattices.js";
import type { InspectionRequest, Part, Section, Table } from "../contract.js";
import {
  dualFigure,
  dualFigures,
  DEFAULT_STEPS,
  LARGEST_DUAL_DIMENSION,
  type DualFigures,
  type Steps,
} from "../dual-lattice.js";
import {
  hasLattice,
  isRankOne,
  latticeStructure,
  whyNoLattice,
  type LatticeStructure,
} from "../lattice-structure.js";
import { worstProjections } from "../projections.js";
import { shiftedHyperplanes } from "../shifted-hyperplanes.js";
import type { Tuples } from "../tuples.js";
import { intervalText, setText, vectorText } from "./text.js";

export interface DualEntry extends DualFigures {
  /** 1/nu_t, the distance of hyperplanes of the shortest vector. */
  readonly gap: number;
}

export interface DualOfIndices extends DualEntry {
  readonly indices: readonly number[];
}

/** JSON keys of a source's dual lattices; those of other lattices than the full one are there where they differ from it. */
export interface DualData {
  readonly lattices: readonly {
    readonly kind: TupleLattice["kind"];
    readonly modulus: bigint;
    readonly copies: number;
    readonly what: string;
    readonly key: string;
  }[];
  /** Terms of the recurrence; up to this dimension tuples fill the whole cube evenly. 1 for congruential and rank-1 lattices. */
  readonly order: number;
  readonly stride: number;
  /** Of a rank-1 lattice. */
  readonly latticePoints: number | null;
  readonly dual: readonly DualEntry[];
  readonly dualKnuth?: readonly DualEntry[];
  readonly dualOrbit?: readonly DualEntry[];
  readonly dualSeedAveraged?: readonly DualEntry[];
  /** The least figure over the dimensions asked for. */
  readonly worstFigure: { readonly dimension: number; readonly figure: number } | null;
  /** The index set asked for; or, where nothing was asked and a recurrence has few terms, its own lags. */
  readonly dualIndices: DualOfIndices | null;
  readonly projectionSpan: number;
  readonly worstProjections: readonly DualOfIndices[];
  readonly latticeNotes: readonly string[];
}

const KEYS = {
  full: "dual",
  knuth: "dualKnuth",
  orbit: "dualOrbit",
  "seed-averaged": "dualSeedAveraged",
} as const;

/** Coordinates of the projections that are looked through, and how many of each number are kept. */
const PROJECTIONS = { largest: 3, keep: 3 };

/**
 * Most steps of enumeration: beyond 24 dimensions the sum of absolute values is seldom proved least anyhow, so it has a quarter
 * of a second there; and for the lattices beside the full one everywhere.
 */
const LARGE = { above: 24, absoluteSum: 2 ** 21 };

/** A recurrence of at most this many terms has an index set of its own. */
const FEW_TERMS = 4;

export const dualSection: Section<DualData> = {
  applies: hasLattice,
  otherwise: whyNoLattice,
  inspect: inspectDual,
  show: showDual,
};

function inspectDual(choice: SourceChoice, request: InspectionRequest): DualData {
  const dimensions = dimensionsOf(choice, request);
  const reach = Math.max(dimensions.at(-1) ?? 1, request.span, 1 + Math.max(0, ...(request.indices ?? [])));
  const structure = latticeStructure(choice, request.points, reach);
  const { tuples, lattices, recurrence } = structure;
  const [full, ...others] = lattices.map((lattice) => entriesOf(structure, lattice, dimensions));
  const indices = request.indices ?? ownIndices(structure, dimensions.at(-1) ?? 1);
  const order = recurrence?.words ?? recurrence?.multipliers.length ?? 1;
  return {
    lattices: lattices.map((lattice) => ({ ...lattice, key: KEYS[lattice.kind] })),
    order,
    stride: structure.stride,
    latticePoints: structure.points,
    dual: full ?? [],
    ...Object.fromEntries(others.map((entries, k) => [KEYS[lattices[k + 1]?.kind ?? "full"], entries])),
    worstFigure: worstOf((full ?? []).filter(({ dimension }) => dimension > order)),
    dualIndices: indices === null ? null : { ...withGap(dualFigure(tuples, indices)), indices },
    projectionSpan: request.span,
    worstProjections:
      order > 1 ? [] : worstProjections(tuples, { ...PROJECTIONS, span: request.span }).map(withGap),
    latticeNotes: [
      ...structure.notes,
      ...(request.dimensionsGiven && request.dimensions.some((d) => d > LARGEST_DUAL_DIMENSION)
        ? [`Dual lattices are computed in up to ${LARGEST_DUAL_DIMENSION} dimensions.`]
        : []),
    ],
  };
}

/** The dimensions asked for, as far as the source has them; more are for the other figures of a rank-1 lattice. */
function dimensionsOf({ id, source }: SourceChoice, request: InspectionRequest): number[] {
  const largest = Math.min(source.largestDimension, LARGEST_DUAL_DIMENSION);
  const beyond = request.dimensions.find((dimension) => dimension > largest);
  if (beyond !== undefined && request.dimensionsGiven && !isRankOne(source)) {
    throw new RangeError(
      `dimensions: expected whole numbers from 2 to ${largest} for the dual lattice of "${id}", found ${beyond}`,
    );
  }
  return request.dimensions.filter((dimension) => dimension <= largest);
}

function withGap<T extends DualFigures>(figures: T): T & { gap: number } {
  return { ...figures, gap: 1 / Math.sqrt(Number(figures.squaredLength)) };
}

/** The figures of one of the lattices, its hyperplanes counted with its shift. */
function entriesOf(
  { tuples }: LatticeStructure,
  lattice: TupleLattice,
  dimensions: readonly number[],
): DualEntry[] {
  const indices = Array.from({ length: Math.max(1, ...dimensions) }, (_, j) => j);
  const wanted = new Set(dimensions);
  const own: Tuples = { ...tuples, modulus: lattice.modulus };
  const entries: DualEntry[] = [];
  const steps = (dimension: number): Steps =>
    lattice.kind === "full" && dimension <= LARGE.above
      ? DEFAULT_STEPS
      : { ...DEFAULT_STEPS, absoluteSum: LARGE.absoluteSum };
  for (const figures of dualFigures(own, indices, { steps, wanted })) {
    const hyperplanes =
      lattice.kind === "full" ? figures.hyperplanes : shiftedHyperplanes(figures.l1Vector, lattice, tuples);
    entries.push(withGap({ ...figures, hyperplanes }));
  }
  return entries;
}

/** The terms of a recurrence of more terms than there are dimensions: x(n-k), ..., x(n) that it ties together. */
function ownIndices({ recurrence, stride }: LatticeStructure, largest: number): number[] | null {
  if (recurrence === null || stride > 1) return null;
  const { multipliers, lags } = recurrence;
  if (lags !== undefined) return [...lags];
  const order = multipliers.length;
  const terms = multipliers.flatMap((a, k) => (a === 0n ? [] : [order - 1 - k]));
  return order >= largest && terms.length <= FEW_TERMS ? [...terms.reverse(), order] : null;
}

function worstOf(entries: readonly DualEntry[]): DualData["worstFigure"] {
  const [worst] = [...entries].sort((a, b) => a.figure - b.figure);
  return worst === undefined ? null : { dimension: worst.dimension, figure: worst.figure };
}

function showDual(data: DualData): Part[] {
  const parts = [fullPart(data)];
  if (data.lattices.length > 1) parts.push(othersPart(data));
  if (data.dualIndices !== null) parts.push(indicesPart(data.dualIndices));
  if (data.worstProjections.length > 0) parts.push(projectionsPart(data));
  return parts;
}

const CONVENTION =
  "Planes: those that meet the cube [0, 1)^t for the dual vector of least |h|₁, lattice through the origin: |h|₁ − 1 if it has entries of both signs, else |h|₁; a shifted lattice meets up to |h|₁. Bound: no lattice of this modulus has more (Marsaglia 1968).";

const FIGURE =
  "S: length of the shortest dual vector over the longest possible one, 1 at best; exact to 8 dimensions and in 24, elsewhere with Rogers' bound, which makes it a lower limit. Gap: largest distance of neighbouring planes.";

function fullPart(data: DualData): Part {
  const [full] = data.lattices;
  const cut = data.dual.filter(({ complete }) => !complete).map(({ dimension }) => dimension);
  const cutSums = data.dual.filter(({ l1Complete }) => !l1Complete).map(({ dimension }) => dimension);
  const { worstFigure: worst, order } = data;
  const beyond = order > 1 ? data.dual.filter(({ dimension }) => dimension > order) : data.dual;
  return {
    title: "Dual lattice",
    lines: [
      `Modulus ${full?.modulus ?? "?"}: ${full?.what ?? ""}.${data.stride > 1 ? ` One of every ${data.stride} outputs.` : ""}`,
      ...(order > 1 ? [`Order ${order}: tuples of up to ${order} outputs fill the cube evenly.`] : []),
      ...data.latticeNotes,
      ...(worst === null
        ? []
        : [`Worst figure: S = ${figureText(worst.figure)} in dimension ${worst.dimension}.`]),
    ],
    table:
      beyond.length === 0
        ? null
        : {
            columns: [
              { title: "t", align: "right" },
              { title: "ν²", align: "right" },
              { title: "S", align: "right" },
              { title: "gap", align: "right" },
              { title: "planes", align: "right" },
              { title: "bound", align: "right" },
              { title: "shortest vector", align: "left" },
            ],
            rows: beyond.map((entry) => [
              String(entry.dimension),
              ...figureCells(entry),
              vectorText(entry.vector),
            ]),
          },
    notes: [
      CONVENTION,
      FIGURE,
      ...(cut.length === 0
        ? []
        : [
            `Enumeration reached its bound in dimension ${intervalText(cut)}: ν² is that of the shortest vector found.`,
          ]),
      ...(cutSums.length === 0
        ? []
        : [
            `Enumeration by |h|₁ reached its bound in dimension ${intervalText(cutSums)}: planes are those of the best vector found, and may be fewer.`,
          ]),
    ],
  };
}

/** Four digits behind the point, or three that count. */
function figureText(figure: number): string {
  return figure >= 0.001 ? figure.toFixed(4) : figure.toPrecision(3);
}

function figureCells(entry: DualEntry): string[] {
  return [
    String(entry.squaredLength),
    figureText(entry.figure),
    entry.gap.toPrecision(3),
    `${entry.l1Complete ? "" : "≤ "}${entry.hyperplanes}`,
    String(entry.marsagliaBound),
  ];
}

const HEADS: Record<TupleLattice["kind"], string> = {
  full: "full",
  knuth: "Knuth",
  orbit: "one run",
  "seed-averaged": "all seeds",
};

function othersPart(data: DualData): Part {
  const others = data.lattices.slice(1);
  const lists = others.map(({ kind }) => data[KEYS[kind]] ?? []);
  const columns: Table["columns"] = [
    { title: "t", align: "right" },
    ...others.flatMap(({ kind }) =>
      ["ν²", "S", "planes"].map((title) => ({ title: `${HEADS[kind]} ${title}`, align: "right" as const })),
    ),
  ];
  return {
    title: "Other lattices of the same generator",
    lines: others.map(({ kind, modulus, what }) => `${HEADS[kind]}: modulus ${modulus}, ${what}.`),
    table: {
      columns,
      rows: data.dual.map(({ dimension }, row) => [
        String(dimension),
        ...lists.flatMap((entries) => {
          const entry = entries[row];
          return entry === undefined
            ? ["", "", ""]
            : [String(entry.squaredLength), figureText(entry.figure), String(entry.hyperplanes)];
        }),
      ]),
    },
    notes: [
      "Planes of shifted lattices are counted with their shift; where two lattices differ in it, up to that many.",
    ],
  };
}

function indicesPart(entry: DualOfIndices): Part {
  return {
    title: `Outputs ${setText(entry.indices)}`,
    lines: [],
    table: projectionTable([entry]),
    notes: [],
  };
}

function projectionsPart(data: DualData): Part {
  return {
    title: "Worst projections",
    lines: [
      `Index sets of 2 and 3 ${data.latticePoints === null ? "outputs that begin with 0" : "coordinates"}, below ${data.projectionSpan}, of least S.`,
    ],
    table: projectionTable(data.worstProjections),
    notes: [],
  };
}

function projectionTable(entries: readonly DualOfIndices[]): Table {
  return {
    columns: [
      { title: "indices", align: "left" },
      { title: "ν²", align: "right" },
      { title: "S", align: "right" },
      { title: "gap", align: "right" },
      { title: "planes", align: "right" },
      { title: "bound", align: "right" },
      { title: "shortest vector", align: "left" },
    ],
    rows: entries.map((entry) => [setText(entry.indices), ...figureCells(entry), vectorText(entry.vector)]),
  };
}
