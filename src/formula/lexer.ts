/**
 * The words of a formula with their positions. Runs before mathjs sees the text: what the language has no use for
 * (strings, property access, braces, excessive length or nesting) is refused here, with its place, in linear time.
 */
import { FormulaError } from "./contract.js";
import type { FormulaPosition } from "./contract.js";
import { LIMITS } from "./language.js";
import { messages } from "./messages.js";

export interface Token extends FormulaPosition {
  readonly kind: "number" | "name" | "sign";
  readonly text: string;
}

const NAME = /[A-Za-z_\u00C0-\u02AF\u0370-\u03FF][A-Za-z0-9_\u00C0-\u02AF\u0370-\u03FF]*/y;
// A dot before * / ^ belongs to the operator: "2.*x" is 2 .* x, as in mathjs.
const NUMBER = /(?:\d+(?:\.(?![*/^])\d*)?|\.\d+)(?:[eE][+-]?\d+)?/y;
const SIGN = /\.\*|\.\/|\.\^|==|!=|<=|>=|[-+*/^<>=?:,;()[\]]/y;
const BLANK = /[ \t\r]+|#[^\n]*/y;
const CLOSING: Readonly<Record<string, string>> = { "(": ")", "[": "]" };

/** Splits `text` into tokens. Throws FormulaError. */
export function tokenize(text: string): Token[] {
  if (text.length > LIMITS.characters)
    throw new FormulaError(messages.tooLong(text.length), { line: 1, column: 1 });
  const tokens: Token[] = [];
  const open: Token[] = [];
  let index = 0;
  let line = 1;
  let lineStart = 0;
  const match = (pattern: RegExp): string | null => {
    pattern.lastIndex = index;
    return pattern.exec(text)?.[0] ?? null;
  };
  const push = (kind: Token["kind"], word: string): void => {
    const token = { kind, text: word, line, column: index - lineStart + 1 };
    if (kind === "sign") checkBrackets(token, open);
    checkRange(token, tokens.at(-1));
    tokens.push(token);
    index += word.length;
  };
  while (index < text.length) {
    if (text[index] === "\n") {
      index += 1;
      line += 1;
      lineStart = index;
      continue;
    }
    const blank = match(BLANK);
    if (blank !== null) {
      index += blank.length;
      continue;
    }
    const at = { line, column: index - lineStart + 1 };
    const number = match(NUMBER);
    if (number !== null) {
      if (/^0[xXoObB]/.test(text.slice(index, index + 2))) throw new FormulaError(messages.hexadecimal(), at);
      push("number", number);
      continue;
    }
    const name = match(NAME);
    if (name !== null) {
      push("name", name);
      continue;
    }
    const sign = match(SIGN);
    if (sign === null)
      throw new FormulaError(messages.character(text, index, tokens.at(-1)?.kind === "name"), at);
    push("sign", sign);
  }
  const unclosed = open.at(-1);
  if (unclosed !== undefined) throw new FormulaError(messages.unclosed(unclosed.text), place(unclosed));
  if (tokens.length === 0) throw new FormulaError(messages.empty(), { line: 1, column: 1 });
  return tokens;
}

export function place(token: Token): FormulaPosition {
  return { line: token.line, column: token.column };
}

function checkBrackets(token: Token, open: Token[]): void {
  if (CLOSING[token.text] !== undefined) {
    open.push(token);
    if (open.length > LIMITS.brackets) throw new FormulaError(messages.tooNested(), place(token));
  } else if (token.text === ")" || token.text === "]") {
    const opening = open.pop();
    if (opening === undefined) throw new FormulaError(messages.unopened(token.text), place(token));
    if (CLOSING[opening.text] !== token.text) {
      throw new FormulaError(messages.crossed(opening.text, token.text), place(token));
    }
  }
}

/** mathjs lets the ends of a range be left out; the language does not. */
function checkRange(token: Token, previous: Token | undefined): void {
  const startMissing =
    token.text === ":" && previous !== undefined && ["[", ",", "("].includes(previous.text);
  const endMissing = previous?.text === ":" && ["]", ",", ")"].includes(token.text);
  if (startMissing || endMissing) throw new FormulaError(messages.openRange(), place(token));
}
