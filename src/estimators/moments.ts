/** The moments of a set of points: count, sum of each channel, and the centred products of each pair of channels. */

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

/** Centred product of channels i <= j: the sum of (f_i - mean_i) (f_j - mean_j). */
export function centredProduct({ channels, values }: Moments, i: number, j: number): number {
  return values[channels + i * channels - (i * (i - 1)) / 2 + (j - i)] as number;
}
