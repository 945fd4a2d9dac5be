/**
 * What all pages share: one file, whole without a network and without JavaScript. Its policy allows its own style sheet and
 * script, named by their hashes, and nothing else: no address is loaded, no text is evaluated.
 */
import { createHash } from "node:crypto";
import { type Markup, html, raw } from "./html.js";
import { styleSheet } from "./style.js";

function hashed(text: string): string {
  return `'sha256-${createHash("sha256").update(text).digest("base64")}'`;
}

function policy(style: string, script: string | null): string {
  return [
    "default-src 'none'",
    `style-src ${hashed(style)}`,
    `script-src ${script === null ? "'none'" : hashed(script)}`,
    "base-uri 'none'",
    "form-action 'none'",
  ].join("; ");
}

export interface Shell {
  readonly title: string;
  readonly contents: Markup;
  readonly main: Markup;
  /** What stands behind the sheet, and the script that needs it; null for a page without one. */
  readonly after: Markup | null;
  readonly script: string | null;
}

/** The text of a page. */
export function shell({ title, contents, main, after, script }: Shell): string {
  const style = styleSheet();
  const whole = html`<!doctype html>
    <html lang="en">
      <head>
        <meta charset="utf-8" />
        <meta http-equiv="Content-Security-Policy" content="${policy(style, script)}" />
        <meta name="viewport" content="width=device-width, initial-scale=1" />
        <meta name="color-scheme" content="light dark" />
        <meta name="referrer" content="no-referrer" />
        <title>${title}</title>
        ${raw(`<style>${style}</style>`)}
      </head>
      <body>
        <div class="sheet">
          ${contents}
          <main>${main}</main>
        </div>
        ${after} ${script !== null && raw(`<script>${script}</script>`)}
      </body>
    </html> `;
  return whole.text;
}
