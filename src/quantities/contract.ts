/** The contract of a quantity: what is asked of the values of an integrand, and how one replicate estimates it. */
import type { Moments } from "../estimators/moments.js";

/** What one replicate of n points says about a quantity. */
export interface QuantityEstimate {
  readonly estimate: number;
  /** n times the squared standard error that the replicate claims for itself; null where it cannot tell. */
  readonly withinVariance: number | null;
  /**
   * Range in which the finite-n bias of sound points lies, in units of the quantity: it holds 0, and reaches to twice the
   * leading term, of order 1/n. Null where the replicate cannot tell.
   */
  readonly finiteBias: readonly [number, number] | null;
}

interface Entry {
  readonly id: string;
  readonly title: string;
  readonly citation: string;
}

/** A mean: the estimators' own business. */
export interface PlainQuantity extends Entry {
  readonly by: "estimators";
}

/** A function of moments of the channels, which stream: memory does not grow with n. */
export interface MomentsQuantity extends Entry {
  readonly by: "moments";
  /** True where the squares (f - origin)^2 are a channel of their own, behind that of f. */
  readonly squares: boolean;
  /** Moments of n >= 2 points; `origin` is what was taken off before squaring. */
  estimate(moments: Moments, origin: number): QuantityEstimate;
}

/** A function of the sorted values, which are kept: 8 bytes a point. */
export interface SortedQuantity extends Entry {
  readonly by: "sorted";
  /** `sorted`: n >= 2 finite values, ascending; `level` in (0, 1). */
  estimate(sorted: Float64Array, level: number): QuantityEstimate;
}

export type QuantityKind = PlainQuantity | MomentsQuantity | SortedQuantity;

/** What a replicate with values that are not finite says. */
export const NOT_FINITE: QuantityEstimate = { estimate: NaN, withinVariance: null, finiteBias: null };

/** The range that holds 0 and all of `ends`. */
export function rangeOf(...ends: readonly number[]): readonly [number, number] {
  return [Math.min(0, ...ends), Math.max(0, ...ends)];
}
