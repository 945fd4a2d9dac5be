/** Inspections as charts and the page see them: each with the look of its source. */
import type { RecordSource } from "../record/types.js";
import type { Inspection } from "../structure/inspection.js";
import type { Slice } from "../structure/slice.js";
import { viewSources, type SourceView } from "./view.js";

export interface Inspected {
  readonly source: RecordSource;
  readonly inspection: Inspection;
  /** Points along the planes of its worst dimension; null where there are no planes that could be seen. */
  readonly slice: Slice | null;
  /** t of the pairs of coordinates of a net, as `PairTValues` has them; null for other sources. */
  readonly pairs: Uint8Array | null;
}

export interface InspectedView extends Omit<Inspected, "source"> {
  readonly view: SourceView;
}

export function viewInspections(inspected: readonly Inspected[]): InspectedView[] {
  const views = viewSources(inspected.map(({ source }) => source));
  return inspected.flatMap(({ source: _, ...found }, k) => {
    const view = views[k];
    return view === undefined ? [] : [{ view, ...found }];
  });
}
