/** From what a user writes to a source that can be opened: an id, an id with randomisations, or a mapping. */
import type { Kernels } from "../kernels/instance.js";
import { nearest } from "../numeric/nearest.js";
import type { SourceSpec } from "../problem/contract.js";
import { checkCapacity } from "./capacity.js";
import type { OpenRequest, OpenStream, Randomisation, Source } from "./contract.js";
import { isOwnQuasiRandom, parseOwnQuasiRandom } from "./own-quasi-random.js";
import { parseOwnSource } from "./own-source.js";
import { acceptedRandomisations, checkRandomisations } from "./randomisations.js";
import { findSource, sourceIds } from "./registry.js";

/** What a stream of a choice is opened with; see `OpenRequest`. */
export type ChoiceRequest = Omit<OpenRequest, "randomisations">;

/** A source with its randomisations, as chosen by a user. */
export interface SourceChoice {
  /** Canonical id, randomisations included: "sobol+owen", or the user's own name. */
  readonly id: string;
  readonly source: Source;
  readonly randomisations: readonly Randomisation[];
  /** True for an unrandomised quasi-random source and for one given starting state: one error, no error bar. */
  readonly deterministic: boolean;
  /** What `parseSource` was given; serialisable, and parsed again it gives the same choice. */
  readonly spec: SourceSpec;
  /** Throws where dimension or n is out of the source's range, or a key is missing. */
  open(request: ChoiceRequest, kernels: Kernels): OpenStream;
}

/** The source that `spec` names. Throws with what was found, what is allowed and the nearest known id. */
export function parseSource(spec: SourceSpec): SourceChoice {
  if (typeof spec === "string") return parseId(spec);
  if (typeof spec === "object" && spec !== null && !Array.isArray(spec)) return parseMapping(spec);
  throw new TypeError(`source: expected an id like "mt19937" or a mapping, found ${JSON.stringify(spec)}`);
}

/**
 * What `--sources all` stands for: every source that can be repeated, a quasi-random one with each of its randomisations
 * alone. An unrandomised one has no error bar and is left out.
 */
export function comparableSources(): string[] {
  return sourceIds().flatMap((id) => {
    const source = findSource(id);
    if (source === undefined || source.repeatable === false) return [];
    if (source.randomisations.length === 0) return [id];
    return acceptedRandomisations(source)
      .filter((names) => names.length === 1)
      .map(([name]) => `${id}+${name}`);
  });
}

function parseMapping(spec: Readonly<Record<string, unknown>>): SourceChoice {
  if (!isOwnQuasiRandom(spec)) return choose(parseOwnSource(spec), [], spec);
  const { source, randomisations } = parseOwnQuasiRandom(spec);
  return choose(source, randomisations, spec);
}

/** An id may itself hold "+" (xoshiro256++), so the longest id that the text begins with is the source. */
function parseId(text: string): SourceChoice {
  const id = sourceIds()
    .filter((candidate) => text === candidate || text.startsWith(`${candidate}+`))
    .reduce((longest, candidate) => (candidate.length > longest.length ? candidate : longest), "");
  const source = findSource(id);
  if (source === undefined) throw new RangeError(unknownSource(text));
  const names = text === id ? [] : text.slice(id.length + 1).split("+");
  const randomisations = checkRandomisations(source, names);
  return choose(source, randomisations, [id, ...randomisations].join("+"));
}

function unknownSource(text: string): string {
  const guess = nearest(text, sourceIds()) ?? nearest(text.split("+")[0] ?? "", sourceIds());
  const proposal = guess === null ? "" : ` did you mean "${guess}"?`;
  return `source: unknown source "${text.slice(0, 60)}";${proposal} "tolerand sources" lists what there is`;
}

function choose(source: Source, randomisations: readonly Randomisation[], spec: SourceSpec): SourceChoice {
  return {
    id: [source.id, ...randomisations].join("+"),
    source,
    randomisations,
    deterministic: source.fixed === true || (source.randomisations.length > 0 && randomisations.length === 0),
    spec,
    open: (request, kernels) => {
      checkCapacity(source, request.dimension, request.n);
      return source.open({ ...request, randomisations }, kernels);
    },
  };
}
