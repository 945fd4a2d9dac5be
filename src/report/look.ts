/**
 * The look of a report: colours, dashes and point shapes, chosen for these reports.
 *
 * A family of sources has one hue, one dash and one point shape through the whole report; sources inside a family
 * differ in lightness and by their label. The hues (indigo, ochre, teal, wine) and lightness ranges were found by a
 * random search that maximised the smallest distance between colours of different families in Oklab (Ottosson 2020),
 * for normal sight and for the full protanopia, deuteranopia and tritanopia simulated by the matrices of Machado,
 * Oliveira & Fernandes (2009), at a contrast of at least 4.5 to the page. Smallest distance found: 0.065 in the light
 * scheme, 0.084 in the dark one (a just noticeable difference is about 0.02). The tests repeat the measurement.
 *
 * Charts are written in the colours of the light scheme; in the page each of them becomes a CSS custom property, so one
 * drawing serves both schemes.
 */
import type { Family } from "../sources/contract.js";

/** A colour in both schemes. The light one is also its name in charts, so no two may share it. */
export interface Ink {
  readonly variable: string;
  readonly light: string;
  readonly dark: string;
}

function ink(variable: string, light: string, dark: string): Ink {
  return { variable: `--${variable}`, light, dark };
}

export const PAGE = {
  paper: ink("paper", "#fdfdfb", "#14181c"),
  ink: ink("ink", "#1b2127", "#e6e9ec"),
  soft: ink("soft", "#545d66", "#a3adb7"),
  rule: ink("rule", "#c9ced3", "#3d454d"),
  grid: ink("grid", "#e6e8ea", "#262c32"),
  wash: ink("wash", "#f1f2f0", "#1d2328"),
  link: ink("link", "#1d4f91", "#8ab8f2"),
  outside: ink("outside", "#a11616", "#ff9d8f"),
  tolerance: ink("tolerance", "#2a3037", "#d6dbe0"),
} as const;

/** Background tints of the bias map, from small to large; above is warm, below is cool. Text on them is `PAGE.ink`. */
export const TINTS = {
  none: ink("tint-none", "#f3f4f2", "#1f252a"),
  above: [
    ink("above-1", "#f8e3c8", "#44310f"),
    ink("above-2", "#efc28b", "#664612"),
    ink("above-3", "#e29f4d", "#8a5a10"),
  ],
  below: [
    ink("below-1", "#d8e6f6", "#1b3350"),
    ink("below-2", "#aacbee", "#214a78"),
    ink("below-3", "#7fb0e6", "#28619f"),
  ],
} as const;

/** How a family is drawn. */
export interface FamilyLook {
  readonly title: string;
  /** Four steps of lightness. */
  readonly inks: readonly [Ink, Ink, Ink, Ink];
  readonly dash: readonly number[];
  readonly dashWord: string;
  /** A Vega symbol. Circles and diamonds are kept for verdicts. */
  readonly shape: "triangle-up" | "square" | "cross" | "triangle-down";
  readonly shapeWord: string;
}

export const FAMILIES: Record<Family, FamilyLook> = {
  "pseudo-random": {
    title: "Pseudo-random",
    inks: [
      ink("pseudo-1", "#5020ab", "#8780f6"),
      ink("pseudo-2", "#6741ca", "#a3a2fe"),
      ink("pseudo-3", "#45079c", "#7a72e6"),
      ink("pseudo-4", "#5b31ba", "#9490fe"),
    ],
    dash: [1, 0],
    dashWord: "solid line",
    shape: "triangle-up",
    shapeWord: "triangle",
  },
  "quasi-random": {
    title: "Quasi-random",
    inks: [
      ink("quasi-1", "#844f04", "#f5bf71"),
      ink("quasi-2", "#a76502", "#fee3bd"),
      ink("quasi-3", "#734401", "#e6b162"),
      ink("quasi-4", "#955a07", "#ffd08d"),
    ],
    dash: [7, 3],
    dashWord: "long dashes",
    shape: "square",
    shapeWord: "square",
  },
  stratified: {
    title: "Stratified",
    inks: [
      ink("strat-1", "#0a6169", "#06e4ef"),
      ink("strat-2", "#017d88", "#9df9fe"),
      ink("strat-3", "#03535a", "#12d3de"),
      ink("strat-4", "#066f78", "#29f3ff"),
    ],
    dash: [2, 2],
    dashWord: "dots",
    shape: "cross",
    shapeWord: "cross",
  },
  own: {
    title: "Your own",
    inks: [
      ink("own-1", "#610029", "#dc6988"),
      ink("own-2", "#8a003e", "#fb85a3"),
      ink("own-3", "#4e0020", "#cc5b7a"),
      ink("own-4", "#750033", "#eb7795"),
    ],
    dash: [8, 3, 2, 3],
    dashWord: "dash and dot",
    shape: "triangle-down",
    shapeWord: "triangle on its tip",
  },
};

export const FAMILY_ORDER: readonly Family[] = ["pseudo-random", "quasi-random", "stratified", "own"];

/** Every colour of a report. */
export function allInks(): Ink[] {
  const families = FAMILY_ORDER.flatMap((family) => [...FAMILIES[family].inks]);
  return [...Object.values(PAGE), TINTS.none, ...TINTS.above, ...TINTS.below, ...families];
}
