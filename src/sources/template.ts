/** The file that `tolerand new NAME --kind source` writes: a source of the user's own, with comments, usable as it is. */
import { DRAW_FORMATS, FORMATS } from "./draws/formats.js";

/** The text of a new source called `name`, from a file called `file`. */
export function sourceTemplate(name: string, file: string): string {
  const formats = DRAW_FORMATS.map((format) => `#   ${format.padEnd(6)} ${FORMATS[format].title}`);
  return `# A source of your own for tolerand.
#   See its points:  tolerand points @${file} --dimension 2
#   Study it:        tolerand study tour --source @${file} --sources pcg64,sobol+owen

# Its name in reports; it is part of the source, and no source of the program has it.
name: ${name}

# The generator. Exactly one of the six that follow; whole numbers may be formulas in quotes.

# x <- (multiplier x + increment) mod modulus
congruential: { modulus: "2^31 - 1", multiplier: 16807, increment: 0 }

# x(i) = (a1 x(i-1) + a2 x(i-2) + ...) mod modulus
# recursive: { modulus: "2^31 - 1", multipliers: [107374182, 0, 0, 0, 104480] }

# three shifts and exclusive ors, positive to the left and negative to the right
# xorshift: { bits: 64, shifts: [13, -7, 17] }

# a pseudo-random source of the program, used in another way (\`tolerand sources\` lists them)
# source: mt19937

# draws from a file or a FIFO, relative to the working folder; each replicate takes the next stretch
# draws: { file: draws.bin, format: u32le }

# draws that a program writes to its standard output. It is started once for each replicate, with its seed in the
# environment variable TOLERAND_SEED, only with --allow-programs, and with your rights.
# draws: { program: [./generator, --fast], format: u64le }
#
# Formats:
${formats.join("\n")}

# How outputs become points.
#   successive      point i, coordinate j is output i d + j
#   strided k       every k-th output
#   per-coordinate  one separately started stream for each coordinate
tuples: successive

# An output of b bits, k, becomes (k + 1/2) / 2^b (middle) or k / 2^b (left, which hits 0).
endpoint: middle

# Bits of an output that are used: all, "top b" or "low b".
bits: all

# true: each coordinate is rounded to single precision, as code does that keeps it in a float.
float32: false

# Where replicates start.
#   uniform-state   each from a random valid state
#   published       from the published seeds 1, 2, 3, ...; or { published: { base: 1000, stride: 1 } }
seeding: uniform-state

# Instead of seeding: the one state that production uses. The study then shows its one error, without an error bar.
# state: 12345

# Quasi-random sources of your own are described by a vector or by matrices, without the keys above:
#   name: ${name}
#   lattice: { vector: [1, 182667, 469891] }     or     matrices: { base: 2, rows: [[[1, 0], [0, 1]]] }
#                                            or weights: { product: [1, 0.5] } in the place of vector
#   randomisation: shift
`;
}
