/** Covariance matrices of normal inputs: whether they are ones, what is nearest to them, and their factors. */
import { CholeskyDecomposition, EigenvalueDecomposition, Matrix } from "ml-matrix";

/** Smallest eigenvalue of a correlation matrix that is taken as positive. */
export const LEAST_EIGENVALUE = 1e-12;

/** Eigenvalues in descending order with their vectors, each with the sign that makes its sum positive. */
export interface Spectrum {
  readonly values: readonly number[];
  /** vectors[k][i]: component i of vector k. */
  readonly vectors: readonly (readonly number[])[];
}

export function spectrumOf(matrix: readonly (readonly number[])[]): Spectrum {
  const size = matrix.length;
  const found = new EigenvalueDecomposition(new Matrix(matrix.map((row) => [...row])), {
    assumeSymmetric: true,
  });
  const order = Array.from({ length: size }, (_, k) => k).sort(
    (a, b) => (found.realEigenvalues[b] ?? 0) - (found.realEigenvalues[a] ?? 0) || a - b,
  );
  const vectors = order.map((k) => {
    const vector = found.eigenvectorMatrix.getColumn(k);
    const sum = vector.reduce((total, x) => total + x, 0);
    // a sum of rounding errors alone leaves the sign to the first component that stands out
    const sign = Math.abs(sum) > 1e-8 ? sum : (vector.find((x) => Math.abs(x) > 1e-8) ?? 1);
    return vector.map((x) => (sign < 0 ? -x : x));
  });
  return { values: order.map((k) => found.realEigenvalues[k] ?? 0), vectors };
}

/** Lower triangular L with L L' = matrix. */
export function choleskyFactor(matrix: readonly (readonly number[])[]): number[][] {
  const found = new CholeskyDecomposition(new Matrix(matrix.map((row) => [...row])));
  if (!found.isPositiveDefinite()) throw new RangeError("the matrix is not positive definite");
  return found.lowerTriangularMatrix.to2DArray();
}

/** A with A A' = matrix, its columns the principal components by falling variance (Acworth, Broadie & Glasserman 1998). */
export function principalFactor(matrix: readonly (readonly number[])[]): number[][] {
  const { values, vectors } = spectrumOf(matrix);
  return matrix.map((_, i) =>
    vectors.map((vector, k) => (vector[i] ?? 0) * Math.sqrt(Math.max(0, values[k] ?? 0))),
  );
}

/**
 * A correlation matrix near `matrix` with eigenvalues of at least `floor`: alternating projections with Dykstra's
 * correction (N. J. Higham, "Computing the nearest correlation matrix", IMA J. Numerical Analysis 22 (2002) 329-343).
 */
export function nearestCorrelation(matrix: readonly (readonly number[])[], floor = 1e-3): number[][] {
  const size = matrix.length;
  let y = matrix.map((row) => [...row]);
  let correction = matrix.map((row) => row.map(() => 0));
  for (let round = 0; round < 200; round++) {
    const r = y.map((row, i) => row.map((x, j) => x - (correction[i]?.[j] ?? 0)));
    const { values, vectors } = spectrumOf(r);
    const x = r.map((_, i) =>
      r.map((__, j) =>
        vectors.reduce(
          (sum, vector, k) => sum + Math.max(floor, values[k] ?? 0) * (vector[i] ?? 0) * (vector[j] ?? 0),
          0,
        ),
      ),
    );
    correction = x.map((row, i) => row.map((value, j) => value - (r[i]?.[j] ?? 0)));
    const next = x.map((row, i) => row.map((value, j) => (i === j ? 1 : value)));
    const change = Math.max(
      ...next.flatMap((row, i) => row.map((value, j) => Math.abs(value - (y[i]?.[j] ?? 0)))),
    );
    y = next;
    if (change < 1e-9) break;
  }
  return Array.from({ length: size }, (_, i) =>
    Array.from({ length: size }, (__, j) => (i === j ? 1 : ((y[i]?.[j] ?? 0) + (y[j]?.[i] ?? 0)) / 2)),
  );
}
