/** Markup with escaping by default: whatever is put into the template is text unless it is html already. */

/** A piece of finished markup. */
export class Markup {
  readonly text: string;

  constructor(text: string) {
    this.text = text;
  }
}

/** A text as it may stand in html and in double-quoted attributes. */
export function escapeHtml(text: string): string {
  return text
    .replace(/&/g, "&amp;")
    .replace(/</g, "&lt;")
    .replace(/>/g, "&gt;")
    .replace(/"/g, "&quot;")
    .replace(/'/g, "&#39;");
}

type Piece = Markup | string | number | null | false | readonly Piece[];

function piece(value: Piece): string {
  if (value === null || value === false) return "";
  if (value instanceof Markup) return value.text;
  if (typeof value === "object") return value.map(piece).join("");
  return escapeHtml(String(value));
}

/**
 * A template of markup; interpolated strings and numbers are escaped, null and false are nothing. Line breaks and the
 * indentation of the template itself shrink to one line break; what is put in is kept as it is.
 */
export function html(parts: TemplateStringsArray, ...values: readonly Piece[]): Markup {
  const tight = parts.map((part) => part.replace(/\n\s+/g, "\n"));
  return new Markup(tight.map((part, i) => part + piece(values[i] ?? null)).join(""));
}

/** Markup made by this program, put in as it is. */
export function raw(text: string): Markup {
  return new Markup(text);
}

/** Data for a script block: JSON in which nothing can end the block or begin a comment. */
export function embeddedJson(value: unknown): string {
  return JSON.stringify(value)
    .replace(/</g, "\\u003c")
    .replace(/>/g, "\\u003e")
    .replace(/&/g, "\\u0026")
    .replace(/\u2028/g, "\\u2028")
    .replace(/\u2029/g, "\\u2029");
}
