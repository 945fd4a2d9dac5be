import { readdirSync } from "node:fs";
import { mkdir, mkdtemp, readFile, rm, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterEach, beforeEach, describe, expect, test } from "vitest";
import { copySuite, listProblems } from "../../src/problem/catalogue.js";
import { loadPaths, loadProblem, loadSuite } from "../../src/problem/load.js";
import { problemTemplate, writeNew } from "../../src/problem/template.js";
import { parseSource } from "../../src/sources/choice.js";
import { fileWith } from "./text.js";

let folder = "";
beforeEach(async () => {
  folder = await mkdtemp(join(tmpdir(), "tolerand-"));
});
afterEach(() => rm(folder, { recursive: true }));

const put = async (file: string, text: string): Promise<string> => {
  const path = join(folder, file);
  await writeFile(path, text);
  return path;
};
const ids = (problems: readonly { problem: { id: string } }[]) => problems.map(({ problem }) => problem.id);
const suites = readdirSync(new URL("../../problems", import.meta.url)).sort();
const SHIPPED = `shipped suites: ${suites.join(", ")}`;

describe("one file", () => {
  test("its name is the problem's id, and the suite beside it counts", async () => {
    const path = await put("season-1.yaml", fileWith());
    expect((await loadProblem(path)).problem.id).toBe("season-1");
    expect((await loadProblem(path)).suite).toBeNull();
    await put("suite.yaml", "study: { replicates: 12 }\n");
    expect((await loadProblem(path)).suite?.study).toEqual({ replicates: 12 });
  });

  test.each([
    ["notes.txt", "expected a problem file that ends in .yaml or .yml; rename it, or name its folder"],
    ["suite.yaml", "holds the settings of a suite, not a problem; name its folder, or a problem file in it"],
    [
      "two words.yaml",
      "expected a file name of letters, digits, dots, dashes and _ (it names the problem in records); rename the file",
    ],
  ])("%s", async (file, message) => {
    const path = await put(file, "");
    await expect(loadPaths([path])).rejects.toThrow(`${path}: ${message}`);
  });
});

describe("a folder", () => {
  test("holds its problem files in order of names", async () => {
    await put("b.yaml", fileWith());
    await put("a.yml", fileWith());
    await put("suite.yaml", "title: Two\nstudy: { sizes: 2^4..2^6 }\n");
    const { suite, problems } = await loadSuite(folder);
    expect(ids(problems)).toEqual(["a", "b"]);
    expect(suite.title).toBe("Two");
    expect(suite.study).toEqual({ sizes: [16, 32, 64] });
  });

  test("the findings of all its files come together", async () => {
    const first = await put("a.yaml", fileWith({ tolerance: "{ absolute: 0 }" }));
    const second = await put("b.yaml", fileWith({ integrand: "1" }));
    await expect(loadSuite(folder)).rejects.toThrow(
      `${first}:3:24: tolerance.absolute: expected a number above 0, found 0\n` +
        `${second}:2:12: integrand: expected the integrand, as text in the formula language, found 1`,
    );
  });

  test("without a problem file is refused", async () => {
    await expect(loadPaths([folder])).rejects.toThrow(
      `${folder}: expected problem files (*.yaml) in this folder, found none; \`tolerand new\` writes one`,
    );
  });

  test("an unknown key and an unknown shipped problem in suite.yaml", async () => {
    const path = await put("suite.yaml", "study: { seeds: 1 }\n");
    await expect(loadSuite(folder)).rejects.toThrow(
      `${path}:1:10: unknown key "seeds" in study; did you mean "seed"?`,
    );
    await put("suite.yaml", "problems: [tour/none]\n");
    await expect(loadSuite(folder)).rejects.toThrow(
      `${path}:1:12: problems item 1: expected a shipped problem such as tidal/season-guarantee, found "tour/none"; ` +
        "`tolerand problems` lists them",
    );
  });
});

describe("names", () => {
  test("a shipped suite, a shipped problem, and several at once", async () => {
    expect((await loadPaths(["planes"])).name).toBe("planes");
    const one = await loadPaths(["tidal/price-floor"]);
    expect([one.name, ids(one.problems)]).toEqual(["price-floor", ["price-floor"]]);
    const two = await loadPaths(["tidal/price-floor", "planes"]);
    expect(two.name).toBe("price-floor+planes");
    expect(ids(two.problems)).toContain("midway-peak");
  });

  test("the same problem by two ways counts once", async () => {
    const once = await loadPaths(["tour"]);
    const again = await loadPaths(["tour", "planes/midway-peak"]);
    expect(ids(again.problems)).toEqual(ids(once.problems));
  });

  test("two problems of one name are refused", async () => {
    await mkdir(join(folder, "a"));
    await mkdir(join(folder, "b"));
    const first = await put("a/x.yaml", fileWith());
    const second = await put("b/x.yaml", fileWith());
    await expect(loadPaths([first, second])).rejects.toThrow(
      `${second}: a problem named "x" also comes from ${first}; rename one of the files`,
    );
  });

  test("a mistyped name gets a proposal", async () => {
    await expect(loadPaths(["tuor"])).rejects.toThrow(
      `tuor: no such file, folder or shipped suite; ${SHIPPED}; did you mean "tour"?`,
    );
  });

  test.each(["../problems/tour", "tour/../tidal", "tour/suite", "tour/", "/etc"])(
    "%s is no name",
    async (name) => {
      // A path that exists is read as a path; none of these reaches a file through the names of shipped suites.
      await expect(loadPaths([name])).rejects.toThrow(/no such file, folder|found none/);
    },
  );
});

describe("sources", () => {
  test("an unknown source is shown at its line, in problems and suites, when the parser of sources is given", async () => {
    const study = "{ sources: [pcg64, philox4x23] }";
    const inUse = "{ source: sobol+owne, points: 100 }";
    const path = await put("a.yaml", fileWith({ study, inUse }));
    expect(ids((await loadPaths([path])).problems)).toEqual(["a"]);
    await expect(loadPaths([path], parseSource)).rejects.toThrow(
      new RegExp(
        `^${path}:4:27: study\\.sources item 2: unknown source "philox4x23"; did you mean "philox4x32"\\?.*\n` +
          `${path}:5:18: inUse\\.source: .*owne`,
      ),
    );
    const suite = await put("suite.yaml", "study:\n  sources:\n    - mt19938\n");
    await expect(loadPaths([folder], parseSource)).rejects.toThrow(
      `${suite}:3:7: study.sources item 1: unknown source "mt19938"; did you mean "mt19937"?`,
    );
  });

  test("the shipped suites name sources that there are", async () => {
    await expect(
      loadPaths(["classic", "inputs", "planes", "tidal", "tour"], parseSource),
    ).resolves.toBeDefined();
  });
});

describe("copies", () => {
  test("a suite is copied whole, with the problems it takes in, and loads as it did", async () => {
    const target = join(folder, "mine");
    const written = await copySuite("tour", target);
    const shipped = await loadPaths(["tour"]);
    expect(written).toHaveLength(shipped.problems.length + 1);
    const copied = await loadPaths([target]);
    const byId = (a: { id: string }, b: { id: string }) => (a.id < b.id ? -1 : 1);
    const plain = (loaded: typeof copied) => loaded.problems.map(({ problem }) => problem).sort(byId);
    expect(plain(copied)).toEqual(plain(shipped));
    expect(copied.problems[0]?.suite?.study).toEqual(shipped.problems[0]?.suite?.study);
    expect(await readFile(join(target, "suite.yaml"), "utf8")).not.toContain("problems:");
  });

  test("nothing is overwritten", async () => {
    await expect(copySuite("tidal", folder)).rejects.toThrow(
      `${folder}: exists already and is not overwritten; name a folder that does not exist yet, in one that does`,
    );
    await expect(copySuite("tidle", join(folder, "x"))).rejects.toThrow(
      `tidle: no shipped suite of that name; ${SHIPPED}; did you mean "tidal"?`,
    );
  });
});

describe("a new problem", () => {
  test("runs as it is and is never overwritten", async () => {
    const path = await writeNew(join(folder, "first"), problemTemplate);
    expect(path).toBe(join(folder, "first.yaml"));
    expect(await readFile(path, "utf8")).toBe(problemTemplate("first"));
    const { problem } = await loadProblem(path);
    expect(problem.dimension).toBe(12);
    await expect(writeNew(path, problemTemplate)).rejects.toThrow(
      `${path}: exists already and is not overwritten; choose another name`,
    );
  });
});

test("the listing says what the loaded problems are", async () => {
  for (const suite of await listProblems()) {
    const { problems } = await loadPaths([suite.name]);
    const loaded = problems.map(({ problem }) => ({
      id: problem.id,
      title: problem.title,
      dimension: problem.dimension,
      basis: problem.reference?.basis ?? null,
      inUse: problem.inUse !== null,
    }));
    const listed = suite.problems.map(({ id, title, dimension, basis, inUse }) => ({
      id,
      title,
      dimension,
      basis,
      inUse,
    }));
    expect(listed).toEqual(loaded);
  }
});
