/**
 * The user's own quasi-random source, as a mapping in a problem file or inline on the command line:
 *
 *     { name: house, lattice: { vector: [1, 182667, 469891] }, randomisation: shift+tent }
 */
import { parseInteger } from "../numeric/integer-formula.js";
import { nearest } from "../numeric/nearest.js";
import type { Randomisation, Source } from "./contract.js";
import { ownLattice } from "./lattice.js";
import { checkRandomisations } from "./randomisations.js";
import { isSourceId } from "./registry.js";

type Mapping = Readonly<Record<string, unknown>>;

/** A source that a mapping describes, and the randomisations it asks for. */
export interface OwnQuasiRandom {
  readonly source: Source;
  readonly randomisations: readonly Randomisation[];
}

/** How each kind of mapping is read: its own key, and what stands below it. */
const kinds: Readonly<Record<string, (name: string, body: Mapping) => Source>> = { lattice: latticeOf };

/** The kind of quasi-random source that a mapping describes; undefined for another mapping. */
function kindOf(written: Mapping): string | undefined {
  return Object.keys(kinds).find((kind) => Object.hasOwn(written, kind));
}

export function isOwnQuasiRandom(written: Mapping): boolean {
  return kindOf(written) !== undefined;
}

/** Throws TypeError or RangeError with the key, what was found and what is allowed. */
export function parseOwnQuasiRandom(written: Mapping): OwnQuasiRandom {
  const kind = kindOf(written) ?? "";
  checkKeys("source", written, ["name", kind, "randomisation"]);
  const { name, randomisation = "" } = written;
  if (typeof name !== "string" || !/^[A-Za-z0-9][A-Za-z0-9_.-]{0,39}$/.test(name)) {
    const allowed = "1 to 40 letters, digits, dots, dashes or underscores, beginning with a letter or digit";
    throw new TypeError(`source.name: expected ${allowed}, found ${found(name)}`);
  }
  if (isSourceId(name)) {
    throw new RangeError(`source.name: expected a name that no source of the program has, found "${name}"`);
  }
  if (typeof randomisation !== "string") {
    throw new TypeError(`source.randomisation: expected a text like "shift", found ${found(randomisation)}`);
  }
  const source = kinds[kind]?.(name, mappingAt(`source.${kind}`, written[kind]));
  if (source === undefined) throw new TypeError("source: expected a mapping with a quasi-random source");
  const names = randomisation === "" ? [] : randomisation.split("+");
  return { source, randomisations: checkRandomisations(source, names) };
}

function latticeOf(name: string, body: Mapping): Source {
  checkKeys("source.lattice", body, ["vector"]);
  const { vector } = body;
  if (!Array.isArray(vector) || vector.length === 0) {
    throw new TypeError(`source.lattice.vector: expected a list of whole numbers, found ${found(vector)}`);
  }
  return ownLattice(
    name,
    vector.map((component: unknown, j) => parseInteger(component, `source.lattice.vector[${j + 1}]`)),
  );
}

function mappingAt(key: string, value: unknown): Mapping {
  if (typeof value === "object" && value !== null && !Array.isArray(value)) return value as Mapping;
  throw new TypeError(`${key}: expected a mapping, found ${found(value)}`);
}

function checkKeys(key: string, written: Mapping, known: readonly string[]): void {
  const unknown = Object.keys(written).find((name) => !known.includes(name));
  if (unknown === undefined) return;
  const guess = nearest(unknown, known);
  const proposal = guess === null ? "" : `, did you mean "${guess}"?`;
  throw new TypeError(`${key}: unknown key "${unknown}"${proposal}; allowed are ${known.join(", ")}`);
}

function found(value: unknown): string {
  return value === undefined ? "nothing" : JSON.stringify(value).slice(0, 60);
}
