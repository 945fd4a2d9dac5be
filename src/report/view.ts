/**
 * What a report shows, found in a record once: subjects (a problem's output) with one row per source and estimator.
 * Nothing is computed here; everything is looked up.
 */
import { titleWithQuantity } from "../problem/quantity.js";
import type {
  BiasTest,
  Budget,
  Cell,
  Consensus,
  Convergence,
  RecordSource,
  StudyRecord,
} from "../record/types.js";
import { answerOf } from "../findings/answer.js";
import { biasSentences, headlinesOf, spreadSentences } from "../findings/headline.js";
import { type KnownReference, referencesOf, toleranceOf } from "../findings/reference.js";
import type { Explanation } from "../record/explanation.js";
import type { Sensitivity } from "../record/sensitivity.js";
import type { Problem } from "../problem/contract.js";
import { FAMILIES, type FamilyLook, type Ink } from "./look.js";

/** A source as a report draws it. */
export interface SourceView {
  readonly source: RecordSource;
  /** Number of the source in the record; names it in the page's markup. */
  readonly index: number;
  /** Anchor in the page. */
  readonly slug: string;
  readonly family: FamilyLook;
  readonly ink: Ink;
}

/** One source (and estimator) on one subject. */
export interface Row {
  readonly view: SourceView;
  readonly estimator: string;
  /** The source's id, with the estimator where there are several. */
  readonly label: string;
  /** In increasing order of n. */
  readonly cells: readonly Cell[];
  /** The cell of the largest n, or null. */
  readonly last: Cell | null;
  readonly test: BiasTest | null;
  readonly convergence: Convergence | null;
  /** What the structure of the source does to the integrand, or could do. */
  readonly explanation: Explanation | null;
  /** The budget of the comparison, not of what is in use. */
  readonly budget: Budget | null;
}

/** One output of one problem. */
export interface Subject {
  readonly problem: Problem;
  readonly output: string;
  /** Anchor in the page and stem of its chart files; letters, digits and hyphens. */
  readonly slug: string;
  readonly title: string;
  readonly consensus: Consensus | null;
  /** What estimates are held against, or null. */
  readonly reference: KnownReference | null;
  /** Absolute tolerance, or null where it is not known. */
  readonly tolerance: number | null;
  readonly confidence: number;
  readonly rows: readonly Row[];
  /** The budget of what is in use, or null. */
  readonly inUse: Budget | null;
  /** What is said of what is in use, or null where nothing is stated to be. */
  readonly inUseSentence: string | null;
  /** The answer in one sentence. */
  readonly answer: string;
  /** Which inputs matter; null where it was not asked. */
  readonly sensitivity: Sensitivity | null;
  /** What the tests of bias and of spread found, in sentences. */
  readonly biases: readonly string[];
}

/** A row whose bias the structure of its source was asked about, with a prediction. */
export interface ExplainedRow {
  readonly subject: Subject;
  readonly row: Row;
  readonly explanation: Explanation;
  /** Anchor is `why-` and this; the stem of its chart files too. */
  readonly slug: string;
}

export interface View {
  readonly record: StudyRecord;
  readonly subjects: readonly Subject[];
  readonly sources: readonly SourceView[];
  readonly explained: readonly ExplainedRow[];
}

/** Distinct anchors and file stems from names: lower-case letters, digits and hyphens, numbered where they collide. */
export function slugs(names: readonly string[]): string[] {
  const taken = new Set<string>();
  return names.map((name) => {
    const plain =
      name
        .toLowerCase()
        .replace(/[^a-z0-9]+/g, "-")
        .replace(/^-+|-+$/g, "")
        .slice(0, 60) || "unnamed";
    let slug = plain;
    for (let i = 2; taken.has(slug); i++) slug = `${plain}-${i}`;
    taken.add(slug);
    return slug;
  });
}

/** Sources with their looks and anchors, in order. */
export function viewSources(sources: readonly RecordSource[]): SourceView[] {
  const anchors = slugs(sources.map((source) => source.id));
  const seen = new Map<string, number>();
  return sources.map((source, index) => {
    const family = FAMILIES[source.family];
    const rank = seen.get(source.family) ?? 0;
    seen.set(source.family, rank + 1);
    const step = family.inks[rank % family.inks.length] ?? family.inks[0];
    return { source, index, slug: anchors[index] ?? "", family, ink: step };
  });
}

function subjectRows(
  record: StudyRecord,
  problem: string,
  output: string,
  sources: readonly SourceView[],
): Row[] {
  const here = <T extends { problem: string; output: string }>(all: readonly T[]): T[] =>
    all.filter((item) => item.problem === problem && item.output === output);
  const cells = here(record.cells);
  const [tests, convergence, budgets] = [here(record.tests), here(record.convergence), here(record.budgets)];
  const explanations = here(record.explanations);
  const estimators = [...new Set(cells.map((cell) => cell.estimator))];
  const rows: Row[] = [];
  for (const view of sources) {
    for (const estimator of estimators) {
      const mine = (item: { source: string; estimator: string }): boolean =>
        item.source === view.source.id && item.estimator === estimator;
      const own = cells.filter(mine).sort((a, b) => a.n - b.n);
      if (own.length === 0) continue;
      rows.push({
        view,
        estimator,
        label: estimators.length > 1 ? `${view.source.id}, ${estimator}` : view.source.id,
        cells: own,
        last: own[own.length - 1] ?? null,
        test: tests.find(mine) ?? null,
        convergence: convergence.find(mine) ?? null,
        explanation: explanations.find(mine) ?? null,
        budget: budgets.find((budget) => !budget.inUse && mine(budget)) ?? null,
      });
    }
  }
  return rows;
}

/** Finds in `record` what a report shows. */
export function viewRecord(record: StudyRecord): View {
  const sources = viewSources(record.sources);
  const references = referencesOf(record.problems, record.consensus);
  const headlines = headlinesOf(record);
  const pairs = record.problems.flatMap((problem) => {
    const outputs = new Set(record.cells.filter((c) => c.problem === problem.id).map((c) => c.output));
    return (outputs.size === 0 ? [""] : [...outputs]).map((output) => ({
      problem,
      output,
      alone: outputs.size < 2,
    }));
  });
  const anchors = slugs(pairs.map((p) => (p.alone ? p.problem.id : `${p.problem.id}-${p.output}`)));
  const subjects = pairs.map(({ problem, output, alone }, i): Subject => {
    const rows = subjectRows(record, problem.id, output, sources);
    const budgets = record.budgets.filter((b) => b.problem === problem.id && b.output === output);
    const consensus = record.consensus.find((c) => c.problem === problem.id) ?? null;
    const reference = references.get(problem.id) ?? null;
    return {
      problem,
      output,
      slug: anchors[i] ?? "",
      title: alone ? titleWithQuantity(problem) : `${problem.title}: ${output}`,
      consensus,
      reference,
      tolerance: toleranceOf(problem, reference ?? undefined),
      confidence: problem.tolerance.confidence,
      rows,
      inUse: budgets.find((budget) => budget.inUse) ?? null,
      inUseSentence: headlines.find((one) => one.problem === problem.id)?.inUse?.sentence ?? null,
      answer: answerOf(problem, output, record),
      sensitivity: record.sensitivity.find((s) => s.problem === problem.id && s.output === output) ?? null,
      biases: [...biasSentences(problem, record), ...spreadSentences(problem, record)],
    };
  });
  return { record, subjects, sources, explained: explainedRows(subjects) };
}

function explainedRows(subjects: readonly Subject[]): ExplainedRow[] {
  return subjects.flatMap((subject) =>
    subject.rows.flatMap((row): ExplainedRow[] => {
      const { explanation } = row;
      if (explanation === null || explanation.predicted === null) return [];
      return [{ subject, row, explanation, slug: `${subject.slug}-${row.view.slug}` }];
    }),
  );
}
