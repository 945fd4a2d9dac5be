/** The syntax tree of a formula as the compiler sees it: what mathjs parsed, cut down to the language, with positions. */
import type { FormulaPosition } from "./contract.js";

export type Expression =
  | { readonly kind: "number"; readonly value: number | boolean; readonly at: FormulaPosition }
  | { readonly kind: "name"; readonly name: string; readonly at: FormulaPosition }
  | Operation
  | Call
  | Choice
  | { readonly kind: "list"; readonly items: readonly Expression[]; readonly at: FormulaPosition }
  | Range
  | Index;

/** A prefix operator has one argument, an infix one two. */
export interface Operation {
  readonly kind: "operator";
  readonly operator: string;
  readonly args: readonly Expression[];
  readonly at: FormulaPosition;
}

export interface Call {
  readonly kind: "call";
  readonly name: string;
  readonly args: readonly Expression[];
  readonly at: FormulaPosition;
}

export interface Choice {
  readonly kind: "choice";
  readonly condition: Expression;
  readonly yes: Expression;
  readonly no: Expression;
  readonly at: FormulaPosition;
}

export interface Range {
  readonly kind: "range";
  readonly start: Expression;
  readonly step: Expression | null;
  readonly end: Expression;
  readonly at: FormulaPosition;
}

export interface Index {
  readonly kind: "index";
  readonly of: Expression;
  readonly indices: readonly Expression[];
  readonly at: FormulaPosition;
}

export type Statement =
  | {
      readonly kind: "assign";
      readonly name: string;
      readonly value: Expression;
      readonly at: FormulaPosition;
    }
  | Definition
  | { readonly kind: "value"; readonly value: Expression; readonly at: FormulaPosition };

/** A helper function, `f(a, b) = ...`. */
export interface Definition {
  readonly kind: "define";
  readonly name: string;
  readonly parameters: readonly string[];
  readonly body: Expression;
  readonly at: FormulaPosition;
}
