/** Shipped problems and the template as the engine runs them, against evaluation of the same text by mathjs. */
import { expect, test } from "vitest";
import { interpretFormula } from "../../src/formula/index.js";
import { checkProblem } from "../../src/problem/check.js";
import { compileProblem, scopeOf } from "../../src/problem/compile.js";
import { transformsOf } from "../../src/problem/passes.js";
import type { Problem } from "../../src/problem/contract.js";
import { parseYaml } from "../../src/problem/document.js";
import { loadPaths } from "../../src/problem/load.js";
import { problemTemplate } from "../../src/problem/template.js";
import { instantiateKernels } from "../../src/kernels/instance.js";
import { TransformPasses } from "../../src/study/transform-passes.js";
import { Engine } from "./engine.js";
import { fileWith, problemIn, refusal } from "./text.js";

test("normal inputs that are neighbours are one pass", async () => {
  const transforms = async (inputs: string) => transformsOf(await problemIn(fileWith({ inputs })));
  const [z, u] = ["distribution: normal", "distribution: uniform"];
  expect(await transforms(`{ x: { ${u} } }`)).toEqual([]);
  expect(
    await transforms(`{ x: { ${z} }, y: { ${z}, length: 3 }, v: { ${u}, length: 2 }, w: { ${z} } }`),
  ).toEqual([
    { kind: "normal", first: 0, rows: 4 },
    { kind: "normal", first: 6, rows: 1 },
  ]);
});

/** Inputs at a point of the unit cube, as mathjs is to see them. */
function inputsAt(problem: Problem, coordinates: readonly number[]): number[] {
  const kernels = instantiateKernels();
  const row = kernels.arena.allocate(problem.dimension * 8 * 8);
  const block = kernels.f64(row, problem.dimension * 8);
  coordinates.forEach((value, j) => block.fill(value, j * 8, j * 8 + 8));
  new TransformPasses(kernels, transformsOf(problem), row, 8).run(1);
  return coordinates.map((_, j) => kernels.f64(row, problem.dimension * 8)[j * 8] ?? NaN);
}

async function agree(problem: Problem): Promise<void> {
  const engine = new Engine(await compileProblem(problem));
  const interpret = await interpretFormula(problem.integrand, scopeOf(problem));
  for (const step of [0.137, 0.381, 0.618]) {
    // Kronecker's sequence: coordinates that differ, away from kinks and jumps.
    const coordinates = Array.from({ length: problem.dimension }, (_, j) => (0.5 + (j + 1) * step) % 1);
    const [expected = NaN] = interpret(inputsAt(problem, coordinates));
    const found = engine.at(coordinates);
    // 1e-10 where a cosine of 1e5 radians turns the rounding of its argument into 1e-11.
    expect(Math.abs(found - expected), problem.id).toBeLessThanOrEqual(
      1e-10 * Math.max(1, Math.abs(expected)),
    );
  }
}

test("every shipped problem compiles and agrees with mathjs at three points", async () => {
  const { problems } = await loadPaths(["classic", "inputs", "planes", "tidal", "tour"]);
  for (const { problem } of problems) await agree(problem);
});

test("the template compiles and agrees with mathjs", async () => {
  await agree(await checkProblem(parseYaml("new.yaml", problemTemplate("new")), "new"));
});

test("an integrand that is refused is shown at its place in the file, with all other findings", async () => {
  const integrand = "|\n  y = x + 1\n  y + unknown";
  expect(await refusal(fileWith({ integrand, tolerance: "{ absolute: 0 }" }))).toEqual([
    'case.yaml:4:7: integrand: unknown name "unknown"; known here: x, y',
    "case.yaml:5:24: tolerance.absolute: expected a number above 0, found 0",
  ]);
});

test("a formula of constants that is refused is shown at its place in the file", async () => {
  const text = fileWith({ constants: "{ a: 1 }", reference: '{ value: "a + sinn(1)", basis: b }' });
  await expect(problemIn(text)).rejects.toThrow(
    /^case\.yaml:5:26: reference\.value: unknown function "sinn"/,
  );
});
