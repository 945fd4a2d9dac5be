/**
 * The page in a real browser: light and dark, wide and narrow, without a script, by keyboard, on paper. Needs Chromium:
 * the path in CHROMIUM_PATH, else /usr/bin/chromium. Nothing is downloaded.
 */
import { existsSync } from "node:fs";
import { mkdtemp, rm } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { type Browser, type BrowserContextOptions, type Page, chromium } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { writeReport } from "../../src/report/index.js";
import { LARGE, sampleRecord } from "../report/sample-record.js";

const CHROMIUM = process.env["CHROMIUM_PATH"] ?? "/usr/bin/chromium";
const FLAGS = [
  "--headless",
  "--no-sandbox",
  "--disable-gpu",
  "--disable-quic",
  "--no-first-run",
  "--disable-background-networking",
  "--disable-component-update",
  "--disable-sync",
];

let browser: Browser;
let folder = "";
let [small, large] = ["", ""];

beforeAll(async () => {
  if (!existsSync(CHROMIUM)) {
    throw new Error(
      `Chromium not found at ${CHROMIUM}. Install the package "chromium", or name its path in CHROMIUM_PATH.`,
    );
  }
  folder = await mkdtemp(join(tmpdir(), "tolerand-page-"));
  small = (await writeReport(sampleRecord(), join(folder, "small"))).index ?? "";
  large = (await writeReport(sampleRecord(LARGE), join(folder, "large"))).index ?? "";
  browser = await chromium.launch({ executablePath: CHROMIUM, args: FLAGS });
});

afterAll(async () => {
  await (browser as Browser | undefined)?.close();
  await rm(folder, { recursive: true, force: true });
});

/** Opens a page, runs `use`, and fails on any message of the console, error, blocked piece or request for another file. */
async function opened(
  path: string,
  options: BrowserContextOptions,
  use: (page: Page) => Promise<void>,
): Promise<void> {
  const context = await browser.newContext(options);
  const complaints: string[] = [];
  try {
    const page = await context.newPage();
    page.on("console", (message) => complaints.push(message.text()));
    page.on("pageerror", (error) => complaints.push(error.message));
    page.on("request", (request) => {
      if (request.url().split("#")[0] !== pathToFileURL(path).href)
        complaints.push(`asks for ${request.url()}`);
    });
    await page.goto(pathToFileURL(path).href);
    await use(page);
  } finally {
    await context.close();
  }
  expect(complaints).toEqual([]);
}

async function overflow(page: Page): Promise<number> {
  return page.evaluate<number>("document.documentElement.scrollWidth - document.documentElement.clientWidth");
}

/** The number of figures: at least error and budget of every problem, and two across. */
async function figures(page: Page): Promise<number> {
  const problems = await page.locator("section.problem").count();
  const count = await page.locator("figure").count();
  expect(count).toBeGreaterThanOrEqual(2 * problems + 2);
  return count;
}

/** One edge of the box of every element that `selector` finds, in pixels of the window. */
async function edges(page: Page, selector: string, edge: "top" | "height"): Promise<number[]> {
  const all = `[...document.querySelectorAll(${JSON.stringify(selector)})]`;
  return page.evaluate<number[]>(`${all}.map((one) => one.getBoundingClientRect().${edge})`);
}

const WIDE = { width: 1400, height: 900 };
const NARROW = { width: 380, height: 800 };

describe.each(["light", "dark"] as const)("in the %s scheme", (colorScheme) => {
  it.each([
    ["wide", WIDE],
    ["narrow", NARROW],
  ])("%s: no complaint, no sideways overflow, every figure drawn", async (_, viewport) => {
    await opened(small, { colorScheme, viewport }, async (page) => {
      expect(await overflow(page)).toBe(0);
      expect(await page.locator("figure svg.chart").count()).toBe(await figures(page));
      const heights = await edges(page, "figure svg.chart", "height");
      for (const height of heights) expect(height).toBeGreaterThan(60);
    });
  });

  it("draws in the scheme's colours", async () => {
    await opened(small, { colorScheme, viewport: WIDE }, async (page) => {
      const paper = await page.evaluate<string>("getComputedStyle(document.body).backgroundColor");
      const text = await page.evaluate<string>(
        "getComputedStyle(document.querySelector('#bias-map svg text')).fill",
      );
      expect(paper).toBe(colorScheme === "light" ? "rgb(253, 253, 251)" : "rgb(20, 24, 28)");
      expect(text).toBe(colorScheme === "light" ? "rgb(27, 33, 39)" : "rgb(230, 233, 236)");
    });
  });
});

describe("the page", () => {
  it("keeps words, tables and figures without JavaScript", async () => {
    await opened(small, { javaScriptEnabled: false, viewport: WIDE }, async (page) => {
      expect(await page.locator("svg.chart").count()).toBe(await figures(page));
      expect(await page.locator("table.verdicts tbody tr").count()).toBe(4);
      expect(await page.locator("#controls").isVisible()).toBe(false);
    });
  });

  it("runs no text of users", async () => {
    await opened(small, { viewport: WIDE }, async (page) => {
      page.on("dialog", () => expect.unreachable("a user's text ran"));
      expect(await page.locator("img").count()).toBe(0);
      expect(await page.locator("h3", { hasText: "<script>alert" }).count()).toBe(1);
    });
  });

  it("shows exact values on hover", async () => {
    await opened(small, { viewport: WIDE }, async (page) => {
      const mark = page.locator("#error-against-n-ridge [data-tip]").first();
      await mark.scrollIntoViewIfNeeded();
      await mark.hover({ force: true });
      expect(await page.locator("#tip").textContent()).toMatch(
        /at n = [\d,]+: RMSE .* \(95 % interval .* to .*\)/,
      );
      await page.mouse.move(2, 2);
      expect(await page.locator("#tip").isVisible()).toBe(false);
    });
  });

  it("follows a source by keyboard and lets go with Escape", async () => {
    await opened(small, { viewport: WIDE }, async (page) => {
      const link = page.locator("table.verdicts a.source", { hasText: "randu" });
      await link.focus();
      await page.keyboard.press("Enter");
      expect(await link.getAttribute("aria-pressed")).toBe("true");
      expect(await page.locator("#following").textContent()).toContain("Following randu");
      const marks = await page.locator(".chart [data-s]").count();
      const dimmed = await page.locator(".chart [data-s].dim").count();
      expect(dimmed).toBeGreaterThan(0);
      expect(dimmed).toBeLessThan(marks);
      await page.keyboard.press("Escape");
      expect(await page.locator(".dim").count()).toBe(0);
      expect(await page.locator("#following").isVisible()).toBe(false);
      await link.focus();
      await page.keyboard.press("Space");
      expect(await link.getAttribute("aria-pressed")).toBe("true");
    });
  });

  it("follows a source by a click on its mark", async () => {
    await opened(small, { viewport: WIDE }, async (page) => {
      const mark = page.locator("#orders [data-tip]").first();
      await mark.scrollIntoViewIfNeeded();
      await mark.click({ force: true });
      expect(await page.locator("#following").textContent()).toContain("Following philox4x32");
    });
  });

  it("filters problems", async () => {
    await opened(small, { viewport: WIDE }, async (page) => {
      await page.locator("#filter").fill("gaussian");
      expect(await page.locator("section.problem:visible").count()).toBe(1);
      expect(await page.locator("table.verdicts tbody tr:visible").count()).toBe(1);
      expect(await page.locator("#shown").textContent()).toBe("1 of 4 shown");
      await page.locator("#filter").fill("");
      expect(await page.locator("section.problem:visible").count()).toBe(4);
    });
  });

  it("lets the keyboard scroll what does not fit, and stops nowhere else", async () => {
    await opened(small, { viewport: NARROW }, async (page) => {
      expect(await page.locator("#error-against-n-ridge > .scroll[tabindex='0']").count()).toBe(1);
    });
    await opened(small, { viewport: WIDE }, async (page) => {
      expect(await page.locator("#error-against-n-ridge > .scroll[tabindex]").count()).toBe(0);
    });
  });

  it("can be reached throughout by Tab", async () => {
    await opened(small, { viewport: WIDE }, async (page) => {
      const reached = new Set<string>();
      for (let i = 0; i < 60; i++) {
        await page.keyboard.press("Tab");
        reached.add(await page.evaluate<string>("document.activeElement.tagName"));
      }
      for (const tag of ["A", "INPUT", "SELECT", "SUMMARY"]) expect([...reached]).toContain(tag);
    });
  });

  it("opens at twenty problems by twenty sources without overflow", async () => {
    await opened(large, { viewport: NARROW }, async (page) => {
      expect(await overflow(page)).toBe(0);
      expect(await page.locator("svg.chart").count()).toBe(await figures(page));
    });
  });

  it("keeps labels of lines apart", async () => {
    await opened(large, { viewport: WIDE }, async (page) => {
      const tops = await edges(page, "#error-against-n-ridge svg text[data-s]", "top");
      tops.sort((a, b) => a - b);
      expect(tops.length).toBe(20);
      for (let i = 1; i < tops.length; i++) expect((tops[i] ?? 0) - (tops[i - 1] ?? 0)).toBeGreaterThan(10);
    });
  });

  it("prints an ordinary problem on one sheet of A4", async () => {
    await opened(small, { viewport: { width: 718, height: 1047 }, colorScheme: "dark" }, async (page) => {
      await page.emulateMedia({ media: "print" });
      const heights = await edges(page, "section.problem", "height");
      // 297 mm less two margins of 10 mm, at 96 px per inch.
      for (const height of heights) expect(height).toBeLessThanOrEqual(1047);
      expect(await page.evaluate<string>("getComputedStyle(document.body).backgroundColor")).toBe(
        "rgb(255, 255, 255)",
      );
    });
  });
});
