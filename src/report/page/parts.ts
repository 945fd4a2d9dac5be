/** Small pieces that several sections share. */
import type { Verdict } from "../../record/types.js";
import { VERDICT_MARKS } from "../../findings/headline.js";
import type { SourceView } from "../view.js";
import { type Markup, html } from "./html.js";

/** A verdict: its shape and its word; `outside` stands out by weight and colour too. */
export function verdictMark(verdict: Verdict): Markup {
  const look = verdict === "outside" ? "verdict outside" : "verdict";
  return html`<span class="${look}"><span class="shape">${VERDICT_MARKS[verdict]}</span> ${verdict}</span>`;
}

/** Binds a number to its unit and to the sign before it, so that no line breaks between them. */
export function tied(text: string): string {
  return text
    .replace(/ ?(≤|>) (?=[\d−])/g, "\u00a0$1\u00a0")
    .replace(/(≈|=) (?=[\d−])/g, "$1\u00a0")
    .replace(/(\d) (?=(?:%|µs|ms|s|min|h|days|years|million|billion|points)(?![a-z]))/g, "$1\u00a0");
}

/** A source's name: leads to its section; with the script it is followed through all figures. */
export function sourceName(view: SourceView, label: string): Markup {
  return html`<a class="source" href="#source-${view.slug}" data-s="${view.index}">${label}</a>`;
}

/** Paragraphs of a user's text, split at empty lines. */
export function paragraphs(text: string): Markup[] {
  return text
    .split(/\n\s*\n/)
    .map((part) => part.trim())
    .filter((part) => part !== "")
    .map((part) => html`<p>${part}</p>`);
}
