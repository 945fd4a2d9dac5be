/**
 * What `inspect` is made of: sections, one file each, that find something out about a source and say it in tables. A section
 * is a pure function from a source and a request to plain data; texts are made from the data alone, so that JSON, terminal
 * and page say the same. A new section is a file in `sections/` and a line in `inspection.ts`.
 */
import type { SourceChoice } from "../sources/choice.js";

/** What is asked about a source. What a section has no use for it passes over. */
export interface InspectionRequest {
  /** Numbers of coordinates, ascending, each at least 2. */
  readonly dimensions: readonly number[];
  /** Whether the user asked for these, so that one which a source does not have is an error and not left out. */
  readonly dimensionsGiven: boolean;
  /** Points of one estimate or of the point set; null where nothing was said. */
  readonly points: number | null;
  /** Independent runs of that many points. */
  readonly streams: number;
  /** The source's own starting state, in its published form. */
  readonly state: string | null;
  /** An index set: which outputs (or coordinates), 0-based, ascending. */
  readonly indices: readonly number[] | null;
  /** Index sets of the worst projections lie below this index. */
  readonly span: number;
  /** Where discrepancies of the points are asked for: what the points are drawn with. */
  readonly discrepancy?: { readonly seed: number; readonly allowPrograms: boolean };
}

export interface Column {
  readonly title: string;
  readonly align: "left" | "right";
}

/** Cells are texts, for terminals and pages alike. */
export interface Table {
  readonly columns: readonly Column[];
  readonly rows: readonly (readonly string[])[];
}

/** One heading with what stands under it. */
export interface Part {
  readonly title: string;
  /** Sentences before the table. */
  readonly lines: readonly string[];
  readonly table: Table | null;
  /** Conventions and limits, behind the table. */
  readonly notes: readonly string[];
}

/** A section of an inspection. `Data` holds its keys of the JSON object of a source; bigints are written as decimal strings. */
export interface Section<Data extends object> {
  applies(choice: SourceChoice): boolean;
  /** Why it does not apply, in a sentence, where a reader may have expected it; null where that goes without saying. */
  otherwise(choice: SourceChoice): string | null;
  /** Throws RangeError or TypeError for a request that this source cannot serve, with what is allowed. */
  inspect(choice: SourceChoice, request: InspectionRequest): Data | Promise<Data>;
  show(data: Data): readonly Part[];
}
