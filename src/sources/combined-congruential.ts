/**
 * Combinations of short congruential generators: what Wichmann and Hill's and L'Ecuyer's of 1988 share. Each component
 * moves by x <- a x mod m, m prime; starting states are uniform over 1 ... m - 1 in each; the published form is the
 * components, "1,2,3".
 */
import type { FillWords, GeneratorExports } from "../kernels/generator-exports.js";
import { powerMod } from "../numeric/factor.js";
import type { OutputWords } from "./conversion.js";
import { combined } from "./linear.js";
import { parseWords } from "./published-state.js";
import type { About, Recurrence, State } from "./pseudo-random.js";

interface Combined {
  readonly about: About;
  readonly components: readonly { readonly multiplier: bigint; readonly modulus: bigint }[];
  readonly output: OutputWords;
  /** The output of components after their step. */
  readonly combine: (state: State) => bigint;
  /** What outputs are beside the sum of the components' fractions; see `LinearRecurrence`. */
  readonly note: string | null;
  kernel(exports: GeneratorExports): FillWords;
}

export function combinedCongruential(generator: Combined): Recurrence {
  const { about, components, output, combine } = generator;
  const advance = (state: State, words: bigint): State =>
    components.map(
      ({ multiplier, modulus }, k) => (powerMod(multiplier, words, modulus) * (state[k] ?? 0n)) % modulus,
    );
  const limits = components.map(({ modulus }) => modulus);
  return {
    about,
    output,
    stateFromKey: (key) => limits.map((modulus, k) => 1n + key.derive(`word ${k}`).below(modulus - 1n)),
    stateFromText: (text) =>
      parseWords(text, {
        id: about.id,
        words: limits.map((below) => ({ least: 1n, below })),
        allowed: `${limits.length} words from 1, below ${limits.join(", ")}, like "${limits.map((_, k) => k + 1).join(",")}",`,
      }),
    linear: combined(
      components.map(({ multiplier, modulus }) => ({ multipliers: [multiplier], modulus })),
      generator.note,
    ),
    kernel: (exports) => generator.kernel(exports),
    *integers(start) {
      for (let state = advance(start, 1n); ; state = advance(state, 1n)) yield combine(state);
    },
    advance,
  };
}
