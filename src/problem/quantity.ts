/** What a problem may ask of its integrand: names, levels, and what the integrand must give for each point. */
import type { Problem, Quantity } from "./contract.js";

interface QuantityForm {
  /** A number, a condition, or a vector of two numbers. */
  readonly integrand: "number" | "condition" | "pair";
  /** True where a level between 0 and 1 belongs to it. */
  readonly level: boolean;
  /** True where every value is kept and sorted. */
  readonly sorted: boolean;
}

export const QUANTITIES = {
  mean: { integrand: "number", level: false, sorted: false },
  probability: { integrand: "condition", level: false, sorted: false },
  ratio: { integrand: "pair", level: false, sorted: false },
  variance: { integrand: "number", level: false, sorted: false },
  quantile: { integrand: "number", level: true, sorted: true },
  shortfall: { integrand: "number", level: true, sorted: true },
} as const satisfies Record<string, QuantityForm>;

export type QuantityId = keyof typeof QUANTITIES;

/** Values that are kept for sorting at most: 128 MB for each thread. */
export const MOST_SORTED = 2 ** 24;

export function quantityId(quantity: Quantity): QuantityId {
  if (typeof quantity === "string") return quantity;
  return "quantile" in quantity ? "quantile" : "shortfall";
}

export function quantityForm(quantity: Quantity): QuantityForm {
  return QUANTITIES[quantityId(quantity)];
}

/** The level of a quantile or shortfall; NaN for what has none. */
export function levelOf(quantity: Quantity): number {
  if (typeof quantity === "string") return NaN;
  return "quantile" in quantity ? quantity.quantile : quantity.shortfall;
}

/** True for means and probabilities, which all estimators, explanations and measurements of budgets are about. */
export function isMean(quantity: Quantity): boolean {
  return quantity === "mean" || quantity === "probability";
}

/** As reports name it and as the output of a record: "mean", "quantile 0.99". */
export function quantityName(quantity: Quantity): string {
  return typeof quantity === "string" ? quantity : `${quantityId(quantity)} ${levelOf(quantity)}`;
}

/** The title of a problem with its quantity behind it, where that is not the mean that goes without saying. */
export function titleWithQuantity({ title, quantity }: Pick<Problem, "title" | "quantity">): string {
  return quantity === "mean" ? title : `${title}: ${quantityName(quantity)}`;
}
