/**
 * Fast Fourier transform (J. W. Cooley and J. W. Tukey, Mathematics of Computation 19, 1965, 297-301) and cyclic
 * correlation by it. The forward transform works by decimation in frequency and leaves its output in bit-reversed order,
 * which the inverse one, by decimation in time, takes as it is: a product of spectra needs no reordering.
 */

/** Transforms of one size, a power of two; real and imaginary parts in two arrays, in place. */
export class Fft {
  readonly size: number;
  /** exp(-2 pi i k / s), k = 0...s/2 - 1, for s = 2, 4, ..., size one after the other: those of s begin at s/2 - 1. */
  readonly #cos: Float64Array;
  readonly #sin: Float64Array;

  constructor(size: number) {
    this.size = size;
    this.#cos = new Float64Array(size);
    this.#sin = new Float64Array(size);
    for (let half = 1; half < size; half *= 2) {
      for (let k = 0; k < half; k++) {
        this.#cos[half - 1 + k] = Math.cos((Math.PI * k) / half);
        this.#sin[half - 1 + k] = -Math.sin((Math.PI * k) / half);
      }
    }
  }

  /** X_k = sum of x_j exp(-2 pi i j k / size), in bit-reversed order of k. */
  forward(re: Float64Array, im: Float64Array): void {
    const cos = this.#cos;
    const sin = this.#sin;
    for (let half = this.size >> 1; half >= 1; half >>= 1) {
      for (let first = 0; first < this.size; first += 2 * half) {
        for (let k = 0; k < half; k++) {
          const a = first + k;
          const b = a + half;
          const c = cos[half - 1 + k] ?? 0;
          const s = sin[half - 1 + k] ?? 0;
          const re0 = re[a] ?? 0;
          const im0 = im[a] ?? 0;
          const re1 = re[b] ?? 0;
          const im1 = im[b] ?? 0;
          re[a] = re0 + re1;
          im[a] = im0 + im1;
          re[b] = (re0 - re1) * c - (im0 - im1) * s;
          im[b] = (re0 - re1) * s + (im0 - im1) * c;
        }
      }
    }
  }

  /** `size` times the inverse of `forward`. */
  inverse(re: Float64Array, im: Float64Array): void {
    const cos = this.#cos;
    const sin = this.#sin;
    for (let half = 1; half < this.size; half <<= 1) {
      for (let first = 0; first < this.size; first += 2 * half) {
        for (let k = 0; k < half; k++) {
          const a = first + k;
          const b = a + half;
          const c = cos[half - 1 + k] ?? 0;
          const s = -(sin[half - 1 + k] ?? 0);
          const re0 = re[a] ?? 0;
          const im0 = im[a] ?? 0;
          const re1 = (re[b] ?? 0) * c - (im[b] ?? 0) * s;
          const im1 = (re[b] ?? 0) * s + (im[b] ?? 0) * c;
          re[a] = re0 + re1;
          im[a] = im0 + im1;
          re[b] = re0 - re1;
          im[b] = im0 - im1;
        }
      }
    }
  }
}

/** Cyclic correlation of any real vector with one fixed real vector of the same length L (any length from 1). */
export class CyclicCorrelation {
  readonly #length: number;
  readonly #fft: Fft;
  /** Spectrum of the fixed vector, divided by the size of the transform. */
  readonly #fixedRe: Float64Array;
  readonly #fixedIm: Float64Array;
  readonly #re: Float64Array;
  readonly #im: Float64Array;

  constructor(fixed: Float64Array) {
    const length = fixed.length;
    // Lengths other than powers of two: the fixed vector is continued periodically over 2 L - 1 places, so that no sum wraps.
    const powerOfTwo = 2 ** Math.ceil(Math.log2(length)) === length;
    const size = powerOfTwo ? length : 2 ** Math.ceil(Math.log2(2 * length - 1));
    this.#length = length;
    this.#fft = new Fft(size);
    this.#re = new Float64Array(size);
    this.#im = new Float64Array(size);
    this.#fixedRe = new Float64Array(size);
    this.#fixedIm = new Float64Array(size);
    const filled = powerOfTwo ? length : 2 * length - 1;
    for (let j = 0; j < filled; j++) this.#fixedRe[j] = (fixed[j % length] ?? 0) / size;
    this.#fft.forward(this.#fixedRe, this.#fixedIm);
  }

  /** out[t] = sum over i of vector[i] fixed[(i + t) mod L]; `out` has length L. */
  correlate(vector: Float64Array, out: Float64Array): void {
    const re = this.#re.fill(0);
    const im = this.#im.fill(0);
    re.set(vector);
    this.#fft.forward(re, im);
    for (let k = 0; k < re.length; k++) {
      const a = re[k] ?? 0;
      const b = -(im[k] ?? 0);
      const c = this.#fixedRe[k] ?? 0;
      const d = this.#fixedIm[k] ?? 0;
      re[k] = a * c - b * d;
      im[k] = a * d + b * c;
    }
    this.#fft.inverse(re, im);
    out.set(re.subarray(0, this.#length));
  }
}
