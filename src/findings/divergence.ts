/**
 * Integrands without a finite variance, for which every interval and test here means nothing. Three signs are asked for
 * together: the tail index a of |f| (Hill 1975) lies below 2 by more than two of its standard errors, a / sqrt(k); the
 * same index from the k/4 largest values lies below 2 as well; and the sample variance still grows with the number of
 * points, its median over replicates by at least half of what such a tail makes it, n^(2/a - 1), over the last three
 * doublings, where so many were run. A narrow peak has a heavy tail too as long as most points miss it, but its tail ends
 * [a Gaussian peak that one point in 900 meets: index 1.5, growth n^0.11 where 1.5 would make it n^0.36].
 */
import { fitLine } from "../numeric/least-squares.js";
import type { ProblemMeasurements } from "../record/measurements.js";
import type { RawCell, RecordSource } from "../record/types.js";
import { formatValue } from "./format.js";

/** By problem id, in words. */
export function divergentProblems(
  measurements: readonly Pick<ProblemMeasurements, "problem" | "tail">[],
  rawCells: readonly RawCell[],
  sources: ReadonlyMap<string, RecordSource>,
): ReadonlyMap<string, string> {
  const found = new Map<string, string>();
  for (const { problem, tail } of measurements) {
    if (tail === null || tail.index === null) continue;
    const error = tail.index / Math.sqrt(tail.order);
    if (!(tail.index + 2 * error < 2) || !((tail.further ?? Infinity) < 2)) continue;
    const growth = growthOf(rawCells.filter((cell) => cell.problem === problem && isFit(cell, sources)));
    if (growth !== null && !(growth > (2 / Math.max(1, tail.index) - 1) / 2)) continue;
    const grows = growth === null ? "" : ` and the sample variance grows as n^${formatValue(growth)}`;
    found.set(
      problem,
      `no finite variance: the tail index of |f| is ${formatValue(tail.index, error)} ` +
        `(standard error ${formatValue(error)}; a variance needs more than 2)${grows}; intervals and tests are withdrawn`,
    );
  }
  return found;
}

function isFit(cell: RawCell, sources: ReadonlyMap<string, RecordSource>): boolean {
  const source = sources.get(cell.source);
  return cell.estimator === "crude" && source?.family === "pseudo-random" && source.knownStructure === null;
}

/** Exponent of the growth of the median variance over the last three doublings of n; null with too few sizes. */
function growthOf(cells: readonly RawCell[]): number | null {
  const bySize = new Map<number, number[]>();
  for (const { n, withinVariances } of cells) {
    const known = withinVariances.filter((value) => value !== null && value > 0) as number[];
    bySize.set(n, [...(bySize.get(n) ?? []), ...known]);
  }
  const largest = Math.max(...bySize.keys());
  const points = [...bySize].filter(([n, values]) => values.length >= 8 && n >= largest / 8.5);
  const sizes = points.map(([n]) => Math.log(n));
  if (points.length < 3 || Math.max(...sizes) - Math.min(...sizes) < 3 * Math.LN2 - 1e-9) return null;
  const medians = points.map(([, values]) => {
    const sorted = [...values].sort((a, b) => a - b);
    return Math.log(sorted[Math.floor((sorted.length - 1) / 2)] ?? NaN);
  });
  return fitLine(
    sizes,
    medians,
    sizes.map(() => 1),
  ).slope;
}
