/**
 * Syntax tree to graph: names are looked up, shapes checked, helper functions expanded in place. What comes out has no
 * names and no shapes left to check.
 */
import { editDistance, nearest } from "../numeric/nearest.js";
import type { Builder } from "./builder.js";
import { FormulaError } from "./contract.js";
import type { FormulaConstant, FormulaPosition, FormulaScope } from "./contract.js";
import { applyFunction } from "./functions.js";
import { index, indexRange } from "./indexing.js";
import { isVector } from "./ir.js";
import type { IrNode } from "./ir.js";
import { FUNCTIONS, LIMITS, NAMED_NUMBERS, RESERVED_WORDS, isFunctionName } from "./language.js";
import { messages } from "./messages.js";
import { applyInfix, applyPrefix, choose } from "./operators.js";
import { describe, matrix, plain } from "./shapes.js";
import type { Value } from "./shapes.js";
import type { Call, Definition, Expression, Statement } from "./syntax.js";

/** A name given on a line of the formula. */
export interface NamedShape {
  readonly name: string;
  readonly shape: string;
}

export interface Elaborated {
  readonly result: Value;
  readonly names: readonly NamedShape[];
}

const NAME = /^[A-Za-z_\u00C0-\u02AF\u0370-\u03FF][A-Za-z0-9_\u00C0-\u02AF\u0370-\u03FF]*$/;

/** Elaborates the statements of a formula. Throws FormulaError. */
export function elaborate(
  statements: readonly Statement[],
  scope: FormulaScope,
  builder: Builder,
): Elaborated {
  return new Elaborator(scope, builder).run(statements);
}

/** Names that an expression can see: those of the formula, or the parameters of a helper function in front of them. */
type Names = ReadonlyMap<string, Value>;

class Elaborator {
  readonly #builder: Builder;
  readonly #global = new Map<string, Value>();
  readonly #helpers = new Map<string, Definition>();
  readonly #taken = new Map<string, string>();
  /** Vectors being indexed, innermost last: what `end` refers to. */
  readonly #ends: number[] = [];
  #depth = 0;
  #steps = 0;

  constructor(scope: FormulaScope, builder: Builder) {
    this.#builder = builder;
    for (const name of Object.keys(NAMED_NUMBERS)) this.#taken.set(name, "a named number");
    for (const name of Object.keys(FUNCTIONS)) this.#taken.set(name, "a function");
    for (const name of RESERVED_WORDS) this.#taken.set(name, "the formula language");
    for (const [name, { value }] of Object.entries(NAMED_NUMBERS)) {
      this.#global.set(
        name,
        plain(typeof value === "number" ? builder.number(value) : builder.condition(value)),
      );
    }
    for (const [name, value] of Object.entries(scope.constants)) {
      this.#take(name, "a constant");
      this.#global.set(name, this.#constant(value));
    }
    for (const input of scope.inputs) {
      this.#take(input.name, "an input");
      const node = input.length === null ? builder.row(input.first) : builder.rows(input.first, input.length);
      this.#global.set(input.name, plain(node));
    }
  }

  run(statements: readonly Statement[]): Elaborated {
    const names: NamedShape[] = [];
    let result: Value | null = null;
    statements.forEach((statement, i) => {
      this.#builder.at = statement.at;
      const last = i === statements.length - 1;
      if (statement.kind === "value") {
        if (!last) this.#fail(messages.unusedValue(), statement.at);
        result = this.#expression(statement.value, this.#global);
      } else if (last) {
        this.#fail(messages.noResult(), statement.at);
      } else if (statement.kind === "assign") {
        const value = this.#expression(statement.value, this.#global);
        this.#builder.at = statement.at;
        this.#take(statement.name, `line ${statement.at.line}`);
        this.#global.set(statement.name, value);
        names.push({ name: statement.name, shape: describe(value) });
      } else {
        this.#define(statement);
      }
    });
    return { result: result ?? this.#fail(messages.empty(), { line: 1, column: 1 }), names };
  }

  #fail(message: string, at: FormulaPosition): never {
    throw new FormulaError(message, at);
  }

  #take(name: string, by: string): void {
    if (!NAME.test(name)) this.#builder.fail(messages.invalidName(name));
    const owner = this.#taken.get(name);
    if (owner !== undefined) this.#builder.fail(messages.taken(name, owner));
    this.#taken.set(name, by);
  }

  #constant(value: FormulaConstant): Value {
    if (typeof value === "number") return plain(this.#builder.number(value));
    const [first] = value;
    if (typeof first !== "object")
      return plain(this.#builder.values(Float64Array.from(value as readonly number[])));
    const rows = value as readonly (readonly number[])[];
    const ragged = rows.find((row) => row.length !== first.length);
    if (ragged !== undefined) this.#builder.fail(messages.raggedRows(first.length, ragged.length));
    return matrix(this.#builder.values(Float64Array.from(rows.flat())), rows.length);
  }

  #define(definition: Definition): void {
    this.#take(definition.name, `line ${definition.at.line}`);
    const parameters = new Set<string>();
    for (const parameter of definition.parameters) {
      const owner = this.#taken.get(parameter);
      const hides = owner === "a function" || owner === "a named number" || owner === "the formula language";
      if (hides) this.#fail(messages.taken(parameter, owner), definition.at);
      if (parameters.has(parameter)) this.#fail(messages.duplicateParameter(parameter), definition.at);
      parameters.add(parameter);
    }
    this.#checkNames(definition.body, definition, parameters);
    this.#helpers.set(definition.name, definition);
  }

  /** A helper's names are checked where it stands, even if it is never used. */
  #checkNames(node: Expression, within: Definition, parameters: ReadonlySet<string>): void {
    const check = (inner: Expression): void => this.#checkNames(inner, within, parameters);
    switch (node.kind) {
      case "number":
        return;
      case "name":
        if (node.name === within.name) this.#fail(messages.recursion(node.name), node.at);
        if (node.name !== "end" && !parameters.has(node.name)) this.#lookUp(node.name, node.at, this.#global);
        return;
      case "call":
        if (node.name === within.name) this.#fail(messages.recursion(node.name), node.at);
        if (!isFunctionName(node.name) && !this.#helpers.has(node.name)) this.#unknownFunction(node);
        return node.args.forEach(check);
      case "operator":
        return node.args.forEach(check);
      case "list":
        return node.items.forEach(check);
      case "choice":
        return [node.condition, node.yes, node.no].forEach(check);
      case "range":
        return [node.start, ...(node.step === null ? [] : [node.step]), node.end].forEach(check);
      case "index":
        return [node.of, ...node.indices].forEach(check);
    }
  }

  #expression(node: Expression, names: Names): Value {
    this.#depth += 1;
    this.#steps += 1;
    if (this.#depth > LIMITS.depth) this.#fail(messages.tooDeep(), node.at);
    if (this.#steps > 10 * LIMITS.operations) this.#fail(messages.tooManyOperations(), node.at);
    const value = this.#evaluate(node, names);
    this.#depth -= 1;
    return value;
  }

  #evaluate(node: Expression, names: Names): Value {
    const builder = this.#builder;
    switch (node.kind) {
      case "number":
        builder.at = node.at;
        return plain(
          typeof node.value === "number" ? builder.number(node.value) : builder.condition(node.value),
        );
      case "name":
        return this.#lookUp(node.name, node.at, names);
      case "operator": {
        const [first, second] = node.args.map((arg) => this.#expression(arg, names));
        builder.at = node.at;
        if (first === undefined) return builder.fail(messages.syntax("an operand is missing"));
        return second === undefined
          ? applyPrefix(builder, node.operator, first)
          : applyInfix(builder, node.operator, first, second);
      }
      case "choice": {
        const condition = this.#expression(node.condition, names);
        const yes = this.#expression(node.yes, names);
        const no = this.#expression(node.no, names);
        builder.at = node.at;
        return choose(builder, condition, yes, no);
      }
      case "call":
        return this.#call(node, names);
      case "list":
        return this.#list(node.items, node.at, names);
      case "range": {
        const start = this.#constantNumber(node.start, "the start of a range", names);
        const step = node.step === null ? 1 : this.#constantNumber(node.step, "the step of a range", names);
        const end = this.#constantNumber(node.end, "the end of a range", names);
        builder.at = node.at;
        return plain(builder.values(indexRange(builder, start, step, end)));
      }
      case "index": {
        const of = this.#expression(node.of, names);
        const indices = node.indices.map((item, i) => {
          this.#ends.push(endOf(of, i));
          const value = this.#expression(item, names);
          this.#ends.pop();
          return value;
        });
        builder.at = node.at;
        return index(builder, of, indices);
      }
    }
  }

  #lookUp(name: string, at: FormulaPosition, names: Names): Value {
    this.#builder.at = at;
    if (name === "end") {
      const end = this.#ends.at(-1);
      return end === undefined ? this.#fail(messages.endOutside(), at) : plain(this.#builder.number(end));
    }
    const value = names.get(name);
    if (value !== undefined) return value;
    if (isFunctionName(name) || this.#helpers.has(name)) this.#fail(messages.functionAsValue(name), at);
    const known = [...names.keys()].filter((key) => !Object.hasOwn(NAMED_NUMBERS, key));
    return this.#fail(messages.unknownName(name, near(name, names.keys()), known), at);
  }

  #call(node: Call, names: Names): Value {
    const helper = this.#helpers.get(node.name);
    if (helper === undefined && !isFunctionName(node.name)) this.#unknownFunction(node);
    const args = node.args.map((arg) => this.#expression(arg, names));
    this.#builder.at = node.at;
    if (helper === undefined) return applyFunction(this.#builder, node.name as keyof typeof FUNCTIONS, args);
    const wanted = helper.parameters.length;
    if (args.length !== wanted) {
      this.#fail(messages.argumentCount(node.name, wanted, wanted, args.length), node.at);
    }
    const inner = new Map(this.#global);
    helper.parameters.forEach((parameter, i) => inner.set(parameter, args[i] as Value));
    return this.#expression(helper.body, inner);
  }

  #unknownFunction(node: Call): never {
    if (this.#global.has(node.name)) this.#fail(messages.notAFunction(node.name), node.at);
    const names = [...Object.keys(FUNCTIONS), ...this.#helpers.keys()];
    return this.#fail(messages.unknownFunction(node.name, near(node.name, names)), node.at);
  }

  #list(items: readonly Expression[], at: FormulaPosition, names: Names): Value {
    const values = items.map((item) => this.#expression(item, names));
    const builder = this.#builder;
    builder.at = at;
    const [first] = values;
    if (first === undefined) return builder.fail(messages.emptyList());
    const numbers: IrNode[] = [];
    const rows: Float64Array[] = [];
    for (const value of values) {
      if (value.kind === "matrix") builder.fail(messages.listOfVectors(describe(value)));
      if (!isVector(value.node)) numbers.push(value.node);
      else if (value.node.kind === "values") rows.push(value.node.values);
      else if (value.node.length === first.node.length) builder.fail(messages.matrixNotConstant());
    }
    if (numbers.length === values.length) return plain(builder.stack(numbers));
    const odd = values.find((value) => isVector(value.node) !== isVector(first.node));
    if (odd !== undefined) builder.fail(messages.listOfVectors(`${describe(first)} and ${describe(odd)}`));
    const length = first.node.length ?? 0;
    const ragged = rows.find((row) => row.length !== length);
    if (ragged !== undefined) builder.fail(messages.raggedRows(length, ragged.length));
    const all = new Float64Array(rows.length * length);
    rows.forEach((row, i) => all.set(row, i * length));
    return matrix(builder.values(all), rows.length);
  }

  #constantNumber(node: Expression, what: string, names: Names): number {
    const value = this.#expression(node, names);
    this.#builder.at = node.at;
    if (value.kind === "matrix" || isVector(value.node)) {
      return this.#builder.fail(messages.notANumber(what, describe(value)));
    }
    if (value.node.kind !== "number") return this.#builder.fail(messages.notConstant(what));
    return value.node.value;
  }
}

/** What `end` means in position `i` of an index. */
function endOf(of: Value, i: number): number {
  if (of.kind === "matrix") return i === 0 ? of.rows : of.columns;
  return of.node.length ?? 1;
}

/** The nearest known name, unless every letter of it would have to change. */
function near(name: string, names: Iterable<string>): string | null {
  const best = nearest(name, names);
  return best !== null &&
    editDistance(name, best) <= Math.max(1, name.length / 3) &&
    editDistance(name, best) < name.length
    ? best
    : null;
}
