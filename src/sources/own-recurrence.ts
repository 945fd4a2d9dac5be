/** The generators that a user can describe by numbers: congruential, multiple recursive, xorshift. */
import { congruentialPeriod } from "../numeric/congruential-period.js";
import { parseInteger } from "../numeric/integer-formula.js";
import { congruential, LARGEST_MODULUS } from "./congruential.js";
import { bitsOf } from "./conversion.js";
import type { About, Recurrence } from "./pseudo-random.js";
import { LARGEST_ORDER, recursive } from "./recursive.js";
import { xorshiftTriple } from "./xorshift-triple.js";

/** A whole number as it is written: a number, or a formula as text. */
export type Written = number | string;

/** Throws a RangeError for a key below `source`. */
export function refuse(key: string, found: string, allowed: string): never {
  throw new RangeError(`source.${key}: expected ${allowed}, found ${found}`);
}

/** The whole number at a key below `source`; throws a RangeError outside least...most. */
export function within(key: string, written: Written, least: bigint, most: bigint): bigint {
  const value = parseInteger(written, `source.${key}`);
  if (value >= least && value <= most) return value;
  const plain = typeof written === "number" || /^-?\d+$/.test(written);
  return refuse(
    key,
    plain ? `${value}` : `"${written}" = ${value}`,
    `a whole number from ${least} to ${most}`,
  );
}

function aboutOwn(id: string, parts: Omit<About, "id" | "citation">, method: string): About {
  return { id, ...parts, citation: `the user's own; method: ${method}` };
}

export function ownCongruential(
  id: string,
  written: { modulus: Written; multiplier: Written; increment?: Written | undefined },
): Recurrence {
  const modulus = within("congruential.modulus", written.modulus, 2n, LARGEST_MODULUS);
  const multiplier = within("congruential.multiplier", written.multiplier, 1n, modulus - 1n);
  const increment = within("congruential.increment", written.increment ?? 0, 0n, modulus - 1n);
  const map = { multiplier, increment, modulus };
  const parts = {
    title: `${multiplier} x + ${increment} mod ${modulus}`,
    method: "congruential",
    outputBits: bitsOf(modulus),
    period: congruentialPeriod(map),
    knownStructure: "tuples of successive outputs lie on a lattice",
  };
  const method = "D. H. Lehmer, Mathematical methods in large-scale computing units (1951)";
  return congruential(aboutOwn(id, parts, method), map);
}

export function ownRecursive(
  id: string,
  written: { modulus: Written; multipliers: readonly Written[]; increment?: Written | undefined },
): Recurrence {
  const modulus = within("recursive.modulus", written.modulus, 2n, LARGEST_MODULUS - 1n);
  const increment = within("recursive.increment", written.increment ?? 0, 0n, modulus - 1n);
  const order = written.multipliers.length;
  const multipliers = written.multipliers.map((multiplier, k) => {
    const key = `recursive.multipliers.${k}`;
    // negative ones are usual in print; the last one must not vanish, or the order is lower
    const value = within(key, multiplier, 1n - modulus, modulus - 1n);
    if (k === order - 1 && value === 0n) refuse(key, "0", "a last multiplier that is not 0");
    return (value + modulus) % modulus;
  });
  const parts = {
    title: `recursive of order ${order} mod ${modulus}`,
    method: "multiple recursive",
    outputBits: bitsOf(modulus),
    period: null,
    knownStructure: `tuples of more than ${order} successive outputs lie on a lattice`,
  };
  const method = "D. E. Knuth, The Art of Computer Programming, vol. 2, 3rd ed. (1997), 3.2.2";
  return recursive(aboutOwn(id, parts, method), { multipliers, increment, modulus });
}

/** Orders that a description may have; the schema refuses others. */
export const ORDERS = { least: 1, most: LARGEST_ORDER };

export function ownXorshift(
  id: string,
  { bits, shifts }: { bits: 32 | 64; shifts: readonly [number, number, number] },
): Recurrence {
  shifts.forEach((by, k) => {
    if (by === 0 || Math.abs(by) >= bits) {
      refuse(
        `xorshift.shifts.${k}`,
        `${by}`,
        `a shift from 1 to ${bits - 1}, or its negative for one to the right`,
      );
    }
  });
  const parts = {
    title: `xorshift of ${bits} bits, shifts ${shifts.join(", ")}`,
    method: "linear feedback",
    outputBits: bits,
    period: null,
    knownStructure: "linear over GF(2)",
  };
  const method = "G. Marsaglia, Xorshift RNGs, Journal of Statistical Software 8 (2003) 14";
  return xorshiftTriple(aboutOwn(id, parts, method), bits, shifts);
}
