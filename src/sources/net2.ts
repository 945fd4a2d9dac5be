/**
 * Streams of digital nets and sequences in base 2, plain or randomised:
 * - `digital-shift`: every coordinate xored with a random word (L'Ecuyer & Lemieux, "Recent advances in randomized
 *   quasi-Monte Carlo methods", in Modeling Uncertainty, Kluwer, 2002, 419-474);
 * - `linear`: random lower triangular matrices and a digital shift (Matousek, Journal of Complexity 14, 1998, 527-556);
 * - `owen`: nested uniform scrambling (Owen, in Monte Carlo and Quasi-Monte Carlo Methods in Scientific Computing,
 *   Springer, 1995, 299-317).
 * Points have 52 digits and stand at the midpoints (k + 1/2) / 2^52. The first two cost nothing per point, `owen` some
 * 30 times the plain net.
 */
import type { Kernels } from "../kernels/instance.js";
import { DIGITS, unpackColumns } from "../numeric/gf2.js";
import { checkCapacity } from "./capacity.js";
import type {
  DigitalNet,
  GeneratingMatrices,
  OpenRequest,
  PointStream,
  Seekable,
  Source,
  SourceDescription,
} from "./contract.js";
import { checkIndex, checkOpening } from "./quasi-random.js";

const RANDOMISATIONS = ["digital-shift", "linear", "owen"] as const;

const RECORD_WORDS = 56;
const ORIGIN = 1;
const STEPS = 2;
const OWEN_KEYS = 18;

/** What a digital net in base 2 is made of. */
export interface Net2 {
  readonly order: GeneratingMatrices["order"];
  /**
   * Packed generating matrices (numeric/gf2): `DIGITS` columns for each of at least `dimension` coordinates, one after the
   * other; for a net built for one size, those of n points.
   */
  columns(dimension: number, n: number): BigUint64Array;
}

/** What a net says of itself beyond what all nets in base 2 have in common. */
export type About2 = Pick<
  SourceDescription,
  "id" | "title" | "citation" | "largestDimension" | "knownStructure"
> &
  Partial<Pick<Source, "family" | "nesting" | "randomisations" | "nearestSize">>;

/** The source of a net in base 2: a sequence with all randomisations unless `about` says otherwise. */
export function netSource2(about: About2, net: Net2): DigitalNet {
  const source: DigitalNet = {
    family: "quasi-random",
    method: "digital net",
    outputBits: DIGITS,
    period: null,
    nesting: "sequence",
    randomisations: RANDOMISATIONS,
    nearestSize: (n) => n,
    ...about,
    open: (request, kernels) => openNet2(source, net, request, kernels),
    generatingMatrices(dimension, n) {
      checkCapacity(source, dimension, n);
      const columns = net.columns(dimension, n);
      const used = Math.ceil(Math.log2(n));
      const matrices = Array.from({ length: dimension }, (_, j) =>
        unpackColumns(columns.subarray(j * DIGITS, j * DIGITS + used)),
      );
      return { base: 2, order: net.order, matrices };
    },
  };
  return source;
}

/** Opens a stream over the first `request.dimension` coordinates of a net. */
function openNet2(source: Source, net: Net2, request: OpenRequest, kernels: Kernels): PointStream & Seekable {
  const { dimension } = request;
  const randomisation = checkOpening(source, request);
  const columns = net.columns(dimension, request.n);
  const { arena, exports } = kernels;

  const size = dimension * RECORD_WORDS;
  const records = arena.allocate(size * 8);
  const words = kernels.u64(records, size).fill(0n);
  for (let j = 0; j < dimension; j++) {
    words.set(columns.subarray(j * DIGITS, (j + 1) * DIGITS), j * RECORD_WORDS + STEPS);
  }
  if (net.order === "natural") exports.net2Natural(records, dimension);

  let keys = 0;
  if (randomisation?.name === "owen") {
    keys = arena.allocate(dimension * OWEN_KEYS * 4);
    kernels
      .u32(keys, dimension * OWEN_KEYS)
      .set(randomisation.key.derive("owen").words32(dimension * OWEN_KEYS));
  } else if (randomisation !== null) {
    if (randomisation.name === "linear") {
      const mark = arena.mark();
      const seeds = arena.allocate(dimension * 32);
      kernels.u64(seeds, dimension * 4).set(randomisation.key.derive("linear").words64(dimension * 4));
      exports.net2Scramble(records, dimension, seeds);
      arena.release(mark);
    }
    const shifts = randomisation.key.derive("digital-shift").words64(dimension);
    const records64 = kernels.u64(records, size);
    for (const [j, shift] of shifts.entries())
      records64[j * RECORD_WORDS + ORIGIN] = shift >> BigInt(64 - DIGITS);
  }

  let index = 0;
  const seek = (to: number): void => {
    checkIndex(source, to);
    exports.net2Seek(records, dimension, to);
    index = to;
  };
  seek(0);
  return {
    dimension,
    seek,
    fill(pointer, stride, count) {
      checkIndex(source, index, count);
      if (keys === 0) exports.net2Fill(records, dimension, index, pointer, stride, count);
      else exports.net2FillOwen(records, dimension, keys, index, pointer, stride, count);
      index += count;
    },
  };
}
