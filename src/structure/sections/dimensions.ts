/** The dimensions asked for, as far as a source has them. */
import type { SourceChoice } from "../../sources/choice.js";
import type { InspectionRequest } from "../contract.js";

/**
 * Those up to `largest`; the largest itself where none of the usual ones is. Throws RangeError where the user asked for more, or for an
 * index beyond them.
 */
export function dimensionsFor({ id }: SourceChoice, request: InspectionRequest, largest: number): number[] {
  const beyond = request.dimensions.find((dimension) => dimension > largest);
  if (beyond !== undefined && request.dimensionsGiven) {
    throw new RangeError(`dimension: expected at most ${largest} for source "${id}", found ${beyond}`);
  }
  const index = request.indices?.find((candidate) => candidate >= largest);
  if (index !== undefined) {
    throw new RangeError(
      `indices: expected coordinates from 0 to ${largest - 1} for source "${id}", found ${index}`,
    );
  }
  const within = request.dimensions.filter((dimension) => dimension <= largest);
  return within.length === 0 ? [largest] : within;
}
