/** The words of the command line, in one place; tests hold them word for word. */

export const usage = [
  "tolerand measures, explains and budgets the error of Monte Carlo and quasi-Monte Carlo integration.",
  "",
  "  tolerand study tour          see it work: a dozen sources on six integrands, with a report",
  "  tolerand new season          your formula: a commented file to begin with",
  "  tolerand check season.yaml   what the program understands of it",
  "  tolerand study season.yaml   run it, judge it against its tolerance",
  "  tolerand sources             the generators and sequences there are",
  "",
  "  tolerand --help lists every command, tolerand COMMAND --help its flags.",
  "",
].join("\n");

export const messages = {
  unknownCommand: (found: string, near: string | null, known: readonly string[]) =>
    `command: expected one of ${known.join(", ")}, found "${found}"${proposal(near)}`,
  unknownFlag: (command: string, found: string, near: string | null) =>
    `--${found}: not a flag of "tolerand ${command}"${proposal(near && `--${near}`)}; see tolerand ${command} --help`,
  internal: (message: string) =>
    `internal error: ${message}\nThis is a fault of the program, not of your input. Run again with TOLERAND_TRACE=1 to see where it happened.`,
  wholeNumber: (flag: string, least: number, found: string) =>
    `--${flag}: expected a whole number of at least ${least}, found "${found}"`,
  positive: (flag: string, found: string) => `--${flag}: expected a number above 0, found "${found}"`,
  untilOnce: (source: string) =>
    `--until: each look begins the points anew, but the draws of "${source}" pass by once; study it without --until`,
  noWeights:
    "--total: a weighted sum needs weights; give a folder whose suite.yaml has total: { weights: { PROBLEM: 1 }, tolerance: { absolute: 1 } }",
  oneRecord: (found: number) =>
    `paths: expected one record, or problems without records, found ${found} paths; plan them one at a time`,
  interrupted: (folder: string, command: string) =>
    `Interrupted. What is done stands in ${folder}.\nNext: ${command}${command.includes(" --resume") ? "" : " --resume"}\n`,
  cycleInterrupted: (file: string, command: string) =>
    `Interrupted. The states that are done stand in ${file}.\nNext: ${command}   (the same command goes on from there)\n`,
  unfinished: (folder: string) =>
    `--out: ${folder} holds an unfinished run of this study; go on with --resume, or start anew with --replace`,
  otherJournal: (folder: string) =>
    `--resume: ${folder} holds an unfinished run of another study (other problems, sources, sizes or seed); choose another folder with --out, or give it up with --replace`,
  otherStudy: (folder: string) =>
    `--out: ${folder} holds the record of another study and is not overwritten; choose another folder with --out, or overwrite it with --replace`,
  oneProblem: (path: string, found: readonly string[]) =>
    `problem: expected one problem, found ${found.length} in "${path}"; name one of them: ${found.slice(0, 6).join(", ")}`,
  leftOut: (warnings: readonly string[]) => `--source: ${warnings.join(" ")} Name a source that has them.`,
  meansOnly: (problem: string, quantity: string) =>
    `quantity: explanations are of means and probabilities, found ${quantity} in "${problem}"; take it out of a copy of the problem to explain the mean of its integrand`,
  needsSource: (flag: string, problem: string) =>
    `--${flag}: expected a source beside it, found none; name one with --source, or leave --${flag} out to see which inputs of "${problem}" matter`,
  dimensions: (most: number, found: string) =>
    `--dimensions: expected whole numbers from 2 to ${most} such as 2..16, 8 or 2,3,6, found "${found}"`,
  indices: (most: number, found: string) =>
    `--indices: expected at most ${most} whole numbers from 0 such as 0,1,5, found "${found}"`,
  repeatedIndex: (repeated: number, found: string) =>
    `--indices: expected indices that differ, found ${repeated} twice in "${found}"`,
  nothingToInspect: (id: string, why: readonly string[]) =>
    `source: nothing can be said about the structure of "${id}" (${why.join("; ")}); tolerand study measures what it does`,
  probe: (source: string, planes: string, gap: number, error: number) =>
    `Tuples of ${source} lie on planes of ${planes}, ${Number(gap.toPrecision(3))} apart; predicted error ${error > 0 ? "+" : "−"}${Math.abs(Number((100 * error).toPrecision(3)))} % of the integral.\n`,
  probeUnseen: (source: string, planes: string, least: number) =>
    `source "${source}": its own points do not stand on the planes of ${planes} as its recurrence says (least cosine ${Number(least.toPrecision(3))}, expected 1); no probe is written`,
  studyFolder: (folder: string) =>
    `--out: ${folder} holds the report of a study and is not overwritten; choose another folder`,
  cannotWrite: (folder: string, why: string) =>
    `--out: cannot write to ${folder} (${why}); choose another folder`,
  next: (text: string) => `Next: ${text}\n`,
};

function proposal(near: string | null): string {
  return near === null ? "" : `; did you mean ${near}?`;
}
