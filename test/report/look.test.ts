/**
 * The look, measured: contrast by WCAG 2.2 (success criteria 1.4.3 and 1.4.11; relative luminance and contrast ratio as
 * defined there), distance in Oklab (B. Ottosson, "A perceptual color space for image processing", 2020), and colour
 * vision deficiency by the matrices for full severity of G. M. Machado, M. M. Oliveira, L. A. F. Fernandes, "A
 * physiologically-based model for simulation of color vision deficiency", IEEE TVCG 15 (2009) 1291-1298.
 */
import { describe, expect, it } from "vitest";
import { FAMILIES, FAMILY_ORDER, type Ink, PAGE, TINTS, allInks } from "../../src/report/look.js";

type Rgb = readonly [number, number, number];
type Scheme = "light" | "dark";

function linear(hex: string): Rgb {
  const channel = (at: number): number => {
    const c = parseInt(hex.slice(at, at + 2), 16) / 255;
    return c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4;
  };
  return [channel(1), channel(3), channel(5)];
}

function contrast(a: string, b: string): number {
  const luminance = ([r, g, bl]: Rgb): number => 0.2126 * r + 0.7152 * g + 0.0722 * bl;
  const [x, y] = [luminance(linear(a)), luminance(linear(b))];
  return (Math.max(x, y) + 0.05) / (Math.min(x, y) + 0.05);
}

function oklab([r, g, b]: Rgb): Rgb {
  const l = Math.cbrt(0.4122214708 * r + 0.5363325363 * g + 0.0514459929 * b);
  const m = Math.cbrt(0.2119034982 * r + 0.6806995451 * g + 0.1073969566 * b);
  const s = Math.cbrt(0.0883024619 * r + 0.2817188376 * g + 0.6299787005 * b);
  return [
    0.2104542553 * l + 0.793617785 * m - 0.0040720468 * s,
    1.9779984951 * l - 2.428592205 * m + 0.4505937099 * s,
    0.0259040371 * l + 0.7827717662 * m - 0.808675766 * s,
  ];
}

const SIGHT: Record<string, readonly [Rgb, Rgb, Rgb]> = {
  normal: [
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
  ],
  protanopia: [
    [0.152286, 1.052583, -0.204868],
    [0.114503, 0.786281, 0.099216],
    [-0.003882, -0.048116, 1.051998],
  ],
  deuteranopia: [
    [0.367322, 0.860646, -0.227968],
    [0.280085, 0.672501, 0.047413],
    [-0.01182, 0.04294, 0.968881],
  ],
  tritanopia: [
    [1.255528, -0.076749, -0.178779],
    [-0.078411, 0.930809, 0.147602],
    [0.004733, 0.691367, 0.3039],
  ],
};

function seen(hex: string, sight: readonly [Rgb, Rgb, Rgb]): Rgb {
  const [r, g, b] = linear(hex);
  const clip = (row: Rgb): number => Math.min(1, Math.max(0, row[0] * r + row[1] * g + row[2] * b));
  return oklab([clip(sight[0]), clip(sight[1]), clip(sight[2])]);
}

function distance(a: Rgb, b: Rgb): number {
  return Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]);
}

const SCHEMES: readonly Scheme[] = ["light", "dark"];
const ratio = (ink: Ink, on: Ink, scheme: Scheme): number => contrast(ink[scheme], on[scheme]);

describe.each(SCHEMES)("the %s scheme", (scheme) => {
  it("sets every text at a contrast of at least 4.5", () => {
    for (const ink of [PAGE.ink, PAGE.soft, PAGE.link, PAGE.outside, PAGE.tolerance]) {
      for (const on of [PAGE.paper, PAGE.wash])
        expect(ratio(ink, on, scheme), ink.variable).toBeGreaterThanOrEqual(4.5);
    }
    for (const tint of [TINTS.none, ...TINTS.above, ...TINTS.below]) {
      expect(ratio(PAGE.ink, tint, scheme), tint.variable).toBeGreaterThanOrEqual(4.5);
    }
    for (const ink of FAMILY_ORDER.flatMap((family) => [...FAMILIES[family].inks])) {
      expect(ratio(ink, PAGE.paper, scheme), ink.variable).toBeGreaterThanOrEqual(4.5);
    }
  });

  it.each(Object.keys(SIGHT))("keeps families apart for %s", (name) => {
    const sight = SIGHT[name];
    if (sight === undefined) throw new Error(name);
    for (const a of FAMILY_ORDER) {
      for (const b of FAMILY_ORDER.slice(FAMILY_ORDER.indexOf(a) + 1)) {
        for (const x of FAMILIES[a].inks) {
          for (const y of FAMILIES[b].inks) {
            const apart = distance(seen(x[scheme], sight), seen(y[scheme], sight));
            expect(apart, `${x.variable} ${y.variable}`).toBeGreaterThan(0.06);
          }
        }
      }
    }
  });

  it("tells sources of a family apart by lightness", () => {
    for (const family of FAMILY_ORDER) {
      const lights = FAMILIES[family].inks.map((ink) => oklab(linear(ink[scheme]))[0]).sort((a, b) => a - b);
      for (let i = 1; i < lights.length; i++)
        expect((lights[i] ?? 0) - (lights[i - 1] ?? 0)).toBeGreaterThan(0.02);
    }
  });
});

describe("families", () => {
  it("differ in dash and in point shape too", () => {
    expect(new Set(FAMILY_ORDER.map((family) => FAMILIES[family].shape)).size).toBe(4);
    expect(new Set(FAMILY_ORDER.map((family) => FAMILIES[family].dash.join())).size).toBe(4);
  });

  it("share no light colour, by which charts name their colours", () => {
    const lights = allInks().map((ink) => ink.light);
    expect(new Set(lights).size).toBe(lights.length);
  });
});

describe("the yardsticks themselves", () => {
  it("give the contrast of black on white that WCAG states, 21", () => {
    expect(contrast("#000000", "#ffffff")).toBeCloseTo(21, 10);
  });

  it("give Oklab's published values for white and red", () => {
    // White is (1, 0, 0) by construction; red as in CSS Color 4, section on oklab(): 0.628, 0.225, 0.126.
    expect(oklab([1, 1, 1])[0]).toBeCloseTo(1, 4);
    const [l, a, b] = oklab([1, 0, 0]);
    expect([l, a, b].map((v) => Math.round(v * 1000) / 1000)).toEqual([0.628, 0.225, 0.126]);
  });
});
