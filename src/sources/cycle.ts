/** Points from every valid starting state of a generator: point i is the tuple that state i begins. */
import type { Kernels } from "../kernels/instance.js";
import type { ToRows } from "../kernels/generator-exports.js";
import type { Cycle, FullCycle, PointStream, Seekable, Source } from "./contract.js";
import { makeConversion } from "./conversion.js";
import { withEndpoints } from "./endpoints.js";
import { periodText } from "./period-text.js";
import type { Recurrence, Usage } from "./recurrence.js";
import { seedingText } from "./seeding.js";
import { MOST_STATES, type StateSpace, type StateWords } from "./states.js";

/** Points that are made at a time: their words fit the first-level cache beside a row of coordinates. */
const CHUNK = 1024;

const MOST = MOST_STATES.toLocaleString("en");

/** The full cycle of a source. Throws a RangeError with the reason where it has none. */
export function fullCycleOf(source: Source): Cycle {
  if ("cycle" in source) return (source as FullCycle).cycle();
  const { id, period } = source;
  const why =
    period === null
      ? "it has no starting states that could all be gone through"
      : `its period is ${periodText(period)}, and a full cycle goes through at most ${MOST} states`;
  throw new RangeError(`source "${id}": ${why}; a study measures its bias over replicates instead`);
}

/** The full cycle of a generator in this usage; throws as `fullCycleOf`. */
export function cycleOf(recurrence: Recurrence, usage: Usage): Cycle {
  const { id } = recurrence.about;
  const { tuples, seeding, bits } = usage;
  const seeds = seedingText(seeding);
  if (seeds !== null) {
    throw new RangeError(
      `source "${id}": a full cycle averages over every state, and this source begins at given ones (${seeds}); leave its "seeding" out`,
    );
  }
  if (tuples.kind === "per-coordinate") {
    throw new RangeError(
      `source "${id}": with one stream per coordinate the combinations of states are too many for a full cycle; expected tuples "successive" or "strided k"`,
    );
  }
  const space = recurrence.states?.(bits);
  if (space === undefined) throw new TypeError(`source "${id}" does not list its states`);
  if (space.count > MOST_STATES) {
    throw new RangeError(
      `source "${id}": it has ${countText(space.count)} starting states, and a full cycle goes through at most ${MOST}; a study measures its bias over replicates instead`,
    );
  }
  return {
    states: Number(space.count),
    open: (dimension, kernels) => {
      const stream = new StatesStream(space, usage, tuples.step, dimension, kernels);
      return usage.float32 || usage.endpoint === "left"
        ? withEndpoints(stream, usage.float32, kernels)
        : stream;
    },
  };
}

function countText(count: bigint): string {
  return count < 10n ** 18n ? count.toLocaleString("en") : periodText(count);
}

class StatesStream implements PointStream, Seekable {
  readonly dimension: number;
  readonly #words: StateWords;
  readonly #scratch: number;
  readonly #toRows: ToRows;
  #index = 0;

  constructor(space: StateSpace, usage: Usage, step: number, dimension: number, kernels: Kernels) {
    const { output, bits } = space;
    this.dimension = dimension;
    const outputs = Array.from({ length: dimension }, (_, j) => BigInt(j) * BigInt(step) + 1n);
    this.#words = space.open(outputs, kernels);
    this.#scratch = kernels.arena.allocate((CHUNK + 4) * output.bytes);
    this.#toRows = makeConversion({ output, endpoint: usage.endpoint, bits }, kernels);
  }

  seek(index: number): void {
    this.#index = index;
  }

  fill(pointer: number, stride: number, count: number): void {
    for (let j = 0; j < this.dimension; j++) {
      for (let begin = 0; begin < count; begin += CHUNK) {
        const size = Math.min(CHUNK, count - begin);
        this.#words.fill(j, this.#index + begin, size, this.#scratch);
        this.#toRows(this.#scratch, 1, size, pointer + (j * stride + begin) * 8, stride);
      }
    }
    this.#index += count;
  }
}
