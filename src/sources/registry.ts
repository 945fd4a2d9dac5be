/** The table of all sources. Listings, help texts, docs tables, `parseSource` and the shared test laws come from it. */
import type { Source, SourceDescription } from "./contract.js";
import { faure } from "./faure.js";
import { halton, haltonLeaped } from "./halton.js";
import { hammersley } from "./hammersley.js";
import { interlaced2, interlaced3 } from "./interlaced.js";
import { korobov } from "./korobov.js";
import { kronecker, kroneckerGolden } from "./kronecker.js";
import { latticeSequence } from "./lattice-sequence.js";
import { lattice } from "./lattice.js";
import {
  drand48,
  lcg1103515245,
  lcg1664525,
  lcg6364136223846793005,
  lcg69069,
  lrand48,
  mrand48,
} from "./lcg-binary.js";
import {
  lcg1226874159,
  lcg1343714438,
  lcg1583458089,
  lcg62089911,
  lcg742938285,
  lcg784588716,
  lcg950706376,
} from "./lcg-prime.js";
import { lecuyer1988 } from "./lecuyer1988.js";
import { mt19937x64 } from "./mt19937-64.js";
import { knuthArray, knuthSubtractive } from "./knuth.js";
import { r250 } from "./r250.js";
import {
  ranlux0,
  ranlux1,
  ranlux2,
  ranlux24,
  ranlux24Base,
  ranlux3,
  ranlux4,
  ranlux48,
  ranlux48Base,
} from "./ranlux.js";
import { kiss64, kiss99, mwc } from "./kiss.js";
import { philox4x64 } from "./philox4x64.js";
import { threefry4x64 } from "./threefry4x64.js";
import { chacha20, chacha8 } from "./chacha.js";
import { minstd16807, minstd48271 } from "./minstd.js";
import { mrg32k3a } from "./mrg32k3a.js";
import { mt19937 } from "./mt19937.js";
import { niederreiter } from "./niederreiter.js";
import { pcg32 } from "./pcg32.js";
import { pcg64Dxsm } from "./pcg64-dxsm.js";
import { pcg64 } from "./pcg64.js";
import { philox4x32 } from "./philox4x32.js";
import { polynomialLattice } from "./polynomial-lattice.js";
import { randu } from "./randu.js";
import { sfc64 } from "./sfc64.js";
import { sobol, sobolNatural } from "./sobol.js";
import { splitMix64 } from "./splitmix64.js";
import { latinHypercube, stratified } from "./stratified.js";
import { lfsr113, taus88 } from "./tausworthe.js";
import { mathRandom, system } from "./unrepeatable.js";
import { wichmannHill } from "./wichmann-hill.js";
import { xoroshiro128Plus, xoroshiro128PlusPlus, xoroshiro128StarStar } from "./xoroshiro128.js";
import { xorshift128, xorshift32, xorshift64Star } from "./xorshift.js";
import { xoshiro256Plus, xoshiro256PlusPlus, xoshiro256StarStar } from "./xoshiro256.js";

/** Every id, in the order of listings; an id without an entry in the table does not compile. */
export type SourceId =
  | "randu"
  | "minstd-16807"
  | "minstd-48271"
  | "lcg-742938285"
  | "lcg-950706376"
  | "lcg-1226874159"
  | "lcg-62089911"
  | "lcg-1343714438"
  | "lcg-1583458089"
  | "lcg-784588716"
  | "lcg-69069"
  | "lcg-1103515245"
  | "lcg-1664525"
  | "lcg-6364136223846793005"
  | "drand48"
  | "lrand48"
  | "mrand48"
  | "wichmann-hill"
  | "lecuyer1988"
  | "mrg32k3a"
  | "knuth-subtractive"
  | "knuth-array"
  | "r250"
  | "ranlux-0"
  | "ranlux-1"
  | "ranlux-2"
  | "ranlux-3"
  | "ranlux-4"
  | "ranlux24-base"
  | "ranlux24"
  | "ranlux48-base"
  | "ranlux48"
  | "mwc"
  | "kiss99"
  | "kiss64"
  | "mt19937"
  | "mt19937-64"
  | "taus88"
  | "lfsr113"
  | "xorshift32"
  | "xorshift64*"
  | "xorshift128"
  | "xoroshiro128+"
  | "xoroshiro128++"
  | "xoroshiro128**"
  | "xoshiro256+"
  | "xoshiro256++"
  | "xoshiro256**"
  | "pcg32"
  | "pcg64"
  | "pcg64-dxsm"
  | "sfc64"
  | "splitmix64"
  | "philox4x32"
  | "philox4x64"
  | "threefry4x64"
  | "chacha8"
  | "chacha20"
  | "system"
  | "math-random"
  | "sobol"
  | "sobol-natural"
  | "niederreiter"
  | "faure"
  | "polynomial-lattice"
  | "interlaced-2"
  | "interlaced-3"
  | "halton"
  | "halton-leaped"
  | "hammersley"
  | "lattice"
  | "lattice-sequence"
  | "korobov"
  | "kronecker"
  | "kronecker-golden"
  | "latin-hypercube"
  | "stratified";

const sources: Readonly<Record<SourceId, Source>> = {
  randu,
  "minstd-16807": minstd16807,
  "minstd-48271": minstd48271,
  "lcg-742938285": lcg742938285,
  "lcg-950706376": lcg950706376,
  "lcg-1226874159": lcg1226874159,
  "lcg-62089911": lcg62089911,
  "lcg-1343714438": lcg1343714438,
  "lcg-1583458089": lcg1583458089,
  "lcg-784588716": lcg784588716,
  "lcg-69069": lcg69069,
  "lcg-1103515245": lcg1103515245,
  "lcg-1664525": lcg1664525,
  "lcg-6364136223846793005": lcg6364136223846793005,
  drand48,
  lrand48,
  mrand48,
  "wichmann-hill": wichmannHill,
  lecuyer1988,
  mrg32k3a,
  "knuth-subtractive": knuthSubtractive,
  "knuth-array": knuthArray,
  r250,
  "ranlux-0": ranlux0,
  "ranlux-1": ranlux1,
  "ranlux-2": ranlux2,
  "ranlux-3": ranlux3,
  "ranlux-4": ranlux4,
  "ranlux24-base": ranlux24Base,
  ranlux24,
  "ranlux48-base": ranlux48Base,
  ranlux48,
  mwc,
  kiss99,
  kiss64,
  mt19937,
  "mt19937-64": mt19937x64,
  taus88,
  lfsr113,
  xorshift32,
  "xorshift64*": xorshift64Star,
  xorshift128,
  "xoroshiro128+": xoroshiro128Plus,
  "xoroshiro128++": xoroshiro128PlusPlus,
  "xoroshiro128**": xoroshiro128StarStar,
  "xoshiro256+": xoshiro256Plus,
  "xoshiro256++": xoshiro256PlusPlus,
  "xoshiro256**": xoshiro256StarStar,
  pcg32,
  pcg64,
  "pcg64-dxsm": pcg64Dxsm,
  sfc64,
  splitmix64: splitMix64,
  philox4x32,
  philox4x64,
  threefry4x64,
  chacha8,
  chacha20,
  system,
  "math-random": mathRandom,
  sobol,
  "sobol-natural": sobolNatural,
  niederreiter,
  faure,
  "polynomial-lattice": polynomialLattice,
  "interlaced-2": interlaced2,
  "interlaced-3": interlaced3,
  halton,
  "halton-leaped": haltonLeaped,
  hammersley,
  lattice,
  "lattice-sequence": latticeSequence,
  korobov,
  kronecker,
  "kronecker-golden": kroneckerGolden,
  "latin-hypercube": latinHypercube,
  stratified,
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
