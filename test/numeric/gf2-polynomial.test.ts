import fc from "fast-check";
import { describe, expect, test } from "vitest";
import {
  applyPolynomial,
  berlekampMassey,
  characteristicPolynomial,
  powerOfX,
  type LinearStep,
} from "../../src/numeric/gf2-polynomial.js";

/** A shift register with feedback x^16 + x^14 + x^13 + x^11 + 1, primitive of degree 16. */
const register: LinearStep = ([s = 0n]) => {
  const bit = (s ^ (s >> 2n) ^ (s >> 3n) ^ (s >> 5n)) & 1n;
  return [(s >> 1n) | (bit << 15n)];
};

function bitsOf(polynomial: bigint, count: number): (0 | 1)[] {
  const size = polynomial.toString(2).length - 1;
  const bits: (0 | 1)[] = Array.from({ length: size }, (_, k) => (k === size - 1 ? 1 : 0));
  while (bits.length < count) {
    let next = 0;
    for (let k = 0; k < size; k++) {
      if ((polynomial >> BigInt(k)) & 1n) next ^= bits[bits.length - size + k] ?? 0;
    }
    bits.push(next === 1 ? 1 : 0);
  }
  return bits;
}

describe("shortest recurrence of bits", () => {
  test("the recurrence that made a sequence is found again (irreducible polynomials of Lidl and Niederreiter, table C)", () => {
    for (const polynomial of [0b111n, 0b1011n, 0b10011n, 0b100101n, 0b1000011n, 0b10000011n]) {
      expect(berlekampMassey(bitsOf(polynomial, 40))).toBe(polynomial);
    }
  });

  test("a register of 16 bits shows its feedback polynomial and its full period", () => {
    const polynomial = characteristicPolynomial(register, [0xace1n], 16);
    expect(polynomial).toBe((1n << 16n) | 0b101101n);
    expect(powerOfX((1n << 16n) - 1n, polynomial)).toBe(1n);
    for (const prime of [3n, 5n, 17n, 257n]) {
      expect(powerOfX(((1n << 16n) - 1n) / prime, polynomial)).not.toBe(1n);
    }
  });
});

describe("jumps", () => {
  test("a jump equals as many single steps", () => {
    const polynomial = characteristicPolynomial(register, [1n], 16);
    fc.assert(
      fc.property(fc.nat(2000), fc.integer({ min: 1, max: 65535 }), (steps, start) => {
        let state: readonly bigint[] = [BigInt(start)];
        for (let k = 0; k < steps; k++) state = register(state);
        expect(applyPolynomial(powerOfX(BigInt(steps), polynomial), register, [BigInt(start)])).toEqual(
          state,
        );
      }),
      { numRuns: 40, seed: 5 },
    );
  });

  test("powers of x multiply: x^a x^b = x^(a + b), seen as jumps one after the other", () => {
    const polynomial = characteristicPolynomial(register, [1n], 16);
    fc.assert(
      fc.property(fc.bigInt(0n, 1n << 80n), fc.bigInt(0n, 1n << 80n), (a, b) => {
        const jump = (steps: bigint, state: readonly bigint[]): bigint[] =>
          applyPolynomial(powerOfX(steps, polynomial), register, state);
        expect(jump(b, jump(a, [0xace1n]))).toEqual(jump(a + b, [0xace1n]));
      }),
      { numRuns: 40, seed: 6 },
    );
  });
});
