/** The table of estimators. Help texts and checks of problem files come from it. */
import type { Estimator } from "./contract.js";
import { crude } from "./crude.js";

const ESTIMATORS = { crude } satisfies Record<string, Estimator>;

export type EstimatorId = keyof typeof ESTIMATORS;

export const estimatorIds = Object.keys(ESTIMATORS) as EstimatorId[];

/** The estimator called `id`. Throws a RangeError that lists the known ones. */
export function estimatorOf(id: string): Estimator {
  if (Object.hasOwn(ESTIMATORS, id)) return ESTIMATORS[id as EstimatorId];
  throw new RangeError(`estimators: expected one of ${estimatorIds.join(", ")}, found "${id}"`);
}
