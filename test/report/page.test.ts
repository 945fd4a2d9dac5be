/** The page: whole in one file, its policy, its escaping, its size. */
import { createHash } from "node:crypto";
import { beforeAll, describe, expect, it } from "vitest";
import { embeddedJson, html } from "../../src/report/page/html.js";
import { reportTexts } from "../../src/report/write.js";
import { HOSTILE, LARGE, sampleRecord } from "./sample-record.js";

let page = "";
let summary = "";

beforeAll(async () => {
  const texts = await reportTexts(sampleRecord());
  page = texts.get("index.html") ?? "";
  summary = texts.get("summary.md") ?? "";
});

function block(pattern: RegExp): string {
  const found = pattern.exec(page);
  if (found?.[1] === undefined) throw new Error(`no ${pattern.source}`);
  return found[1];
}

function hash(text: string): string {
  return `sha256-${createHash("sha256").update(text).digest("base64")}`;
}

describe("the page's policy", () => {
  it("allows its own style and script by their hashes and nothing else", () => {
    const policy = block(/Content-Security-Policy" content="([^"]*)"/).replace(/&#39;/g, "'");
    expect(policy).toContain("default-src 'none'");
    expect(policy).not.toContain("unsafe");
    expect(policy).toContain(`style-src '${hash(block(/<style>([\s\S]*?)<\/style>/))}'`);
    expect(policy).toContain(`script-src '${hash(block(/<script>([\s\S]*?)<\/script>/))}'`);
    expect(policy).toContain("base-uri 'none'");
  });

  it("has no inline style or handler, which the policy would block", () => {
    const tags = page.match(/<[a-z][^>]*>/g) ?? [];
    expect(tags.length).toBeGreaterThan(500);
    for (const tag of tags) expect(tag.replace(/"[^"]*"/g, "")).not.toMatch(/\s(?:style|on[a-z]+)=/);
  });
});

describe("the page", () => {
  it("names no address outside", () => {
    expect(page).not.toMatch(/https?:|\/\/[a-z]+\.|url\(|@import|<link|<iframe|<object/);
    for (const link of page.match(/ (?:href|src)="[^"]*"/g) ?? [])
      expect(link).toMatch(/"(?:#|charts\/|record\.json)/);
  });

  it("sets users' texts as text, everywhere", () => {
    expect(page).not.toContain("<script>alert");
    expect(page).not.toContain("<img");
    expect(page).toContain("&lt;script&gt;alert(&quot;x&quot;)&lt;/script&gt;");
    expect(page.match(/<script/g)?.length).toBe(2);
    const facts = JSON.parse(block(/id="facts">([\s\S]*?)<\/script>/)) as { problems: { title: string }[] };
    expect(facts.problems[1]?.title).toContain(HOSTILE);
  });

  it("shows the exact average over all states beside the prediction, and what bits cost", () => {
    expect(page).toContain("bias over all 536,870,912 states");
    expect(page).toContain("all 536,870,912 states");
    expect(page).toMatch(
      /<summary>What bits cost: the bias of the middles of cells of width 2\^−bits, 99.% intervals \(◂ its own\)<\/summary>/,
    );
    expect(page).toMatch(/<td class="num">31 ◂<td class="num">−2\.2e−19</);
  });

  it("links a verdict that structure explains to its explanation, and names what structure could still spoil", () => {
    const anchors = [...page.matchAll(/<div class="why" id="(why-[^"]+)"/g)].map((match) => match[1] ?? "");
    expect(anchors.length).toBe(sampleRecord().explanations.filter(({ explained }) => explained).length);
    // from the table of verdicts, from the ranking, and from the section of the source
    for (const anchor of anchors) expect(page.split(`href="#${anchor}"`).length - 1).toBe(3);
    expect(page).toContain("What known structure could still spoil");
  });

  it("tells of every figure in words and has its numbers as a table", () => {
    const figures = page.match(/<figure[\s\S]*?<\/figure>/g) ?? [];
    expect(figures.length).toBe(22);
    for (const figure of figures) {
      expect(figure).toMatch(/<svg[^>]* role="img" aria-label="[^"]{60,}"/);
      expect(figure).toMatch(/<details>\s*<summary>The numbers<\/summary>[\s\S]*<table>/);
      expect(figure).toMatch(/<h4>[^<]+<\/h4>/);
      expect(figure).toMatch(/href="charts\/[a-z0-9-]+\.vl\.json"/);
    }
  });

  it("says which inputs matter", () => {
    const text = page
      .replace(/<[^>]+>/g, " ")
      .replaceAll("\u00a0", " ")
      .replace(/\s+/g, " ");
    expect(text).toContain(
      "x[1] and x[2] matter most (part in 70 % and 50 % of the variance); 2 of 3 coordinates have part in 1 % or more.",
    );
    expect(/Mean dimension 1\.20\d? \(95 % interval 1\.18\d? to 1\.22\d?\)/.test(text)).toBe(true);
    expect(text).toContain("evidence of one, no proof");
    // 5 of 16 digits, the same net scrambled drawn once
    expect(text).toContain("sobol+owen covers x[1], x[2], 20 % of the variance, worst: t = 5 of 16.");
    expect(page.match(/id="pair-map-/g)?.length).toBe(1);
    expect(text).toContain("x[1], x[2] 100 % 20 % 18 % to 22 %");
  });

  it("leads only to places that it has", () => {
    const ids = new Set([...page.matchAll(/ id="([^"]+)"/g)].map((m) => m[1]));
    for (const [, target] of page.matchAll(/ href="#([^"]+)"/g)) expect(ids.has(target), target).toBe(true);
    const every = [...page.matchAll(/ id="([^"]+)"/g)].map((m) => m[1]);
    expect(new Set(every).size).toBe(every.length);
  });

  it("never shows a verdict by its shape alone", () => {
    const table = block(/<table class="verdicts[^"]*">([\s\S]*?)<\/table>/);
    const cells = table.match(/<td>[\s\S]*?<\/td>/g) ?? [];
    const shaped = cells.filter((cell) => /[●◆◐–]/.test(cell));
    expect(shaped.length).toBe(33);
    for (const cell of shaped) expect(cell).toMatch(/within|outside|undecided|none/);
  });

  it("gives provenance: command, seed, digests, versions", () => {
    for (const text of [
      "20260401",
      "ab".repeat(32),
      "cd".repeat(32),
      "v24.0.0",
      "tolerand study tour --seed 20260401",
    ]) {
      expect(page).toContain(text);
    }
  });

  it("uses only custom properties that its style sheet defines, in both schemes", () => {
    const style = block(/<style>([\s\S]*?)<\/style>/);
    for (const [, name] of page.matchAll(/var\((--[a-z0-9-]+)\)/g)) {
      expect(style.split(`${name}:`).length - 1, name).toBe(2);
    }
    expect(block(/<main>([\s\S]*)<\/main>/)).not.toMatch(/(?:fill|stroke)="#/);
  });

  it("is the same bytes when written again", async () => {
    expect((await reportTexts(sampleRecord())).get("index.html")).toBe(page);
  });

  it("stays within 5 MB for twenty problems by twenty sources", async () => {
    const texts = await reportTexts(sampleRecord(LARGE));
    expect(Buffer.byteLength(texts.get("index.html") ?? "")).toBeLessThanOrEqual(5_000_000);
  });
});

describe("odd records", () => {
  it("are drawn without figures where nothing was measured yet", async () => {
    const none = { cells: [], tests: [], convergence: [], budgets: [] };
    const whole = sampleRecord();
    const record = { ...whole, ...none, environment: { ...whole.environment, complete: false } };
    const texts = await reportTexts(record);
    expect([...texts.keys()].sort()).toEqual(["index.html", "record.json", "summary.md"]);
    expect(texts.get("index.html")).toContain("The run was interrupted.");
    expect(texts.get("index.html")).not.toContain("<figure");
    expect(texts.get("summary.md")).toContain("The run was interrupted");
  });

  it("name the estimator where there are several, and keep their curves apart", async () => {
    const whole = sampleRecord();
    const twice = <T extends { estimator: string }>(all: readonly T[]): T[] =>
      all.flatMap((one) => [one, { ...one, estimator: "antithetic" }]);
    const texts = await reportTexts({
      ...whole,
      cells: twice(whole.cells),
      tests: twice(whole.tests),
      convergence: twice(whole.convergence),
      budgets: twice(whole.budgets),
    });
    expect(texts.get("index.html")).toContain(">philox4x32, antithetic<");
    expect(texts.get("summary.md")).toContain("philox4x32, crude");
    expect(texts.get("charts/error-against-n-ridge.vl.json")).toContain("randu, antithetic: biased");
  });

  it("give several outputs of a problem a section each", async () => {
    const whole = sampleRecord();
    const twice = <T extends { output: string }>(all: readonly T[]): T[] =>
      all.flatMap((one) => [one, { ...one, output: "tail" }]);
    const texts = await reportTexts({
      ...whole,
      cells: twice(whole.cells),
      tests: twice(whole.tests),
      convergence: twice(whole.convergence),
      budgets: twice(whole.budgets),
    });
    expect([...texts.keys()]).toContain("charts/bias-ridge-tail.vl.json");
    expect(texts.get("index.html")).toContain(">Gaussian ridge: tail</h3>");
  });
});

describe("the summary", () => {
  it("gives the answer and a table per problem, with users' texts escaped", () => {
    expect(summary).toContain("# Error of integration on 4 problems");
    expect(summary).toContain("| ◆ outside | randu |");
    const markup = summary.split("\n").filter((line) => !line.startsWith("- Command:"));
    expect(markup.join("\n")).not.toContain("<script>");
    expect(summary).toContain("\\<script\\>");
  });
});

describe("markup", () => {
  it("escapes what is put into a template", () => {
    const name = `"><b onclick='x'>&`;
    expect(html`<p title="${name}">${name}</p>`.text).toBe(
      `<p title="&quot;&gt;&lt;b onclick=&#39;x&#39;&gt;&amp;">&quot;&gt;&lt;b onclick=&#39;x&#39;&gt;&amp;</p>`,
    );
  });

  it("embeds data that cannot end its block", () => {
    const text = embeddedJson({ a: "</script><!-- & \u2028" });
    expect(text).not.toMatch(/[<>&\u2028]/);
    expect(JSON.parse(text)).toEqual({ a: "</script><!-- & \u2028" });
  });
});
