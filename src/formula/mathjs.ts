/** mathjs, loaded when first needed (0.5 to 1.5 s) and only then. Main thread only. */
import type { MathJsInstance } from "mathjs";

let loaded: Promise<MathJsInstance> | undefined;

/**
 * An instance of our own. Arrays are plain; comparisons are exact: mathjs counts numbers within a relative 1e-12 as
 * equal by default, and 1e-17 is below half the spacing of doubles.
 */
export function loadMathjs(): Promise<MathJsInstance> {
  loaded ??= import("mathjs").then(({ all, create }) => {
    return create(all ?? {}, { matrix: "Array", number: "number", relTol: 1e-17, absTol: 0 });
  });
  return loaded;
}
