/**
 * All states of a generator of one 32-bit word that is linear over GF(2): 1 ... 2^32 - 1 in order. An output is the
 * exclusive or of one column for each bit of the state, so over all states with 0 the tuples are a digital net in base 2
 * whose generating matrices are powers of the map.
 */
import type { LinearStep } from "../numeric/gf2-polynomial.js";
import type { Bits } from "./conversion.js";
import type { State } from "./recurrence.js";
import type { StateSpace } from "./states.js";

const BITS = 32;
/** The low bits of a state that choose from a table. */
const TABLE = 256;

export interface F2Map {
  readonly step: LinearStep;
  readonly output: (state: State) => bigint;
  readonly outputFrom: "before" | "after";
}

/** The states of an invertible map. */
export function f2States({ step, output, outputFrom }: F2Map, bits: Bits | null): StateSpace {
  return {
    count: (1n << 32n) - 1n,
    output: { modulus: 1n << 32n, bytes: 4, zeroless: false, integers: 1 },
    bits,
    open: (outputs, kernels) => {
      const maps = outputs.map(() => kernels.arena.allocate((BITS + TABLE) * 4 + 16));
      let columns: State[] = Array.from({ length: BITS }, (_, b) => [1n << BigInt(b)]);
      let done = 0n;
      outputs.forEach((number, row) => {
        const target = outputFrom === "after" ? number : number - 1n;
        for (; done < target; done++) columns = columns.map((column) => [...step(column)]);
        const map = kernels.u32(maps[row] ?? 0, BITS + TABLE);
        map.set(columns.map((column) => Number(output(column))));
        for (let low = 0; low < TABLE; low++) {
          let word = 0;
          for (let b = 0; b < 8; b++) if ((low >> b) & 1) word ^= map[b] ?? 0;
          map[BITS + low] = word;
        }
      });
      return {
        // state 0 is none
        fill: (row, index, count, out) => {
          kernels.exports.fillSpan32(out, count, index + 1, maps[row] ?? 0);
        },
      };
    },
  };
}
