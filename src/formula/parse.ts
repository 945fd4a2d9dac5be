/**
 * Text to syntax tree. mathjs reads the expression (so precedence and associativity are its own); its tree is then
 * copied node by node into ours, which is the allow-list: what has no case here is refused. mathjs keeps no positions,
 * so the copy walks along the tokens of the text, which stand in the same order as the leaves of the tree.
 */
import type { MathJsInstance, MathNode } from "mathjs";
import { FormulaError } from "./contract.js";
import type { FormulaPosition } from "./contract.js";
import { LIMITS } from "./language.js";
import { place, tokenize } from "./lexer.js";
import type { Token } from "./lexer.js";
import { messages } from "./messages.js";
import type { Expression, Statement } from "./syntax.js";
import type {
  AccessorNode,
  AssignmentNode,
  BlockNode,
  ConditionalNode,
  ConstantNode,
  FunctionAssignmentNode,
  FunctionNode,
  OperatorNode,
  ParenthesisNode,
  RangeNode,
  RelationalNode,
  SymbolNode,
  ArrayNode,
  IndexNode,
} from "mathjs";

/** The nodes that mathjs makes, told apart by `type`. */
type Node =
  | AccessorNode
  | ArrayNode
  | AssignmentNode
  | BlockNode
  | ConditionalNode
  | ConstantNode
  | FunctionAssignmentNode
  | FunctionNode
  | IndexNode
  | OperatorNode
  | ParenthesisNode
  | RangeNode
  | RelationalNode
  | SymbolNode;

const RELATIONS: Readonly<Record<string, string>> = {
  smaller: "<",
  smallerEq: "<=",
  larger: ">",
  largerEq: ">=",
  equal: "==",
  unequal: "!=",
};

const BINARY = new Set([
  "+",
  "-",
  "*",
  "/",
  "^",
  ".*",
  "./",
  ".^",
  "mod",
  "and",
  "or",
  "<",
  "<=",
  ">",
  ">=",
  "==",
  "!=",
]);
const PREFIX = new Set(["-", "+", "not"]);

/** Parses a formula into its statements. Throws FormulaError for what is not in the language. */
export function parseFormula(text: string, math: MathJsInstance): Statement[] {
  const tokens = tokenize(text);
  const root = parseWithMathjs(text.replaceAll("\r", " "), math);
  checkDepth(root, tokens);
  return new Copy(tokens).statements(root as unknown as Node);
}

function parseWithMathjs(text: string, math: MathJsInstance): MathNode {
  try {
    return math.parse(text);
  } catch (error) {
    if (error instanceof RangeError) throw new FormulaError(messages.tooDeep(), { line: 1, column: 1 });
    if (!(error instanceof Error)) throw error;
    const char = "char" in error && typeof error.char === "number" ? error.char : 1;
    const before = text.slice(0, char - 1).split("\n");
    const reason = error.message.replace(/ \(char \d+\)$/, "");
    throw new FormulaError(messages.syntax(reason.charAt(0).toLowerCase() + reason.slice(1)), {
      line: before.length,
      column: (before.at(-1) ?? "").length + 1,
    });
  }
}

/** The copy below is recursive: a tree too deep for it is refused first, by a walk that is not. */
function checkDepth(root: MathNode, tokens: readonly Token[]): void {
  let level: MathNode[] = [root];
  for (let depth = 0; level.length > 0; depth++) {
    const first = tokens[0];
    if (depth > LIMITS.depth && first !== undefined) throw new FormulaError(messages.tooDeep(), place(first));
    const next: MathNode[] = [];
    for (const node of level) node.forEach((child) => next.push(child));
    level = next;
  }
}

class Copy {
  readonly #tokens: readonly Token[];
  #cursor = 0;

  constructor(tokens: readonly Token[]) {
    this.#tokens = tokens;
  }

  statements(root: Node): Statement[] {
    if (root.type !== "BlockNode") return [this.#statement(root)];
    return root.blocks.map((block) => this.#statement(block.node as unknown as Node));
  }

  #statement(node: Node): Statement {
    const at = this.#here();
    if (node.type === "AssignmentNode") {
      const target = node.object as unknown as Node;
      if (target.type !== "SymbolNode" || node.index !== null) {
        throw new FormulaError(
          messages.notInLanguage("assignment to an element", "give the whole vector a name"),
          at,
        );
      }
      this.#seek(target.name);
      return { kind: "assign", name: target.name, value: this.#expression(node.value), at };
    }
    if (node.type === "FunctionAssignmentNode") {
      this.#seek(node.name);
      for (const parameter of node.params) this.#seek(parameter);
      this.#seek("=");
      return {
        kind: "define",
        name: node.name,
        parameters: node.params,
        body: this.#expression(node.expr),
        at,
      };
    }
    return { kind: "value", value: this.#expression(node), at };
  }

  #expression(mathNode: MathNode): Expression {
    const node = mathNode as unknown as Node;
    switch (node.type) {
      case "ParenthesisNode":
        return this.#expression(node.content);
      case "ConstantNode":
        return this.#constant(node);
      case "SymbolNode":
        return { kind: "name", name: node.name, at: this.#seek(node.name) };
      case "OperatorNode":
        return this.#operator(node);
      case "RelationalNode":
        return this.#relation(node);
      case "FunctionNode":
        return this.#call(node);
      case "ConditionalNode": {
        const condition = this.#expression(node.condition);
        const at = this.#seek("?");
        const yes = this.#expression(node.trueExpr);
        this.#seek(":");
        return { kind: "choice", condition, yes, no: this.#expression(node.falseExpr), at };
      }
      case "ArrayNode": {
        const at = this.#seekList();
        return { kind: "list", items: node.items.map((item) => this.#expression(item)), at };
      }
      case "RangeNode":
        return this.#range(node);
      case "AccessorNode":
        return this.#index(node);
      case "AssignmentNode":
      case "FunctionAssignmentNode":
        throw new FormulaError(
          messages.notInLanguage("an assignment within an expression", "write it on a line of its own"),
          this.#here(),
        );
      default:
        throw new FormulaError(
          messages.notInLanguage(`this (${node.type})`, "numbers, names, operators, calls and lists are"),
          this.#here(),
        );
    }
  }

  #constant(node: ConstantNode): Expression {
    const at = this.#seekWhere((token) => token.kind === "number" || token.text === String(node.value));
    const value: unknown = node.value;
    if (typeof value === "boolean" || (typeof value === "number" && Number.isFinite(value))) {
      return { kind: "number", value, at };
    }
    throw new FormulaError(
      messages.notInLanguage(`the constant ${String(value)}`, "write a finite number"),
      at,
    );
  }

  #operator(node: OperatorNode): Expression {
    const operator: string = node.op;
    const [first, second] = node.args;
    if (second === undefined && first !== undefined && PREFIX.has(operator)) {
      const at = this.#seek(operator);
      return { kind: "operator", operator, args: [this.#expression(first)], at };
    }
    if (first === undefined || second === undefined || !BINARY.has(operator)) {
      throw new FormulaError(
        messages.notInLanguage(`the operator ${operator}`, "see the table of operators"),
        this.#here(),
      );
    }
    const left = this.#expression(first);
    if (node.implicit) {
      this.#skip(")", "]");
      throw new FormulaError(messages.implicitProduct(), this.#here());
    }
    const at = this.#seek(operator);
    return { kind: "operator", operator, args: [left, this.#expression(second)], at };
  }

  /** a < b < c: every neighbouring pair must hold. */
  #relation(node: RelationalNode): Expression {
    // The typings of mathjs leave out the fields of this node.
    const { conditionals, params } = node as unknown as { conditionals: string[]; params: MathNode[] };
    const first = params[0];
    if (first === undefined) throw new TypeError("a relation without operands");
    let left = this.#expression(first);
    let all: Expression | null = null;
    params.slice(1).forEach((param, i) => {
      const operator = RELATIONS[conditionals[i] ?? ""] ?? "";
      const at = this.#seek(operator);
      const right = this.#expression(param);
      const pair: Expression = { kind: "operator", operator, args: [left, right], at };
      all = all === null ? pair : { kind: "operator", operator: "and", args: [all, pair], at };
      left = right;
    });
    return all ?? left;
  }

  #call(node: FunctionNode): Expression {
    const target = node.fn as unknown as Node;
    if (target.type !== "SymbolNode") {
      throw new FormulaError(
        messages.notInLanguage("a call of what is not a name", "call functions by name"),
        this.#here(),
      );
    }
    const at = this.#seek(target.name);
    return { kind: "call", name: target.name, args: node.args.map((arg) => this.#expression(arg)), at };
  }

  #range(node: RangeNode): Expression {
    const start = this.#expression(node.start);
    const at = this.#seek(":");
    const step = node.step === null ? null : this.#expression(node.step);
    if (step !== null) this.#seek(":");
    return { kind: "range", start, step, end: this.#expression(node.end), at };
  }

  #index(node: AccessorNode): Expression {
    const index = node.index as unknown as IndexNode & { dotNotation: boolean };
    const of = this.#expression(node.object);
    if (index.dotNotation) {
      throw new FormulaError(
        messages.notInLanguage("access to properties", "elements are taken by number, x[2]"),
        this.#here(),
      );
    }
    const at = this.#seek("[");
    return { kind: "index", of, indices: index.dimensions.map((item) => this.#expression(item)), at };
  }

  #here(): FormulaPosition {
    const token = this.#tokens[this.#cursor] ?? this.#tokens.at(-1);
    return token === undefined ? { line: 1, column: 1 } : place(token);
  }

  #skip(...signs: string[]): void {
    while (signs.includes(this.#tokens[this.#cursor]?.text ?? "")) this.#cursor += 1;
  }

  #seek(text: string): FormulaPosition {
    return this.#seekWhere((token) => token.text === text);
  }

  /** Moves behind the next token that fits and returns its place. */
  #seekWhere(fits: (token: Token) => boolean): FormulaPosition {
    for (let i = this.#cursor; i < this.#tokens.length; i++) {
      const token = this.#tokens[i];
      if (token === undefined || !fits(token)) continue;
      this.#cursor = i + 1;
      return place(token);
    }
    return this.#here();
  }

  /** The rows of [1, 2; 3, 4] are lists without brackets of their own. */
  #seekList(): FormulaPosition {
    this.#skip("(", ")", ",", ";", "]");
    const at = this.#here();
    if (this.#tokens[this.#cursor]?.text === "[") this.#cursor += 1;
    return at;
  }
}
