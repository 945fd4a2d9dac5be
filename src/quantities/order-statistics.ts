/**
 * Order statistics of one replicate: the sample quantile that interpolates at (n + 1) p (R. J. Hyndman and Y. Fan, The
 * American Statistician 50 (1996) 361-365, definition 6: E F(x) = p for independent points of any continuous law), and
 * differences of it for the derivatives of the quantile function.
 */
/** With fewer expected values than this on either side of a level its derivatives mean nothing. */
export const FEWEST_BEYOND = 10;

/** The sample quantile at `p`; the smallest or largest value where (n + 1) p lies beyond them. */
export function sampleQuantile(sorted: Float64Array, p: number): number {
  const n = sorted.length;
  const place = Math.min(n, Math.max(1, (n + 1) * p));
  const below = Math.floor(place);
  const low = sorted[below - 1] as number;
  const high = sorted[Math.min(n, below + 1) - 1] as number;
  return low + (place - below) * (high - low);
}

/** True where at least `FEWEST_BEYOND` of n values are expected on either side of `p`. */
export function isResolved(n: number, p: number): boolean {
  return n * Math.min(p, 1 - p) >= FEWEST_BEYOND;
}

/**
 * Q'(p), the sparsity, by a central difference. Its half width is m / (n m)^(1/4), m = min(p, 1 - p), at most m / 2:
 * between the n^(-1/5) of the smallest mean square error (E. Bofinger, Australian Journal of Statistics 17 (1975) 1-7) and
 * the n^(-1/3) of the best coverage (P. Hall and S. J. Sheather, Journal of the Royal Statistical Society B 50 (1988)
 * 381-391), with square roots alone, which every platform rounds alike.
 */
export function sparsity(sorted: Float64Array, p: number): number {
  const nearer = Math.min(p, 1 - p);
  const width = nearer * Math.min(0.5, 1 / Math.sqrt(Math.sqrt(sorted.length * nearer)));
  return (sampleQuantile(sorted, p + width) - sampleQuantile(sorted, p - width)) / (2 * width);
}

/** Q''(p) by a second difference over half the way to the nearer end. */
export function curvature(sorted: Float64Array, p: number): number {
  const width = Math.min(p, 1 - p) / 2;
  const [below, at, above] = [p - width, p, p + width].map((u) => sampleQuantile(sorted, u));
  return ((above ?? NaN) - 2 * (at ?? NaN) + (below ?? NaN)) / width ** 2;
}
