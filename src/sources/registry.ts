/** The table of all sources. Listings, help texts, docs tables, `parseSource` and the shared test laws come from it. */
import type { Source, SourceDescription } from "./contract.js";
import { halton } from "./halton.js";
import { kronecker } from "./kronecker.js";
import { lattice } from "./lattice.js";
import { minstd16807, minstd48271 } from "./minstd.js";
import { mt19937 } from "./mt19937.js";
import { pcg64 } from "./pcg64.js";
import { philox4x32 } from "./philox4x32.js";
import { randu } from "./randu.js";
import { sobol } from "./sobol.js";
import { xoshiro256PlusPlus } from "./xoshiro256.js";

/** Every id, in the order of listings; an id without an entry in the table does not compile. */
export type SourceId =
  | "randu"
  | "minstd-16807"
  | "minstd-48271"
  | "mt19937"
  | "xoshiro256++"
  | "pcg64"
  | "philox4x32"
  | "sobol"
  | "halton"
  | "lattice"
  | "kronecker";

const sources: Readonly<Record<SourceId, Source>> = {
  randu,
  "minstd-16807": minstd16807,
  "minstd-48271": minstd48271,
  mt19937,
  "xoshiro256++": xoshiro256PlusPlus,
  pcg64,
  philox4x32,
  sobol,
  halton,
  lattice,
  kronecker,
};

export function isSourceId(id: string): id is SourceId {
  return Object.hasOwn(sources, id);
}

/** The source of this id; undefined where there is none. */
export function findSource(id: string): Source | undefined {
  return isSourceId(id) ? sources[id] : undefined;
}

export function sourceIds(): readonly SourceId[] {
  return Object.keys(sources) as SourceId[];
}

/** What every source says of itself, in the order of listings. */
export function listSources(): readonly SourceDescription[] {
  return Object.values(sources);
}
