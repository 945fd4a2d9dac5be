/** The form of a record: what is written can be read back, by us and by any JSON Schema validator; the rest is refused. */
import { Ajv2020 } from "ajv/dist/2020.js";
import { describe, expect, it } from "vitest";
import { assembleRecord } from "../../src/findings/assemble.js";
import { consensusOf } from "../../src/findings/consensus.js";
import { canonicalJson, jsonText } from "../../src/record/json.js";
import { sampleExplanation } from "../report/sample-explanation.js";
import { parseRecord, recordJsonSchema } from "../../src/record/schema.js";
import {
  makeAssembly,
  makeCell,
  makeConfirmation,
  makeProblem,
  makeSeries,
  makeSource,
} from "../findings/make.js";

/** A record in which every optional part is present, non-finite numbers among them. */
function fullRecord() {
  const declared = [{ line: "time step", kind: "bias", value: 0.001, basis: "halved step" }] as const;
  const inUse = { source: "philox4x32", points: 3000, secondsPerPoint: 1e-6 };
  const problems = [
    makeProblem("p", { declared, inUse, constants: { a: 1, b: [1, 2], c: [[1], [2]] } }),
    makeProblem("q", { reference: null }),
  ];
  const nonFinite = { count: 1, first: { replicate: 0, index: 3, inputs: [0.5, Infinity], value: "NaN" } };
  return assembleRecord(
    makeAssembly(
      [
        ...makeSeries({ bias: 0.1 }),
        ...makeSeries({ source: "sobol", replicates: 1 }),
        makeCell({
          problem: "q",
          estimates: [NaN, -Infinity, 1],
          withinVariances: [null, NaN, 2],
          nonFinite,
        }),
      ],
      {
        problems,
        sources: [makeSource("philox4x32"), makeSource("sobol", { period: null, deterministic: true })],
        consensus: [consensusOf("q", [{ source: "philox4x32", n: 4, estimates: [1, 2, 3, 4] }])],
        confirmations: [makeConfirmation(0.1, 1 / 64)],
        explanations: [sampleExplanation("p", "mean", -0.2), sampleExplanation("q", "mean", null)],
      },
    ),
  );
}

describe("a record", () => {
  const record = fullRecord();
  const written = jsonText(record, 1);

  it("is read back as it was written", () => {
    expect(parseRecord(JSON.parse(written))).toEqual(record);
    expect(canonicalJson(parseRecord(JSON.parse(written)))).toBe(canonicalJson(record));
  });

  it("may come from before there were explanations", () => {
    const { explanations: _, ...older } = JSON.parse(written) as Record<string, unknown>;
    expect(parseRecord(older).explanations).toEqual([]);
  });

  it("is valid by the published JSON Schema (draft 2020-12, ajv 8)", () => {
    const validate = new Ajv2020({ strict: true, allowUnionTypes: true }).compile(recordJsonSchema());
    expect(validate(JSON.parse(written)), JSON.stringify(validate.errors)).toBe(true);
    expect(validate({ ...(JSON.parse(written) as object), cells: 3 })).toBe(false);
  });
});

describe("what is not a record is refused in words", () => {
  const refusal = (value: unknown) => {
    try {
      parseRecord(value);
    } catch (error) {
      expect(error).toBeInstanceOf(TypeError);
      return (error as Error).message;
    }
    return "accepted";
  };
  const changed = (change: (record: Record<string, unknown>) => void) => {
    const record = JSON.parse(jsonText(fullRecord())) as Record<string, unknown>;
    change(record);
    return refusal(record);
  };

  it.each([[null], [3], [[]], ["text"], [{}]])("%j", (value) => {
    expect(refusal(value)).toBe(
      'record: expected "schema": "tolerand/record/1", found none; give the record.json of a study, or its folder',
    );
  });

  it("another version", () => {
    expect(refusal({ schema: "tolerand/record/9" })).toMatch(/found "tolerand\/record\/9"/);
  });

  it("a wrong type, a missing part and an unknown key, each with its place", () => {
    const cells = (record: Record<string, unknown>) =>
      (record["cells"] as Record<string, unknown>[])[2] ?? {};
    expect(changed((record) => (cells(record)["n"] = "many"))).toMatch(
      /^record: cells\[2\]\.n: expected number/,
    );
    expect(changed((record) => delete record["budgets"])).toMatch(/^record: budgets: expected array/);
    expect(changed((record) => (record["extra"] = 1))).toMatch(
      /^record: the whole: Unrecognized key: "extra"/,
    );
    expect(changed((record) => (cells(record)["estimates"] = ["1"]))).toMatch(
      /^record: cells\[2\]\.estimates\[0\]: /,
    );
  });

  it("at most five findings are listed", () => {
    const message = changed((record) => (record["warnings"] = [1, 2, 3, 4, 5, 6, 7]));
    expect(message.split("\n")).toHaveLength(6);
    expect(message).toMatch(/and 2 more; the file was not written by this version of tolerand$/);
  });
});
