/** Integrands of null studies with exact means, drawn by the tests' own generator; from harmless to badly skewed. */
import type { NullCase } from "./null-harness.js";
import { makeProblem, makeSource, normals, uniforms } from "../findings/make.js";

/** A null case that can draw one estimate from n points. */
export interface DrawnCase extends NullCase {
  draw(seed: number): number;
}

const pseudoRandom = makeSource("philox4x32");
const scrambled = makeSource("sobol+owen", {
  family: "quasi-random",
  period: null,
  randomisations: ["owen"],
});

function drawnCase(
  id: string,
  value: number,
  n: number,
  draw: (seed: number) => number,
  { indicator = false, source = pseudoRandom } = {},
): DrawnCase {
  const problem = makeProblem(id, { reference: { value, text: "", uncertainty: 0, basis: "closed form" } });
  return { problem, source, n, indicator, draw };
}

/** Estimates that are exactly normal, mean 1. */
export function gaussian(id = "gaussian"): DrawnCase {
  return drawnCase(id, 1, 256, (seed) => 1 + normals(seed)() / 16);
}

/** Mean of n values exp(scale z), skewness of f (e^(s^2) + 2) sqrt(e^(s^2) - 1): 6.2 for scale 1. */
export function lognormal(scale: number, n: number, id = `lognormal-${scale}`): DrawnCase {
  return drawnCase(id, Math.exp((scale * scale) / 2), n, (seed) => {
    const normal = normals(seed);
    let total = 0;
    for (let i = 0; i < n; i++) total += Math.exp(scale * normal());
    return total / n;
  });
}

/** Number of hits among n trials of probability p, by the gaps between them (geometric law). */
function hitsOf(uniform: () => number, n: number, p: number): number {
  const scale = 1 / Math.log1p(-p);
  let hits = 0;
  for (let at = Math.floor(Math.log(uniform()) * scale); at < n; hits++) {
    at += 1 + Math.floor(Math.log(uniform()) * scale);
  }
  return hits;
}

/** A payment, exponential with mean 1, that falls due with probability p at each point: skewed and mostly zero. */
export function rarePayment(p: number, n: number, id = `rare-payment-${p}`): DrawnCase {
  return drawnCase(id, p, n, (seed) => {
    const uniform = uniforms(seed);
    let total = 0;
    for (let hits = hitsOf(uniform, n, p); hits > 0; hits--) total -= Math.log(uniform());
    return total / n;
  });
}

/** A condition of probability p, counted exactly. */
export function rareEvent(p: number, n: number, id = `rare-event-${p}`): DrawnCase {
  return drawnCase(id, p, n, (seed) => hitsOf(uniforms(seed), n, p) / n, { indicator: true });
}

/** The same of a source that is not pseudo-random: tested by Student's t. */
export function rareEventByStudent(p: number, n: number, id = `rare-event-t-${p}`): DrawnCase {
  const draw = (seed: number) => hitsOf(uniforms(seed), n, p) / n;
  return drawnCase(id, p, n, draw, { indicator: true, source: scrambled });
}

/** The same case with an uncertain reference. */
export function withUncertainty(one: DrawnCase, uncertainty: number): DrawnCase {
  const { reference } = one.problem;
  if (reference === null) return one;
  return { ...one, problem: { ...one.problem, reference: { ...reference, uncertainty } } };
}

/** The same case under another sound source. */
export function under(one: DrawnCase, source: string): DrawnCase {
  return { ...one, source: makeSource(source) };
}

/** A different seed for every (case, study, purpose, replicate): FNV-1a (Fowler, Noll & Vo) of the parts. */
export function seedOf(parts: readonly (string | number)[]): number {
  let hash = 0x811c9dc5;
  for (const letter of parts.join("/")) hash = Math.imul(hash ^ letter.charCodeAt(0), 0x01000193);
  return hash >>> 0;
}

/** The pluggable maker for drawn cases. */
export function draws(one: DrawnCase, study: number, purpose: string, replicates: number): number[] {
  const start = seedOf([one.problem.id, one.source.id, study, purpose]);
  return Array.from({ length: replicates }, (_, r) => one.draw(seedOf([start, r])));
}
