/** Users' programs in a study: started only with leave, and looked at before the long work begins. */
import { instantiateKernels } from "../kernels/instance.js";
import type { StudySpec } from "../record/types.js";
import { parseSource, type SourceChoice } from "../sources/choice.js";
import { programRefusal } from "../sources/draws/origin.js";
import { makeKey } from "../sources/key.js";

/** A look at a program takes one point of so many coordinates. */
const MOST_COORDINATES = 1000;

interface Program {
  readonly choice: SourceChoice;
  /** Coordinates that each of its runs in the study gives at least. */
  readonly coordinates: number;
}

/** The sources of a study that start programs, each once. */
function programsOf(spec: StudySpec): Program[] {
  const found = new Map<string, Program>();
  for (const { id, dimension } of spec.problems) {
    const least = Math.max(1, ...(spec.sizes[id] ?? [])) * dimension;
    for (const choice of (spec.sources[id] ?? []).map(parseSource)) {
      if (choice.source.program === undefined) continue;
      const coordinates = Math.min(least, found.get(choice.id)?.coordinates ?? MOST_COORDINATES);
      found.set(choice.id, { choice, coordinates });
    }
  }
  return [...found.values()];
}

/** Throws a RangeError with the command that would run where leave is missing. */
export function checkLeave(choices: readonly SourceChoice[], allowPrograms: boolean): void {
  for (const { id, source } of choices) {
    if (source.program !== undefined && !allowPrograms)
      throw new RangeError(programRefusal(id, source.program));
  }
}

/**
 * Refuses programs without leave; with it, starts each twice with the same seed. A program that cannot run is then known
 * at once, and one that gives other draws for the same seed is said.
 */
export function tryPrograms(spec: StudySpec, allowPrograms: boolean): string[] {
  const programs = programsOf(spec);
  checkLeave(
    programs.map(({ choice }) => choice),
    allowPrograms,
  );
  return programs.flatMap((program) => {
    if (opening(program, spec.seed) === opening(program, spec.seed)) return [];
    return [
      `${program.choice.id}: its program gives other draws for the same seed: the study cannot be repeated`,
    ];
  });
}

function opening({ choice, coordinates }: Program, seed: number): string {
  const kernels = instantiateKernels();
  const key = makeKey({ seed, purpose: "pilot", problem: "", source: choice.id, replicate: 0 });
  const stream = choice.open({ dimension: coordinates, n: 1, key, allowPrograms: true }, kernels);
  try {
    const pointer = kernels.arena.allocate(coordinates * 64);
    stream.fill(pointer, 8, 1);
    const rows = kernels.f64(pointer, coordinates * 8);
    return rows.filter((_, k) => k % 8 === 0).join(" ");
  } finally {
    stream.close?.();
  }
}
