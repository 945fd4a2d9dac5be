/**
 * The quality parameter t of a digital net's first b^m points (t-value.ts): by dimension, of an index set, of all pairs of
 * coordinates, with the shortest dual vectors of the worst. Shifts and scrambles of digits keep t (A. B. Owen, in Monte Carlo and
 * Quasi-Monte Carlo Methods in Scientific Computing, 1995). Of interlaced nets also what carries their higher order: t of the
 * coordinates that take turns in the digits, and the bound that follows for order alpha in d dimensions, alpha min(m, t +
 * floor(d (alpha - 1) / 2)) (J. Dick, SIAM Journal on Numerical Analysis 46 (2008) 1519-1553; Dick and Pillichshammer, Digital Nets
 * and Sequences, 2010, chapter 15).
 */
import { Matrix } from "ml-matrix";
import type { DigitalNet } from "../../sources/contract.js";
import type { SourceChoice } from "../../sources/choice.js";
import type { InspectionRequest, Part, Section } from "../contract.js";
import { dualVectors } from "../dual-net.js";
import { coordinatesOf, isDigitalNet, netOfSource, type Net } from "../net.js";
import { pairTValues, tValue, worstPairs, type TValue } from "../t-value.js";
import { dimensionsFor } from "./dimensions.js";
import { setText } from "./text.js";

interface NetSize {
  readonly base: number;
  /** m; the figures are those of base^m points. */
  readonly digits: number;
}

export interface NetEntry extends NetSize, TValue {
  readonly dimension: number;
}

export interface NetData {
  readonly nets: readonly NetEntry[];
  /** The index set asked for. */
  readonly netIndices: (NetSize & TValue & { readonly indices: readonly number[] }) | null;
  readonly netPairs:
    | (NetSize & {
        readonly dimension: number;
        /** How many pairs have t = 0, 1, .... */
        readonly counts: readonly number[];
        readonly worst: readonly {
          readonly indices: readonly number[];
          readonly t: number;
          /** The numbers k of the shortest dual vector with its coordinates among these. */
          readonly k: readonly number[];
        }[];
      })
    | null;
  /** Of an interlaced net: t of the coordinates behind it, and the largest t of higher order that this allows. */
  readonly netInterlaced:
    | readonly (TValue & {
        readonly dimension: number;
        readonly order: number;
        readonly higherOrderAtMost: number;
      })[]
    | null;
  readonly netNotes: readonly string[];
}

/** Points where none are asked for. */
const USUAL_POINTS = 2 ** 16;

const WORST = 5;

export const netSection: Section<NetData> = {
  applies: ({ source }) => isDigitalNet(source),
  otherwise: () => null,
  inspect: (choice, request) => {
    if (!isDigitalNet(choice.source))
      throw new RangeError(`source: expected a digital net, found "${choice.id}"`);
    return inspectNet(choice, choice.source, request);
  },
  show: showNet,
};

function inspectNet(choice: SourceChoice, source: DigitalNet, request: InspectionRequest): NetData {
  const asked = request.points ?? USUAL_POINTS;
  const n = source.nearestSize(asked);
  const dimensions = dimensionsFor(choice, request, source.largestDimension);
  const notes: string[] = [];
  // the longest first: constructed vectors are then found once
  const nets = new Map<number, Net>();
  for (const dimension of [...dimensions].reverse()) nets.set(dimension, netOfSource(source, dimension, n));
  const largest = nets.get(dimensions.at(-1) ?? NaN);
  const { indices } = request;
  const chosen = indices === null ? null : netOfSource(source, 1 + Math.max(...indices), n);
  const sizes = [...nets.values()].map(({ base, digits }) => base ** digits);
  if (request.points !== null && sizes.some((size) => size !== asked)) {
    notes.push(`Figures are those of the first b^m points at most ${n}, b the base.`);
  }
  return {
    nets: dimensions.flatMap((dimension) => {
      const net = nets.get(dimension);
      return net === undefined ? [] : [{ dimension, ...sizeOf(net), ...tValue(net, upTo(dimension)) }];
    }),
    netIndices:
      chosen === null || indices === null ? null : { indices, ...sizeOf(chosen), ...tValue(chosen, indices) },
    netPairs: largest === undefined || largest.matrices.length < 2 ? null : pairsOf(largest),
    netInterlaced: interlacedOf(source, [...nets.values()].reverse()),
    netNotes: notes,
  };
}

const sizeOf = ({ base, digits }: Net): NetSize => ({ base, digits });

const upTo = (dimension: number): number[] => Array.from({ length: dimension }, (_, j) => j);

function pairsOf(net: Net): NetData["netPairs"] {
  const pairs = pairTValues(net);
  const worst = worstPairs(pairs, WORST).map(({ indices, t }) => {
    const pair = coordinatesOf(net, indices);
    const [shortest] = dualVectors(pair, { enough: 1, weight: net.digits + 1 }).vectors;
    const k = indices.map((_, at) => shortest?.k[shortest.indices.indexOf(at)] ?? 0);
    return { indices, t, k };
  });
  return { ...sizeOf(net), dimension: net.matrices.length, counts: pairs.counts, worst };
}

function interlacedOf({ interlacing }: DigitalNet, nets: readonly Net[]): NetData["netInterlaced"] {
  if (interlacing === undefined) return null;
  return nets.map((net) => {
    const dimension = net.matrices.length;
    const matrices = net.matrices.flatMap((matrix) => partsOf(matrix, interlacing));
    const behind = tValue({ ...net, matrices }, upTo(matrices.length));
    const bound = behind.atMost + Math.floor((dimension * (interlacing - 1)) / 2);
    return {
      dimension,
      order: interlacing,
      ...behind,
      higherOrderAtMost: interlacing * Math.min(net.digits, bound),
    };
  });
}

/** The matrices whose rows take turns in one. */
function partsOf(matrix: Matrix, count: number): Matrix[] {
  return Array.from({ length: count }, (_, part) => {
    const rows = Array.from({ length: Math.ceil((matrix.rows - part) / count) }, (_, r) => part + r * count);
    return new Matrix(rows.map((row) => matrix.getRow(row)));
  });
}

function showNet(data: NetData): Part[] {
  const parts = [dimensionsPart(data)];
  if (data.netPairs !== null) parts.push(pairsPart(data.netPairs));
  return parts;
}

const tText = ({ t, atLeast, atMost }: TValue): string =>
  t === null ? `${atLeast} to ${atMost}` : String(t);

const pointsText = ({ base, digits }: NetSize): string => `${base}^${digits}`;

function dimensionsPart({ nets, netIndices, netInterlaced, netNotes }: NetData): Part {
  const cut = [...nets, ...(netIndices === null ? [] : [netIndices])].some(({ t }) => t === null);
  const indexRow =
    netIndices === null ? [] : [[setText(netIndices.indices), pointsText(netIndices), tText(netIndices)]];
  const more = (dimension: number): string[] => {
    const entry = netInterlaced?.find((behind) => behind.dimension === dimension);
    return entry === undefined ? [] : [tText(entry), `≤ ${entry.higherOrderAtMost}`];
  };
  const order = netInterlaced?.[0]?.order;
  return {
    title: "Net quality",
    lines: netNotes,
    table: {
      columns: [
        { title: "coordinates", align: "right" },
        { title: "points", align: "right" },
        { title: "t", align: "right" },
        ...(order === undefined
          ? []
          : [
              { title: "t behind it", align: "right" as const },
              { title: `t of order ${order}`, align: "right" as const },
            ]),
      ],
      rows: [
        ...nets.map((net) => [String(net.dimension), pointsText(net), tText(net), ...more(net.dimension)]),
        ...indexRow.map((row) => [...row, ...(order === undefined ? [] : ["", ""])]),
      ],
    },
    notes: [
      "t: every box of b^(m−t) equal ones whose sides are powers of 1/b holds b^t of the b^m points; 0 at best, and m says nothing. Shifts and scrambles of the digits keep it.",
      ...(order === undefined
        ? []
        : [
            `t of order ${order} is what smooth integrands feel (0 at best, ${order}m says nothing); the bound follows from t of the ${order} d coordinates behind it (Dick 2008). The plain t tells how the points look to all others.`,
          ]),
      ...(cut ? ["Where two numbers stand the enumeration reached its bound, and t lies between them."] : []),
    ],
  };
}

function pairsPart({ dimension, counts, worst, ...size }: NonNullable<NetData["netPairs"]>): Part {
  const total = (dimension * (dimension - 1)) / 2;
  const distribution = counts.map((count, t) => `${count} with t = ${t}`).filter((_, t) => counts[t] !== 0);
  return {
    title: `Pairs of ${dimension} coordinates, ${pointsText(size)} points`,
    lines: [`${total} ${total === 1 ? "pair" : "pairs"}: ${distribution.join(", ")}.`],
    table: {
      columns: [
        { title: "worst pairs", align: "left" },
        { title: "t", align: "right" },
        { title: "shortest dual vector", align: "left" },
      ],
      rows: worst.map(({ indices, t, k }) => [setText(indices), String(t), `k = (${k.join(", ")})`]),
    },
    notes: [
      "The Walsh function of a dual vector is 1 at all the unscrambled points: they mistake it for a constant. Coordinates are counted from 0.",
    ],
  };
}
