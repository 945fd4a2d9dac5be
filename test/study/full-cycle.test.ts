/** Averages over every state: against plain sums over all seeds, and the same bits however the work is split. */
import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import type { Problem, SourceSpec } from "../../src/problem/contract.js";
import { digestOf } from "../../src/record/json.js";
import type { FullCycleAverage } from "../../src/record/types.js";
import { parseSource } from "../../src/sources/choice.js";
import {
  cycleDigest,
  cycleExecutor,
  cycleTasks,
  fullCycle,
  reviveCycle,
  type CycleResult,
  type CycleTask,
} from "../../src/study/full-cycle.js";
import type { Executor } from "../../src/study/executor.js";
import { openJournalOf } from "../../src/study/journal.js";
import { prepareProblems } from "../../src/study/runnable.js";
import { problem } from "./fixtures.js";

interface Options {
  readonly threads?: number;
  readonly journal?: Map<string, CycleResult>;
  readonly signal?: AbortSignal;
  readonly onResult?: (result: CycleResult) => void;
}

async function cycle(
  one: Problem,
  source: SourceSpec,
  options: Options = {},
): Promise<FullCycleAverage | null> {
  const [runnable] = await prepareProblems([one]);
  if (runnable === undefined) throw new Error("no problem");
  const executor = cycleExecutor({ problem: runnable, source }, options.threads ?? 0);
  const done = options.journal ?? new Map<string, CycleResult>();
  try {
    return await fullCycle({
      problem: one,
      source,
      executor,
      journal: {
        done,
        add: (result) => {
          done.set(result.id, result);
          options.onResult?.(result);
        },
      },
      signal: options.signal ?? new AbortController().signal,
      advance: () => undefined,
    });
  } finally {
    await executor.close();
  }
}

const congruential = (modulus: number, multiplier: number, increment: number): SourceSpec => ({
  name: "invented",
  congruential: { modulus, multiplier, increment },
});

/** Tuples of a congruential generator from a state, in plain numbers. */
function tuple(
  state: number,
  [m, a, c]: readonly [number, number, number],
  d: number,
  half: number,
): number[] {
  let x = state;
  return Array.from({ length: d }, () => {
    x = (a * x + c) % m;
    return (x + half) / m;
  });
}

describe("the average over all states", () => {
  const f = ([u = 0, v = 0, w = 0]: readonly number[]): number => Math.abs(u - v) + w * w * u;
  const one = problem("abs", "abs(x[1] - x[2]) + x[3]^2 * x[1]");

  for (const map of [
    [4096, 5, 1],
    [1000, 21, 7],
    [2053, 2, 0],
  ] as const) {
    it(`is the plain mean over all seeds of ${map[1]} x + ${map[2]} mod ${map[0]}`, async () => {
      const first = map[2] === 0 ? 1 : 0;
      const values = Array.from({ length: map[0] - first }, (_, s) =>
        f(tuple(s + first, map, 3, map[2] === 0 ? 0 : 0.5)),
      );
      const mean = values.reduce((total, value) => total + value, 0) / values.length;
      const average = await cycle(one, congruential(map[0], map[1], map[2]));
      expect(average?.states).toBe(values.length);
      expect(average?.mean).toBeCloseTo(mean, 13);
      expect(average?.bias).toBeCloseTo(mean - 0.5, 13);
      const squares = values.reduce((total, value) => total + (value - mean) ** 2, 0);
      expect(average?.deviation).toBeCloseTo(Math.sqrt(squares / (values.length - 1)), 12);
    });
  }

  it("is the mean of every estimate of any n over all seeds", async () => {
    // runs of 50 points from each of the 256 states, done here; several orbits of odd states modulo 512
    const map = [512, 17, 0] as const;
    const means = Array.from({ length: 256 }, (_, k) => {
      const outputs = tuple(2 * k + 1, map, 150, 0);
      const values = Array.from({ length: 50 }, (_unused, i) => f(outputs.slice(3 * i, 3 * i + 3)));
      return values.reduce((total, value) => total + value, 0) / 50;
    });
    const average = await cycle(one, congruential(map[0], map[1], map[2]));
    expect(average?.mean).toBeCloseTo(means.reduce((total, mean) => total + mean, 0) / 256, 13);
  });

  it("of one state is the value there", async () => {
    const source = { name: "one", congruential: { modulus: 8, multiplier: 5 }, bits: "low 1" };
    const average = await cycle(problem("id", "x[1]"), source);
    expect(average).toMatchObject({ states: 1, mean: 0.75, deviation: null });
  });

  it("counts values that are not finite, names the first, and counts endpoints", async () => {
    const source = {
      name: "left",
      congruential: { modulus: 1024, multiplier: 5, increment: 1 },
      endpoint: "left",
    };
    const average = await cycle(problem("pole", "1 / x[1]", { reference: null }), source);
    expect(average).toMatchObject({ mean: Infinity, bias: null, nonFinite: 1, endpoints: 3 });
    expect(average?.offending?.inputs[0]).toBe(0);
    expect(average?.offending?.value).toBe("Infinity");
  });
});

describe("splitting the work", () => {
  // 65,521 x 3 coordinates in one range; many dimensions make many ranges
  const wide = problem("wide", "mean(x .^ 2)", { dimension: 20_000 });
  const source = congruential(8191, 17, 0);

  it("makes ranges that are whole subtrees", () => {
    const tasks = cycleTasks(2 ** 31 - 2, 3);
    expect(tasks).toHaveLength(512);
    expect(tasks[1]).toEqual({ id: "states/1", from: 2 ** 22, to: 2 ** 23 });
    expect(tasks.at(-1)?.to).toBe(2 ** 31 - 2);
    expect(cycleTasks(8190, 20_000)).toHaveLength(16);
    expect(cycleTasks(10, 3)).toEqual([{ id: "states/0", from: 0, to: 10 }]);
  });

  it("changes no bit: threads, one range or many, taken up after an interruption", async () => {
    const whole = await cycle(wide, source);
    expect(await cycle(wide, source, { threads: 2 })).toEqual(whole);

    const stop = new AbortController();
    const journal = new Map<string, CycleResult>();
    const halves = { journal, signal: stop.signal, onResult: () => journal.size === 5 && stop.abort() };
    expect(await cycle(wide, source, halves)).toBeNull();
    expect(journal.size).toBe(5);
    expect(await cycle(wide, source, { journal })).toEqual(whole);
  });

  it("has the bits of one pass over all states", async () => {
    const narrow = problem("narrow", "exp(x[1] * x[2] - x[3])");
    const [runnable] = await prepareProblems([narrow]);
    if (runnable === undefined) throw new Error("no problem");
    const work = { problem: runnable, source: congruential(8191, 17, 0) };
    const executor: Executor<CycleTask, CycleResult> = cycleExecutor(work, 0);
    const results: CycleResult[] = [];
    // shorter ranges than the plan makes
    const cuts = [0, 1024, 2048, 3072, 4096, 5120, 6144, 7168, 8190];
    const tasks = cuts.slice(1).map((to, k) => ({ id: `${k}`, from: cuts[k] ?? 0, to }));
    await executor.run(tasks, (result) => results.push(result), new AbortController().signal);
    const again = await fullCycle({
      problem: narrow,
      source: work.source,
      executor: {
        ...executor,
        run: (_tasks, done) => {
          done(mergeByHand(results));
          return Promise.resolve();
        },
      },
      journal: { done: new Map(), add: () => undefined },
      signal: new AbortController().signal,
      advance: () => undefined,
    });
    expect(again?.mean).toBe((await cycle(narrow, work.source))?.mean);
  });
});

/** Sums of ranges folded as the tree does: 0 + 1, 2 + 3, ..., and the last, shorter one from the right. */
function mergeByHand(results: readonly CycleResult[]): CycleResult {
  const sums = results.map(({ values }) => values[0] ?? NaN);
  const [a = 0, b = 0, c = 0, d = 0, e = 0, f = 0, g = 0, h = 0] = sums;
  const sum = a + b + (c + d) + (e + f + (g + h));
  return { ...(results[0] as CycleResult), id: "states/0", n: 8190, values: [sum, 0] };
}

describe("the journal of a full cycle", () => {
  it("keeps ranges to the bit, non-finite ones included", () => {
    const folder = mkdtempSync(join(tmpdir(), "tolerand-"));
    const path = join(folder, "journal.jsonl");
    const result: CycleResult = {
      id: "states/0",
      from: 0,
      n: 64,
      values: [0.1 + 0.2, Number.NaN],
      nonFinite: 1,
      offending: { index: 3, inputs: [Number.NEGATIVE_INFINITY], value: "NaN" },
      endpoints: 2,
    };
    openJournalOf(path, "a", false, reviveCycle).add(result);
    expect([...openJournalOf(path, "a", true, reviveCycle).done.values()]).toEqual([result]);
    rmSync(folder, { recursive: true });
  });

  it("belongs to one integrand and one source", () => {
    const one = problem("one", "x[1]");
    const digests = [
      cycleDigest(one, "randu"),
      cycleDigest(one, "lcg-69069"),
      cycleDigest(problem("one", "x[2]"), "randu"),
      cycleDigest(problem("one", "x[1]", { constants: { a: 1 } }), "randu"),
    ];
    expect(new Set(digests).size).toBe(4);
    expect(digests[0]).toBe(cycleDigest({ ...one, title: "renamed" }, "randu"));
    expect(digests[0]).not.toBe(digestOf(parseSource("randu").spec));
  });
});
