/** The summary: the answers and the verdict tables in Markdown (CommonMark with tables), for reading and for diffs. */
import { formatCount } from "../findings/format.js";
import { plainText } from "./text-table.js";
import { type VerdictRow, referenceWords, toleranceWords, verdictRows } from "./verdict-row.js";
import type { Subject, View } from "./view.js";

/** A user's text in Markdown: no markup, no line breaks. */
function escapeMarkdown(text: string): string {
  return plainText(text).replace(/[\\`*_{}[\]<>()#+!|~&]/g, "\\$&");
}

/** A code span that holds any text: fenced by more backticks than the text has in a row. */
function code(text: string): string {
  const longest = Math.max(0, ...(text.match(/`+/g) ?? []).map((run) => run.length));
  const fence = "`".repeat(longest + 1);
  return longest > 0 ? `${fence} ${text} ${fence}` : `${fence}${text}${fence}`;
}

function tableRow(r: VerdictRow): string {
  const cells = [`${r.shape} ${r.word}`, r.row.label, r.n, r.total, r.largestLine, r.reach, r.cost];
  return `| ${cells.map(escapeMarkdown).join(" | ")} |`;
}

function subjectPart(subject: Subject): string[] {
  return [
    `## ${escapeMarkdown(subject.title)}`,
    "",
    escapeMarkdown([subject.inUseSentence ?? "", subject.answer, ...subject.biases].join(" ").trim()),
    "",
    escapeMarkdown(
      `d ${formatCount(subject.problem.dimension)}, reference ${referenceWords(subject)}, tolerance ${toleranceWords(subject)}.`,
    ),
    "",
    "| Verdict | Source | at n | Total error | Largest line | n to tolerance | Cost |",
    "| :-- | :-- | --: | --: | :-- | --: | --: |",
    ...verdictRows(subject).map(tableRow),
    "",
  ];
}

/** The text of summary.md. */
export function summary(view: View, title: string): string {
  const { environment, spec, specDigest, digest, warnings, family } = view.record;
  const lines = [
    `# ${escapeMarkdown(title)}`,
    "",
    ...(environment.complete ? [] : ["The run was interrupted; this holds what was done until then.", ""]),
    ...view.subjects.flatMap(subjectPart),
    "## Provenance",
    "",
    `- Command: ${code(plainText(environment.command))}`,
    `- Seed ${spec.seed}; ${formatCount(family.tests)} tests of bias and spread in one family at level ${family.level}`,
    `- Specification SHA-256 ${specDigest}`,
    `- Estimates SHA-256 ${digest}`,
    `- ${escapeMarkdown(`tolerand ${environment.program}, Node ${environment.node}, ${environment.platform}`)}`,
    ...warnings.map((text) => `- Warning: ${escapeMarkdown(text)}`),
    "",
  ];
  return lines.join("\n");
}
