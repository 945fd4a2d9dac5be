/** Sizes of a study: "2^8..2^18" (doubling), "1000..1000000 by 10" (another factor), one number, or a list. */
import { LIMITS } from "./defaults.js";
import { plainNumber } from "./evaluate.js";
import { show } from "./errors.js";

export type SizesText = string | number | readonly (string | number)[];

const RANGE = /^(\S+?)\s*\.\.\s*(\S+?)(?:\s+by\s+(\S+))?$/;

function whole(given: string | number, least: number): number {
  const value = typeof given === "number" ? given : plainNumber(given);
  if (value === null || !Number.isInteger(value) || !(value >= least && value <= LIMITS.points)) {
    throw new RangeError(
      `expected a whole number from ${least} to 2^40, as digits or a power such as 2^16, found ${show(given)}`,
    );
  }
  return value;
}

function range(text: string, from: string, to: string, by: string | undefined): number[] {
  const factor = by === undefined ? 2 : whole(by, 2);
  const end = whole(to, 2);
  const sizes: number[] = [];
  for (let n = whole(from, 2); n <= end; n *= factor) sizes.push(n);
  const last = sizes.at(-1);
  if (last === undefined)
    throw new RangeError(`expected sizes that grow, found "${text}"; swap the two ends`);
  if (last !== end) {
    const next = last * factor;
    throw new RangeError(
      `"${text}" grows by factors of ${factor} to ${last}, then ${next}, and misses its end ${end}; ` +
        `end it at ${last} or ${next}, or write a list`,
    );
  }
  return sizes;
}

/**
 * The sizes that `given` names, ascending. A text may also be a list with commas, as on the command line.
 * Throws RangeError for sizes that are not whole numbers from 2 to 2^40, repeat, or never end.
 */
export function parseSizes(given: SizesText): number[] {
  let sizes: number[];
  if (typeof given === "string") {
    const match = RANGE.exec(given.trim());
    sizes = match
      ? range(given.trim(), match[1] ?? "", match[2] ?? "", match[3])
      : given.split(",").map((part) => whole(part.trim(), 2));
  } else {
    sizes = (typeof given === "number" ? [given] : given).map((part) => whole(part, 2));
  }
  sizes.sort((a, b) => a - b);
  const twice = sizes.find((n, i) => n === sizes[i + 1]);
  if (twice !== undefined) throw new RangeError(`expected different sizes, found ${twice} twice`);
  if (sizes.length > LIMITS.sizes) {
    throw new RangeError(
      `expected at most ${LIMITS.sizes} sizes, found ${sizes.length}; take a larger factor`,
    );
  }
  return sizes;
}
