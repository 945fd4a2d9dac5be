/** The table of quantities, by the names of problem/quantity.ts. */
import type { Quantity } from "../problem/contract.js";
import { quantityId, type QuantityId } from "../problem/quantity.js";
import type { QuantityKind } from "./contract.js";
import { mean } from "./mean.js";
import { probability } from "./probability.js";
import { quantile } from "./quantile.js";
import { ratio } from "./ratio.js";
import { shortfall } from "./shortfall.js";
import { variance } from "./variance.js";

const QUANTITIES = { mean, probability, ratio, variance, quantile, shortfall } satisfies Record<
  QuantityId,
  QuantityKind
>;

/** How the quantity of a problem is estimated. */
export function quantityKind(quantity: Quantity): QuantityKind {
  return QUANTITIES[quantityId(quantity)];
}
