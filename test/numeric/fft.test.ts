import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { CyclicCorrelation, Fft } from "../../src/numeric/fft.js";

const value = fc.double({ min: -1, max: 1, noNaN: true });

function reversed(k: number, bits: number): number {
  let out = 0;
  for (let bit = 0; bit < bits; bit++) out |= ((k >> bit) & 1) << (bits - 1 - bit);
  return out;
}

describe("Fft", () => {
  it("equals the sum that defines it, in bit-reversed order", () => {
    fc.assert(
      fc.property(fc.nat(6), fc.infiniteStream(value), (bits, stream) => {
        const size = 2 ** bits;
        const re = Float64Array.from({ length: size }, () => stream.next().value as number);
        const im = Float64Array.from({ length: size }, () => stream.next().value as number);
        const [outRe, outIm] = [re.slice(), im.slice()];
        new Fft(size).forward(outRe, outIm);
        for (let k = 0; k < size; k++) {
          let sumRe = 0;
          let sumIm = 0;
          for (let j = 0; j < size; j++) {
            const angle = (-2 * Math.PI * ((j * k) % size)) / size;
            sumRe += (re[j] ?? NaN) * Math.cos(angle) - (im[j] ?? NaN) * Math.sin(angle);
            sumIm += (re[j] ?? NaN) * Math.sin(angle) + (im[j] ?? NaN) * Math.cos(angle);
          }
          expect(outRe[reversed(k, bits)]).toBeCloseTo(sumRe, 12);
          expect(outIm[reversed(k, bits)]).toBeCloseTo(sumIm, 12);
        }
      }),
      { numRuns: 40, seed: 1 },
    );
  });

  it("is undone by the inverse up to the factor size", () => {
    const size = 4096;
    const re = Float64Array.from({ length: size }, (_, j) => Math.sin(j * j));
    const im = Float64Array.from({ length: size }, (_, j) => Math.cos(3 * j));
    const [backRe, backIm] = [re.slice(), im.slice()];
    const fft = new Fft(size);
    fft.forward(backRe, backIm);
    fft.inverse(backRe, backIm);
    for (let j = 0; j < size; j++) {
      expect(Math.abs((backRe[j] ?? NaN) / size - (re[j] ?? NaN))).toBeLessThan(1e-14);
      expect(Math.abs((backIm[j] ?? NaN) / size - (im[j] ?? NaN))).toBeLessThan(1e-14);
    }
  });
});

describe("CyclicCorrelation", () => {
  it("equals the double sum for any length", () => {
    const vectors = fc.integer({ min: 1, max: 70 }).chain((length) => {
      const vector = fc.array(value, { minLength: length, maxLength: length });
      return fc.tuple(vector, vector);
    });
    fc.assert(
      fc.property(vectors, ([fixed, vector]) => {
        const length = fixed.length;
        const out = new Float64Array(length);
        const correlation = new CyclicCorrelation(Float64Array.from(fixed));
        correlation.correlate(Float64Array.from(vector), out);
        for (let t = 0; t < length; t++) {
          const sum = vector.reduce((total, v, i) => total + v * (fixed[(i + t) % length] ?? NaN), 0);
          expect(Math.abs((out[t] ?? NaN) - sum)).toBeLessThan(1e-12);
        }
      }),
      { numRuns: 100, seed: 2 },
    );
  });
});
