/** The file that `tolerand new NAME` writes: a problem with comments that runs as it is. */
import { writeFile } from "node:fs/promises";
import { basename, extname } from "node:path";
import { DEFAULT_SETTINGS, DEFAULT_SIZES_TEXT } from "./defaults.js";
import { fileError } from "./errors.js";

/** The text of a new problem called `name`. */
export function problemTemplate(name: string): string {
  const { sources, replicates, falseAlarms, seed } = DEFAULT_SETTINGS;
  return `# A problem for tolerand. Check it:  tolerand check ${name}.yaml
#                          Run it:    tolerand study ${name}.yaml

title: Floor on the mean of twelve monthly outputs

# Random inputs, each "uniform" on (0, 1) or standard "normal"; with a length it is a vector.
inputs:
  z: { distribution: normal, length: 12 }

# Numbers, vectors [1, 2, 3] and matrices [[1, 2], [3, 4]]. A text is a formula of those before it.
constants:
  expected: 100
  guaranteed: 95
  deviation: "0.2 * expected"

# The integrand: assignments, then the value on the last line. \`tolerand functions\` lists what it may use.
integrand: |
  output = expected + deviation * z
  max(guaranteed - mean(output), 0)

# What is asked of it: mean, probability, ratio, variance, { quantile: 0.99 } or { shortfall: 0.975 }.
# quantity: mean

# The exact value if it is known: digits, or a formula of the constants. Without it, three sound sources of different
# families must agree, and their mean stands in.
reference:
  value: |
    s = deviation / sqrt(12)
    gap = guaranteed - expected
    gap * normalCdf(gap / s) + s * normalPdf(gap / s)
  basis: The mean of 12 independent normal outputs is normal; E max(k - X, 0) for a normal X by integration.

# The largest acceptable error, and how surely: absolute, or relative to the reference ({ relative: 1e-3 }).
tolerance: { absolute: 0.01, confidence: 0.99 }

# What production does today; the verdict is then about it.
# inUse: { source: mt19937, points: 100000 }

# Settings of the study. These are the defaults; a flag on the command line comes first.
# study:
#   sources: [${sources.map((source) => (typeof source === "string" ? source : JSON.stringify(source))).join(", ")}]
#   sizes: ${DEFAULT_SIZES_TEXT}
#   replicates: ${replicates}
#   falseAlarms: ${falseAlarms}
#   seed: ${seed}
`;
}

/**
 * Writes a new file `NAME.yaml` with the text that `template` gives for its name, and returns its path. Throws
 * ProblemError where the file exists already or cannot be written.
 */
export async function writeNew(
  given: string,
  template: (name: string, path: string) => string,
): Promise<string> {
  const path = [".yaml", ".yml"].includes(extname(given)) ? given : `${given}.yaml`;
  const text = template(basename(path, extname(path)), path);
  try {
    await writeFile(path, text, { flag: "wx" });
  } catch (error) {
    const code = error instanceof Error && "code" in error ? String(error.code) : "unknown error";
    const why = code === "EEXIST" ? "exists already and is not overwritten" : `cannot be written (${code})`;
    throw fileError(path, `${why}; choose another name`);
  }
  return path;
}
