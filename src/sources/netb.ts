/**
 * Streams of digital sequences in any base from 2 to 127, natural order, plain or randomised as those in base 2 (./net2):
 * `digital-shift`, `linear` (lower triangular matrices with a non-zero diagonal) and `owen`. A point has K digits, K the
 * largest with b^K <= 2^52, and stands at the midpoint (N + 1/2) / b^K.
 */
import type { Matrix } from "ml-matrix";
import type { Kernels } from "../kernels/instance.js";
import type { OpenRequest, PointStream, Seekable, Source } from "./contract.js";
import type { Key } from "./key.js";
import { checkIndex, checkOpening } from "./quasi-random.js";

/** The number of digits K in base b. */
export function digitsIn(base: number): number {
  let digits = 0;
  for (let power = base; power <= 2 ** 52; power *= base) digits++;
  return digits;
}

/** Opens a stream over nets with the generating matrices (K rows, K columns) `matrices`. */
export function openNetB(
  source: Source,
  base: number,
  matrices: readonly Matrix[],
  request: OpenRequest,
  kernels: Kernels,
): PointStream & Seekable {
  const randomisation = checkOpening(source, request);
  const { dimension } = request;
  const { arena, exports } = kernels;
  const digits = digitsIn(base);
  const bytes = 16 * Math.ceil(digits / 16);
  const size = bytes * (digits + 2);
  const records = arena.allocate(size * dimension);
  const weights = arena.allocate(digits * 8);
  kernels.f64(weights, digits).set(Array.from({ length: digits }, (_, r) => base ** (digits - 1 - r)));
  const memory = new Uint8Array(exports.memory.buffer, records, size * dimension).fill(0);
  for (const [j, matrix] of matrices.slice(0, dimension).entries()) {
    const used =
      randomisation?.name === "linear"
        ? scrambleMatrix(matrix, base, randomisation.key.derive(`linear ${j}`))
        : matrix;
    for (let r = 0; r < digits; r++) {
      for (let k = 0, sum = 0; k < digits; k++) {
        sum = (sum + used.get(r, k)) % base;
        memory[j * size + (k + 2) * bytes + r] = sum;
      }
    }
    if (randomisation !== null && randomisation.name !== "owen") {
      const shift = draws(randomisation.key.derive(`digital-shift ${j}`), digits, base);
      memory.set(shift, j * size + bytes);
    }
  }
  let keys = 0;
  if (randomisation?.name === "owen") {
    keys = arena.allocate(dimension * 8);
    kernels.u64(keys, dimension).set(randomisation.key.derive("owen").words64(dimension));
  }

  let index = 0;
  const seek = (to: number): void => {
    checkIndex(source, to);
    exports.netbSeek(records, dimension, base, digits, to);
    index = to;
  };
  seek(0);
  return {
    dimension,
    seek,
    fill(pointer, stride, count) {
      checkIndex(source, index, count);
      exports.netbFill(records, dimension, base, digits, weights, keys, index, pointer, stride, count);
      index += count;
    },
  };
}

/** `count` numbers uniform on 0...base - 1 (bias below 2^-56). */
function draws(key: Key, count: number, base: number): number[] {
  return Array.from(key.words64(count), (word) => Number(word % BigInt(base)));
}

/** L times the matrix modulo the base, L random, lower triangular, with a diagonal of 1...base - 1. */
function scrambleMatrix(matrix: Matrix, base: number, key: Key): Matrix {
  const { rows } = matrix;
  const below = draws(key.derive("below"), rows * rows, base);
  const diagonal = draws(key.derive("diagonal"), rows, base - 1);
  const product = matrix.clone();
  for (let r = 0; r < rows; r++) {
    for (let k = 0; k < matrix.columns; k++) {
      let sum = ((diagonal[r] ?? 0) + 1) * matrix.get(r, k);
      for (let i = 0; i < r; i++) sum += (below[r * rows + i] ?? 0) * matrix.get(i, k);
      product.set(r, k, sum % base);
    }
  }
  return product;
}
