/**
 * The moments of a set of points: count, sum of each channel, and the centred products of each pair of channels.
 *
 * Two sets are merged by the pairwise update of T. F. Chan, G. H. Golub and R. J. LeVeque, "Algorithms for computing
 * the sample variance", The American Statistician 37 (1983) 242-247, eq. (1.5), extended to products. A merge is a
 * plain function of its two operands, so a tree of merges has the same bits wherever it is computed.
 */

export interface Moments {
  readonly n: number;
  readonly channels: number;
  /** channels sums, then channels (channels + 1) / 2 centred products in the order (0,0), (0,1), ..., (1,1), ... */
  readonly values: Float64Array;
}

/** Numbers in a row of moments: k sums and k (k + 1) / 2 products. */
export function momentsWidth(channels: number): number {
  return channels + (channels * (channels + 1)) / 2;
}

/** Moments of the union of two disjoint sets. */
export function mergeMoments(a: Moments, b: Moments): Moments {
  const k = a.channels;
  const values = new Float64Array(momentsWidth(k));
  const weight = (a.n * b.n) / (a.n + b.n);
  let at = k;
  for (let c = 0; c < k; c++) {
    values[c] = entry(a, c) + entry(b, c);
    const deltaC = entry(b, c) / b.n - entry(a, c) / a.n;
    for (let e = c; e < k; e++, at++) {
      const deltaE = entry(b, e) / b.n - entry(a, e) / a.n;
      values[at] = entry(a, at) + entry(b, at) + deltaC * deltaE * weight;
    }
  }
  return { n: a.n + b.n, channels: k, values };
}

function entry(moments: Moments, index: number): number {
  return moments.values[index] as number;
}

/** Mean of channel `c`. */
export function channelMean(moments: Moments, c = 0): number {
  return entry(moments, c) / moments.n;
}

/** Variance of channel 0 (divisor n - 1), or null for a single point. */
export function channelVariance(moments: Moments): number | null {
  return moments.n > 1 ? entry(moments, moments.channels) / (moments.n - 1) : null;
}
