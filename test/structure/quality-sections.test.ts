/** What inspections say of nets, lattices, Halton's sequence and discrepancies: keys, texts, limits and bad input. */
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import { parseSource } from "../../src/sources/choice.js";
import { findSource } from "../../src/sources/registry.js";
import type { InspectionRequest } from "../../src/structure/contract.js";
import { discrepancies } from "../../src/structure/discrepancy.js";
import { inspectionJson, inspectSource } from "../../src/structure/inspection.js";
import { isDigitalNet, netOfSource } from "../../src/structure/net.js";
import { pointSet } from "../../src/structure/points.js";

const usual: InspectionRequest = {
  dimensions: [2, 3, 5],
  dimensionsGiven: true,
  points: null,
  streams: 1,
  state: null,
  indices: null,
  span: 6,
};

async function inspect(source: Parameters<typeof parseSource>[0], request: Partial<InspectionRequest> = {}) {
  const inspection = await inspectSource(parseSource(source), { ...usual, ...request });
  return { ...inspection, json: inspectionJson(inspection) as Record<string, unknown> };
}

const textOf = ({ parts }: Awaited<ReturnType<typeof inspect>>): string =>
  parts
    .flatMap(({ title, lines, table, notes }) => [title, ...lines, ...(table?.rows.flat() ?? []), ...notes])
    .join("\n");

describe("nets", () => {
  it("t by dimension, of an index set and of all pairs", async () => {
    const found = await inspect("sobol", { points: 2 ** 8, indices: [26, 31] });
    // qmc.json: dims1..2, 1..3, 1..5 and the pair 27,32 at m = 8
    expect(found.findings.net).toMatchObject({
      nets: [
        { dimension: 2, base: 2, digits: 8, t: 0 },
        { dimension: 3, t: 1 },
        { dimension: 5, atLeast: 3, atMost: 3 },
      ],
      netIndices: { indices: [26, 31], t: 1 },
      netPairs: { dimension: 5, digits: 8 },
      netInterlaced: null,
    });
    expect(Object.keys(found.json)).toEqual(
      expect.arrayContaining(["nets", "netIndices", "netPairs", "netInterlaced"]),
    );
    expect(textOf(found)).toContain("{26, 31}");
  });

  it("is the same with scrambled digits", async () => {
    const [plain, scrambled] = [await inspect("sobol"), await inspect("sobol+owen")];
    expect(scrambled.findings.net).toEqual(plain.findings.net);
  });

  it("says which sizes the figures are of", async () => {
    const found = await inspect("faure", { points: 100 });
    expect(found.findings.net?.nets.map(({ base, digits, t }) => [base, digits, t])).toEqual([
      [2, 6, 0],
      [3, 4, 0],
      [5, 2, 0],
    ]);
    expect(textOf(found)).toContain("Figures are those of the first b^m points at most 100, b the base.");
  });

  it("what is behind an interlaced net", async () => {
    const interlaced = await inspect("interlaced-2", { points: 2 ** 10 });
    const behind = await inspect("sobol", { points: 2 ** 10, dimensions: [4, 6, 10] });
    expect(interlaced.findings.net?.netInterlaced?.map(({ t }) => t)).toEqual(
      behind.findings.net?.nets.map(({ t }) => t),
    );
  });

  it("nets of one's own, in base 3", async () => {
    const rows = [
      [
        [1, 0],
        [0, 1],
      ],
      [
        [1, 1],
        [0, 1],
      ],
    ];
    const found = await inspect({ name: "house", matrices: { base: 3, rows } }, { dimensions: [2] });
    // both matrices begin rows (1, 0) and (1, 1), which are independent, and no two rows of one are not
    expect(found.findings.net?.nets).toEqual([
      { dimension: 2, base: 3, digits: 2, t: 0, atLeast: 0, atMost: 0 },
    ]);
  });

  it.each([
    ["faure", { dimensions: [200] }, 'dimension: expected at most 127 for source "faure", found 200'],
    [
      "sobol",
      { indices: [30000] },
      'indices: expected coordinates from 0 to 21200 for source "sobol", found 30000',
    ],
    ["faure", { points: 4 }, /n: expected at least the base, 5 points/],
  ])("%s %j is refused", async (id, request, message) => {
    await expect(inspect(id, request)).rejects.toThrow(message);
  });
});

describe("lattices", () => {
  it("quality by dimension and the worst pairs", async () => {
    const found = await inspect(
      { name: "fibonacci", lattice: { vector: [1, 89] } },
      { dimensions: [2], points: 144 },
    );
    // qmc.json: fibonacci-144 has rho 55
    expect(found.findings.latticeQuality).toMatchObject({
      latticeQuality: [{ dimension: 2, points: 144, zaremba: 55, zarembaComplete: true }],
      latticeWorstPairs: [{ indices: [0, 1], rho: 55 }],
    });
    expect(textOf(found)).toContain("Lattice quality, 144 points");
  });

  it("at powers of two of an extensible sequence", async () => {
    const found = await inspect("lattice-sequence", { points: 1000 });
    expect(found.findings.latticeQuality?.latticeQuality?.[0]?.points).toBe(1024);
  });

  it("in a thousand coordinates, where the dual lattice and P stop", async () => {
    const found = await inspect("lattice", { dimensions: [470, 1000], points: 256 });
    const [less, more] = found.findings.latticeQuality?.latticeQuality ?? [];
    expect(Number.isFinite(less?.P2)).toBe(true);
    expect([more?.P2, more?.P4, more?.P6, more?.zaremba]).toEqual([null, null, null, 1]);
    expect(textOf(found)).toContain("beyond 470 coordinates");
    expect(textOf(found)).toContain("Dual lattices are computed in up to 48 dimensions.");
  });

  it("says what is not computed at 2^31 points", async () => {
    const found = await inspect(
      { name: "large", lattice: { vector: [1, 1664525] } },
      { dimensions: [2], points: 2 ** 31 },
    );
    expect(found.findings.latticeQuality?.latticeQuality).toBeNull();
    expect(textOf(found)).toContain("Not computed beyond 2^26 points");
  });
});

describe("Halton's sequence", () => {
  it("tells from which size all pairs are usable, and which rise in step", async () => {
    const found = await inspect("halton", { dimensions: [2, 6, 12], points: 200 });
    const { halton } = found.findings.halton ?? {};
    expect(halton?.allUsableFrom).toEqual([
      { dimension: 2, points: 6 },
      { dimension: 6, points: 143 },
      { dimension: 12, points: 31 * 37 },
    ]);
    expect([halton?.pairs, halton?.usableDimension]).toEqual([66, 6]);
    expect(Math.abs(halton?.worst[0]?.correlation ?? 0)).toBeGreaterThan(0.1);
    expect(halton?.worst[0]?.usableFrom).toBeGreaterThan(200);
  });

  it("leaped and permuted points need as many; other pairs rise in step, or none on average", async () => {
    const plain = await inspect("halton", { dimensions: [40], points: 300 });
    const leaped = await inspect("halton-leaped", { dimensions: [40], points: 300 });
    const permuted = await inspect("halton+permuted", { dimensions: [40], points: 300 });
    const pair = (found: typeof plain): readonly number[] | undefined =>
      found.findings.halton?.halton.worst[0]?.indices;
    expect(pair(leaped)).not.toEqual(pair(plain));
    expect(permuted.findings.halton?.halton.worst[0]?.correlation).toBeNull();
    expect(permuted.findings.halton?.halton.usable).toBe(plain.findings.halton?.halton.usable);
    expect(textOf(leaped)).toContain("Every 409th point");
    expect(textOf(permuted)).toContain("Permuted digits");
  });

  it("leaves out the first coordinate of Hammersley's points", async () => {
    const found = await inspect("hammersley", { dimensions: [4], points: 100 });
    expect(found.findings.halton?.halton.pairs).toBe(3);
    expect(found.findings.halton?.halton.worst[0]?.bases).not.toContain(null);
  });
});

describe("discrepancies", () => {
  const discrepancy = { seed: 7, allowPrograms: false };

  it("only where they are asked for", async () => {
    expect((await inspect("sobol")).json["discrepancy"]).toBeNull();
    expect(textOf(await inspect("sobol"))).not.toContain("iscrepancy");
  });

  it("of the first points, by dimension, of an index set and of single coordinates", async () => {
    const found = await inspect("sobol", { discrepancy, points: 64, indices: [0, 4], dimensions: [2, 3] });
    const data = found.findings.discrepancy?.discrepancy;
    // qmc.json, sobol-n64-d3
    expect(data?.byDimension[1]?.centred.squared).toBeCloseTo(0.00059478201236978984, 14);
    expect(data?.byDimension[1]?.starExact).toBeCloseTo(0.0786895751953125, 12);
    expect(data?.seed).toBeNull();
    expect(data?.indices?.dimension).toBe(2);
    expect(data?.coordinates.map(({ star }) => star)).toEqual(
      [1 / 64, 1 / 64, 1 / 64].map((x) => expect.closeTo(x, 12) as number),
    );
  });

  it("of random points depend on the seed", async () => {
    const of = async (seed: number) =>
      (await inspect("mt19937", { discrepancy: { seed, allowPrograms: false }, points: 50, dimensions: [2] }))
        .findings.discrepancy?.discrepancy?.byDimension[0]?.centred.root;
    expect(await of(1)).not.toBe(await of(2));
    expect(await of(1)).toBe(await of(1));
  });

  it.each([
    [
      "sobol",
      { points: 2 ** 18 },
      /^points: discrepancies of 262144 points in dimensions that add up to 10 take too long; expected at most 2\^17 points/,
    ],
    [
      "lattice",
      { points: 1000 },
      'n: expected a valid size for source "lattice", found 1000; the nearest is 1024',
    ],
  ])("%s %j is refused", async (id, request, message) => {
    await expect(inspect(id, { discrepancy, ...request })).rejects.toThrow(message);
  });

  it("of a user's own draws, from a file", async () => {
    const folder = mkdtempSync(join(tmpdir(), "tolerand-"));
    const draws = Float64Array.from({ length: 200 }, (_, i) => (i * 0.6180339887) % 1);
    writeFileSync(join(folder, "draws.bin"), new Uint8Array(draws.buffer));
    const source = { name: "golden", draws: { file: join(folder, "draws.bin"), format: "f64le" } };
    const found = await inspect(source, { discrepancy, points: 50, dimensions: [2] });
    const rows = Array.from({ length: 50 }, (_, i) => [draws[2 * i] ?? NaN, draws[2 * i + 1] ?? NaN]);
    const expected = discrepancies(pointSet(rows), ["mixture"])[0]?.root ?? NaN;
    expect(found.findings.discrepancy?.discrepancy?.byDimension[0]?.mixture.root).toBeCloseTo(expected, 12);
    rmSync(folder, { recursive: true });
  });

  it("of a program's draws only with leave", async () => {
    const source = { name: "pr", draws: { program: ["./draws"], format: "u64le" } };
    await expect(inspect(source, { discrepancy })).rejects.toThrow("--allow-programs");
  });
});

describe("order of interlaced nets", () => {
  /** The least sum over coordinates of the places of the `order` leading digits of k, over the dual: t of that order by definition. */
  function byTryingAll(order: number, dimension: number, digits: number): number {
    const source = findSource(`interlaced-${order}`);
    if (source === undefined || !isDigitalNet(source)) throw new Error("no interlaced net");
    const { matrices } = netOfSource(source, dimension, 2 ** digits);
    const rows = matrices.map((matrix) =>
      Array.from({ length: order * digits }, (_, r) =>
        Array.from({ length: digits }, (_, c) => matrix.get(r, c) << c).reduce((word, bit) => word | bit, 0),
      ),
    );
    let least = order * digits + 1;
    const visit = (j: number, sum: number, weight: number): void => {
      if (weight >= least) return;
      if (j === dimension) {
        if (sum === 0 && weight > 0) least = weight;
        return;
      }
      for (let k = 0; k < 2 ** (order * digits); k++) {
        let [word, places, taken] = [sum, 0, 0];
        for (let r = order * digits - 1; r >= 0; r--) {
          if (((k >>> r) & 1) === 0) continue;
          word ^= rows[j]?.[r] ?? 0;
          if (taken++ < order) places += r + 1;
        }
        visit(j + 1, word, weight + places);
      }
    };
    visit(0, 0, 0);
    return order * digits - least + 1;
  }

  it.each([
    [2, 1, 4],
    [2, 2, 4],
    [2, 2, 5],
    [3, 1, 4],
    [3, 2, 3],
  ])(
    "%i in %i dimensions, 2^%i points: within the bound that is given (Dick 2008)",
    async (order, dimension, digits) => {
      const { findings } = await inspect(`interlaced-${order}`, {
        dimensions: [Math.max(2, dimension)],
        points: 2 ** digits,
      });
      const bound = findings.net?.netInterlaced?.[0]?.higherOrderAtMost ?? NaN;
      expect(byTryingAll(order, dimension, digits)).toBeLessThanOrEqual(bound);
    },
  );
});
