/** Published and library outputs of the pseudo-random sources: the data file, and the check of a source against it. */
import { readFileSync } from "node:fs";
import { expect } from "vitest";
import { instantiateKernels } from "../../src/kernels/instance.js";
import type { SourceSpec } from "../../src/problem/contract.js";
import { parseSource } from "../../src/sources/choice.js";
import { isPseudoRandom, USUAL, type PseudoRandomSource } from "../../src/sources/pseudo-random.js";
import { coordinateOf } from "../sources/oracle.js";

export interface Setting {
  readonly id: string;
  readonly params: Readonly<Record<string, string | readonly string[]>>;
  readonly seed: string;
  readonly first10: readonly string[];
  readonly at: Readonly<Record<string, string>>;
}

export interface KnownAnswer {
  readonly name: string;
  readonly ctr: string;
  readonly key: string;
  readonly out: string;
  /** ChaCha blocks alone. */
  readonly counter?: number;
  readonly nonce?: string;
  readonly out_serialized?: string;
}

export interface Jump {
  readonly kind: string;
  readonly n?: string;
  readonly [key: string]: unknown;
}

interface Data {
  readonly generators: readonly Setting[];
  readonly known_answer_blocks: readonly KnownAnswer[];
  readonly jumps: readonly Jump[];
}

export const data = JSON.parse(
  readFileSync(new URL("./data/generators.json", import.meta.url), "utf8"),
) as unknown as Data;

export function settingOf(id: string): Setting {
  const found = data.generators.find((setting) => setting.id === id);
  if (found === undefined) throw new Error(`no setting ${id}`);
  return found;
}

export function pseudoRandomSource(spec: SourceSpec): PseudoRandomSource {
  const { source } = parseSource(spec);
  if (!isPseudoRandom(source)) throw new Error(`${source.id} is not pseudo-random`);
  return source;
}

export interface CheckRequest {
  readonly setting: string;
  readonly spec: SourceSpec;
  readonly state: string;
  /** Outputs that the library's seeding drops. */
  readonly dropped?: number;
}

/** Outputs 1 ... 10, 10,000 and 1,000,000 that a setting lists, by index. */
function listed({ first10, at }: Setting): [number, bigint][] {
  const first = first10.map((value, i): [number, bigint] => [i + 1, BigInt(value)]);
  const later = Object.entries(at).map(([index, value]): [number, bigint] => [Number(index), BigInt(value)]);
  return [...first, ...later];
}

/** The integers of a source, and the coordinates of its kernel, at the indices that a setting lists. */
export function check({ setting, spec, state, dropped = 0 }: CheckRequest): void {
  const expected = listed(settingOf(setting));
  const wanted = new Map(expected);
  const last = Math.max(...wanted.keys());
  const source = pseudoRandomSource(spec);

  const integers = source.openIntegers({ key: null, state });
  for (let index = 1 - dropped; index <= last; index++) {
    const value = integers.next();
    if (wanted.has(index)) expect(value, `output ${index}`).toBe(wanted.get(index));
  }

  const { recurrence, usage } = source;
  // where two integers make a coordinate, known-answer blocks check the kernel
  if (recurrence.output.integers > 1) return;
  const kernels = instantiateKernels();
  const n = last + dropped;
  const stream = source.open({ dimension: 1, n, randomisations: [], key: null, state }, kernels);
  const row = kernels.arena.allocate(n * 8 + 64);
  stream.fill(row, Math.ceil(n / 8) * 8, n);
  const coordinates = kernels.f64(row, n);
  for (const [index, value] of expected) {
    const coordinate =
      usage.bits === null
        ? coordinateOf(value, recurrence, USUAL)
        : (Number(value) + 0.5) / 2 ** usage.bits.count;
    expect(coordinates[index - 1 + dropped], `coordinate ${index}`).toBe(coordinate);
  }
}
