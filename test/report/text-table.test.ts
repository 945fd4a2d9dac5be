/** Tables of text: columns, alignment, colour only when asked, no control characters from users' texts. */
import { describe, expect, it } from "vitest";
import { textTable, verdictTables } from "../../src/report/index.js";
import { plainNumber, signed, withInterval } from "../../src/findings/format.js";
import type { StudyRecord } from "../../src/record/types.js";
import { sampleRecord } from "./sample-record.js";

describe("textTable", () => {
  it("aligns columns and leaves no trailing spaces", () => {
    const lines = textTable(
      [
        { title: "source", align: "left" },
        { title: "n", align: "right" },
        { title: "word", align: "left" },
      ],
      [
        ["randu", "1,024", "x"],
        ["mt19937", "8", ""],
      ],
    );
    expect(lines).toEqual(["source       n  word", "randu    1,024  x", "mt19937      8"]);
  });

  it("counts characters, not code units, and drops control characters", () => {
    expect(
      textTable(
        [
          { title: "a", align: "left" },
          { title: "b", align: "left" },
        ],
        [["𝒙\u001b[31m", "y"]],
      ),
    ).toEqual(["a       b", "𝒙 [31m  y"]);
  });
});

describe("verdictTables", () => {
  const record = sampleRecord();

  it("has no escape codes without colour, and only its own with it", () => {
    expect(verdictTables(record, { colour: false })).not.toContain("\u001b");
    const coloured = verdictTables(record, { colour: true });
    expect(coloured).toContain("\u001b[31;1m◆");
    const title = { ...record.problems[0], title: "evil \u001b[2J\nline" };
    const hostile = { ...record, problems: [title, ...record.problems.slice(1)] } as StudyRecord;
    expect(verdictTables(hostile, { colour: false })).not.toContain("\u001b");
    expect(verdictTables(hostile, { colour: false }).split("\n")[0]).toContain("evil  [2J line");
  });

  it("ranks by cost, and ends with what never reaches the tolerance", () => {
    const [first = ""] = verdictTables(record, { colour: false }).split("\n\n");
    const sources = first
      .split("\n")
      .slice(2, -1)
      .map((line) => line.trim().split(/\s+/)[1]);
    expect(sources[0]).toBe("sobol+owen");
    expect(sources.slice(-2).sort()).toEqual(["house", "randu"]);
    expect(first).toMatch(/◆ {2}randu .* outside .* source structure .* never {2,}–/);
  });

  it("says what is in use", () => {
    expect(verdictTables(record, { colour: false })).toMatch(/In use: mt19937, 100,000 points: outside/);
  });
});

describe("numbers", () => {
  it("keep what was given and what intervals support", () => {
    expect(plainNumber(0.01)).toBe("0.01");
    expect(plainNumber(-1234567.5)).toBe("−1,234,567.5");
    expect(plainNumber(1e-7)).toBe("1e−7");
    expect(plainNumber(NaN)).toBe("NaN");
    expect(signed(0.0203, 0.0004)).toBe("+0.02030");
    expect(signed(-0.05, 0.0004)).toBe("−0.05000");
    expect(withInterval(0.012345, [0.01, 0.014])).toBe("0.0123");
  });
});
