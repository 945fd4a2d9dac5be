/** The sections of an inspection, and one source taken through all of them. */
import type { SourceChoice } from "../sources/choice.js";
import type { InspectionRequest, Part, Section } from "./contract.js";
import { discrepancySection } from "./sections/discrepancy.js";
import { dualSection } from "./sections/dual.js";
import { equidistributionSection } from "./sections/equidistribution.js";
import { haltonSection } from "./sections/halton.js";
import { latticeQualitySection } from "./sections/lattice-quality.js";
import { netSection } from "./sections/net.js";
import { periodSection } from "./sections/period.js";

/** In the order of the output. */
const SECTIONS = {
  period: periodSection,
  dual: dualSection,
  equidistribution: equidistributionSection,
  latticeQuality: latticeQualitySection,
  net: netSection,
  halton: haltonSection,
  discrepancy: discrepancySection,
} as const;

type Sections = typeof SECTIONS;
export type SectionId = keyof Sections;

/** What each section found, where it applies. */
export type Findings = {
  readonly [Id in SectionId]?: Awaited<ReturnType<Sections[Id]["inspect"]>>;
};

export interface Inspection {
  readonly choice: SourceChoice;
  readonly findings: Findings;
  /** Tables and sentences of all sections. */
  readonly parts: readonly Part[];
  /** Why sections that a reader may have expected are missing. */
  readonly missing: readonly string[];
}

/** Throws RangeError or TypeError where a section cannot serve the request. */
export async function inspectSource(choice: SourceChoice, request: InspectionRequest): Promise<Inspection> {
  const findings: Record<string, object> = {};
  const parts: Part[] = [];
  const missing: string[] = [];
  for (const [id, section] of Object.entries<Section<object>>(SECTIONS)) {
    if (section.applies(choice)) {
      const data = await section.inspect(choice, request);
      findings[id] = data;
      parts.push(...section.show(data));
    } else {
      const why = section.otherwise(choice);
      if (why !== null) missing.push(why);
    }
  }
  return { choice, findings, parts, missing };
}

/** The JSON object of one source: what it is, and the keys of all sections. */
export function inspectionJson({ choice, findings, missing }: Inspection): object {
  const { source } = choice;
  return {
    source: choice.id,
    title: source.title,
    citation: source.citation,
    family: source.family,
    method: source.method,
    ...Object.values<object>(findings).reduce((all, data) => ({ ...all, ...data }), {}),
    notComputed: missing,
  };
}
