/** How evenly the top bits of successive outputs of a generator that is linear over GF(2) fill the cube (equidistribution.ts). */
import type { SourceChoice } from "../../sources/choice.js";
import { takeBits } from "../../sources/conversion.js";
import { Key } from "../../sources/key.js";
import { isPseudoRandom, type PseudoRandomSource } from "../../sources/pseudo-random.js";
import type { BinaryLinear } from "../../sources/recurrence.js";
import type { Part, Section } from "../contract.js";
import { equidistribution } from "../equidistribution.js";

export interface EquidistributionData {
  /** One entry for every number of top bits; null where it was not computed. */
  readonly equidistribution:
    | readonly {
        readonly bits: number;
        readonly dimension: number;
        readonly atMost: number;
        readonly gap: number;
      }[]
    | null;
  /** Whose bits: those of outputs, or of the one word that outputs are a bijection of. */
  readonly equidistributionOf: "outputs" | "word";
  readonly stateBits: number;
  readonly equidistributionMissing: string | null;
}

/** States beyond are left out; 19,937 bits take some two seconds. */
const LARGEST_STATE = 25_000;

/** The recurrence is the same from every state. */
const ANY_KEY = new Key("equidistribution");

export const equidistributionSection: Section<EquidistributionData> = {
  applies: (choice) => binaryOf(choice) !== null,
  otherwise: ({ id, source }) => {
    const binary = isPseudoRandom(source) ? source.recurrence.binary : undefined;
    if (binary === undefined) return null;
    return `${id}: no dimension of equidistribution, as outputs mix words of the linear state by sums or other parts of them`;
  },
  inspect: (choice) => {
    const found = binaryOf(choice);
    if (found === null) throw new RangeError(`source: expected a linear one, found "${choice.id}"`);
    return inspectBits(found.source, found.binary);
  },
  show: showBits,
};

function binaryOf({ source }: SourceChoice): { source: PseudoRandomSource; binary: BinaryLinear } | null {
  if (!isPseudoRandom(source)) return null;
  const { binary } = source.recurrence;
  if (binary === undefined || binary.of === "state") return null;
  // parts of a bijection are not linear
  return binary.of === "bijection" && source.usage.bits !== null ? null : { source, binary };
}

function inspectBits({ recurrence, usage }: PseudoRandomSource, binary: BinaryLinear): EquidistributionData {
  const { stateBits, wordBits, registers = 1 } = binary;
  const { bits, tuples } = usage;
  const width = bits?.count ?? wordBits;
  const facts = { equidistributionOf: binary.of === "bijection" ? "word" : "outputs", stateBits } as const;
  const missing = (why: string): EquidistributionData => ({
    ...facts,
    equidistribution: null,
    equidistributionMissing: why,
  });
  const entries = (dimensions: readonly number[]): EquidistributionData => ({
    ...facts,
    equidistribution: dimensions.map((dimension, k) => {
      const atMost = Math.floor(stateBits / (k + 1));
      return { bits: k + 1, dimension, atMost, gap: atMost - dimension };
    }),
    equidistributionMissing: null,
  });
  const stride = tuples.kind === "strided" ? tuples.step : 1;
  if (registers > 1) {
    if (stride > 1) return missing("outputs are taken at a stride, and every bit is a register of its own");
    return entries(Array.from({ length: width }, () => stateBits / registers));
  }
  if (stateBits > LARGEST_STATE)
    return missing(`a state of ${stateBits} bits is too large (${LARGEST_STATE} at most)`);
  const words = binary.words(recurrence.stateFromKey(ANY_KEY));
  const outputs = Array.from({ length: 2 * stateBits }, () => {
    const word = words.next().value;
    for (let k = 1; k < stride; k++) words.next();
    return bits === null ? word : takeBits(word, bits, wordBits);
  });
  const found = equidistribution(outputs, width, stateBits);
  if (found === null) return missing("no single bit follows one recurrence through the whole state");
  return entries(found.dimensions);
}

/** Bits that have a row of their own in a table of many. */
const ROWS = new Set([1, 2, 3, 4, 5, 6, 7, 8, 12, 16, 20, 24, 28, 32, 40, 48, 56, 64]);

function showBits(data: EquidistributionData): Part[] {
  const { equidistribution: entries, equidistributionOf, stateBits, equidistributionMissing } = data;
  const title = "Equidistribution";
  if (entries === null) {
    return [{ title, lines: [`Not computed: ${equidistributionMissing ?? ""}.`], table: null, notes: [] }];
  }
  const total = entries.reduce((sum, { gap }) => sum + gap, 0);
  const worst = entries.reduce((most, entry) => (entry.gap > most.gap ? entry : most));
  const width = entries.length;
  return [
    {
      title,
      lines: [
        total === 0
          ? `Maximally equidistributed: no gap for any of its ${width} bits.`
          : `Gaps of ${total} dimensions in all over ${width} bits, the largest ${worst.gap} for ${worst.bits} bits.`,
        ...(equidistributionOf === "word"
          ? [
              `Of the word of state that outputs are a bijection of: for all ${width} bits the figure is that of the outputs, for fewer it is not.`,
            ]
          : []),
      ],
      table: {
        columns: [
          { title: "top bits", align: "right" },
          { title: "dimension", align: "right" },
          { title: "at most", align: "right" },
          { title: "gap", align: "right" },
        ],
        rows: entries
          .filter(({ bits }) => ROWS.has(bits) || bits === width)
          .map(({ bits, dimension, atMost, gap }) => [bits, dimension, atMost, gap].map(String)),
      },
      notes: [
        `Dimension: so many successive outputs take all values of their top bits equally often over all states; at most ${stateBits} bits of state over those bits.`,
      ],
    },
  ];
}
