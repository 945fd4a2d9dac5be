/**
 * The linear congruential generator x <- (a x + c) mod m of D. H. Lehmer, "Mathematical methods in large-scale
 * computing units", Proceedings of the Second Symposium on Large-Scale Digital Calculating Machinery, Harvard (1951)
 * 141-146; Knuth, The Art of Computer Programming, vol. 2, 3.2.1. Any modulus up to 2^64, multiplier and increment.
 *
 * Good for: knowing exactly what goes wrong. Tuples of outputs lie on a lattice whose planes can be named. Bad at:
 * everything whose integrand feels those planes, and low bits wherever the modulus is a power of two.
 *
 * Starting states: 0 ... m - 1 where there is an increment; where there is none, uniform over the states coprime to m
 * (odd ones for a power of two, 1 ... m - 1 for a prime). The published form of a state is x_0, which is not output.
 */
import type { FillWords, GeneratorExports } from "../kernels/generator-exports.js";
import { affinePower, applyAffine, type Affine } from "../numeric/affine.js";
import { coprime } from "../numeric/factor.js";
import { bitsOf, divisorOf, type Bits } from "./conversion.js";
import type { Key } from "./key.js";
import type { About, Recurrence } from "./pseudo-random.js";
import { countOf, digitalWords, units, type Digital, type StateSpace } from "./states.js";

/** Largest modulus that the kernels hold. */
export const LARGEST_MODULUS = 1n << 64n;

/** The generator of a map with 2 <= m <= 2^64 and 0 <= a, c < m (checked where a user writes them). */
export function congruential(about: About, map: Affine): Recurrence {
  const { multiplier, increment, modulus } = map;
  const multiplicative = increment === 0n;
  const { kernel, words } = reduction(map);
  const leap = affinePower(map, 4n);
  const first = multiplicative ? 1n : 0n;
  return {
    about,
    output: { modulus, bytes: 8, zeroless: multiplicative && coprime(multiplier, modulus), integers: 1 },
    stateFromKey: (key) => [multiplicative ? unit(key, modulus) : key.below(modulus)],
    stateFromText: (text) => {
      const x = /^\d+$/.test(text) ? BigInt(text) : -1n;
      if (x >= first && x < modulus) return [x];
      const allowed = `a whole number from ${first} to ${modulus - 1n}`;
      throw new RangeError(`state: expected ${allowed} for source "${about.id}", found "${text}"`);
    },
    linear: { multipliers: [multiplier], increment, modulus, note: null },
    constants: [multiplier, increment, leap.multiplier, leap.increment, ...words],
    kernel,
    *integers([x = 0n]) {
      for (;;) yield (x = applyAffine(map, x));
    },
    advance: ([x = 0n], steps) => [applyAffine(affinePower(map, steps), x)],
    states: (bits) => statesOf(about.id, map, bits),
  };
}

/** The kernel that reduces by this modulus, and the words m, P, Q of its state block (see the kernel's file). */
function reduction({ modulus }: Affine): {
  kernel: (exports: GeneratorExports) => FillWords;
  words: readonly [bigint, bigint, bigint];
} {
  const bits = BigInt(bitsOf(modulus));
  const deficit = (1n << bits) - modulus;
  if (deficit === 0n) return { kernel: (exports) => exports.fillPowerOfTwo, words: [0n, modulus - 1n, 0n] };
  if (bits <= 32n && deficit * (deficit + 3n) <= 1n << bits) {
    return { kernel: (exports) => exports.fillFolded, words: [modulus, bits, deficit] };
  }
  if (bits <= 32n) {
    const inverse = new BigUint64Array(new Float64Array([1 / Number(modulus)]).buffer);
    return { kernel: (exports) => exports.fillShort, words: [modulus, inverse[0] ?? 0n, 0n] };
  }
  const { scaled, reciprocal, shift } = divisorOf(modulus);
  return { kernel: (exports) => exports.fillGeneral, words: [scaled, reciprocal, shift] };
}

/** The states of a map; where only low bits of a power of two are used, they are a generator modulo a smaller one. */
function statesOf(id: string, map: Affine, bits: Bits | null): StateSpace {
  const lowest = bits?.end === "low" ? 1n << BigInt(bits.count) : 0n;
  const modulus = lowest > 0n && map.modulus % lowest === 0n ? lowest : map.modulus;
  const multiplier = map.multiplier % modulus;
  const increment = map.increment % modulus;
  if (!coprime(multiplier, modulus)) {
    throw new RangeError(
      `source "${id}": multiplier ${map.multiplier} and modulus ${map.modulus} have a common factor, so a run leaves some of its states for ever, and an average over all states is not one over its points`,
    );
  }
  const digits =
    map.increment === 0n ? units(modulus) : { constant: 0n, sizes: [modulus], weights: [1n], skipped: 0n };
  return {
    count: countOf(digits),
    output: { modulus, bytes: 8, zeroless: map.increment === 0n, integers: 1 },
    bits,
    open: (outputs, kernels) => {
      const rows = outputs.map((output): Digital => {
        const power = affinePower({ multiplier, increment, modulus }, output);
        return {
          constant: applyAffine(power, digits.constant),
          weights: digits.weights.map((weight) => (power.multiplier * weight) % modulus),
        };
      });
      return digitalWords(digits, rows, modulus, kernels);
    },
  };
}

/** A state coprime to m, by rejection: at least one in ten is, whatever m up to 2^64. */
function unit(key: Key, modulus: bigint): bigint {
  for (let attempt = 0; ; attempt++) {
    const x = (attempt === 0 ? key : key.derive(`attempt ${attempt}`)).below(modulus);
    if (coprime(x, modulus)) return x;
  }
}
