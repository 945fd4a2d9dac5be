/**
 * One loop over the elements of vectors, with everything that is computed in it: reductions into accumulators, running
 * sums, stores to scratch memory. Constant elements and matrix products serve all vectors of the turn and are computed
 * first; the rest is written vector by vector, which keeps few values alive at a time.
 */
import { isVector, operands } from "../ir.js";
import type { IrNode, ProductNode, ScanNode, VectorNode } from "../ir.js";
import { COMBINE, START } from "../reductions.js";
import { INLINE_DEPTH } from "../plan.js";
import type { Loop, Sink } from "../plan.js";
import { writeOperation } from "./apply.js";
import { Code } from "./code.js";
import { PARAMETERS, VECTOR } from "./frame.js";
import type { Frame } from "./frame.js";
import { OP } from "./opcodes.js";
import { Pointers } from "./pointers.js";

export function writeLoop(frame: Frame, loop: Loop): void {
  new LoopWriter(frame, loop).write();
}

class LoopWriter {
  readonly #frame: Frame;
  readonly #loop: Loop;
  readonly #entry = new Code();
  readonly #body = new Code();
  readonly #pointers: Pointers;
  /** Vectors whose current element stands in a local, by id: one local per vector of the turn, or one for all. */
  readonly #bound = new Map<number, readonly number[]>();
  readonly #stored: ReadonlySet<number>;
  readonly #nodes: readonly VectorNode[];

  constructor(frame: Frame, loop: Loop) {
    this.#frame = frame;
    this.#loop = loop;
    this.#pointers = new Pointers(frame, loop.length);
    this.#stored = new Set(loop.sinks.flatMap((sink) => (sink.kind === "store" ? [sink.node.id] : [])));
    this.#nodes = this.#collect();
  }

  write(): void {
    const frame = this.#frame;
    const scans = this.#nodes.filter(
      (node): node is ScanNode & VectorNode => node.kind === "scan" && !this.#isRead(node),
    );
    for (const scan of scans) this.#bound.set(scan.id, this.#accumulator(scan.op));
    // A sum beside the running sums of the same vector is their last one.
    const shared = new Set<Sink>();
    for (const sink of this.#loop.sinks) {
      if (sink.kind !== "reduce") continue;
      const scan = scans.find((candidate) => candidate.op === sink.node.op && candidate.of === sink.value);
      if (scan !== undefined) shared.add(sink);
      frame.bind(sink.node, this.#bound.get(scan?.id ?? -1) ?? this.#accumulator(sink.node.op));
    }
    for (const node of this.#nodes) {
      if (node.kind === "values") this.#bindValues(node.id, this.#frame.pool.vector(node));
      if (node.kind === "product") this.#bindProduct(node);
    }
    const bound = this.#nodesToBind();
    for (const node of bound) if (node.kind !== "scan") this.#bound.set(node.id, frame.vectors());
    for (let u = 0; u < frame.unroll; u++) {
      for (const node of bound) this.#compute(node, u);
      for (const sink of this.#loop.sinks) {
        if (sink.kind === "store") {
          writeStore(this.#body, this.#pointers, frame, sink.node, () => this.#push(sink.value, u), u);
        } else if (!shared.has(sink)) {
          const local = frame.localOf(sink.node, u);
          this.#body.get(local);
          this.#push(sink.value, u);
          this.#body.simd(COMBINE[sink.node.op]);
          this.#body.set(local);
        }
      }
    }
    this.#pointers.writeAdvance(this.#body);
    const counter = frame.locals.integer();
    frame.code.append(this.#entry);
    this.#pointers.writeEntry(frame.code);
    frame.code.integer(this.#loop.length);
    frame.code.set(counter);
    frame.code.loop(counter, 1, this.#body);
  }

  /** Vectors computed or read in this loop, arguments before users. */
  #collect(): VectorNode[] {
    const found = new Map<number, VectorNode>();
    const queue = this.#loop.sinks.map((sink) => sink.value);
    for (let node = queue.pop(); node !== undefined; node = queue.pop()) {
      if (found.has(node.id)) continue;
      found.set(node.id, node);
      if (this.#isRead(node)) continue;
      if (node.kind === "apply" || node.kind === "scan") queue.push(...operands(node).filter(isVector));
    }
    return [...found.values()].sort((a, b) => a.id - b.id);
  }

  /** Whether the elements are read from memory in this loop, not computed. */
  #isRead(node: VectorNode): boolean {
    return this.#frame.plan.memory.has(node.id) && !this.#stored.has(node.id);
  }

  #isComputed(node: VectorNode): boolean {
    return (node.kind === "apply" || node.kind === "scan") && !this.#isRead(node);
  }

  /** Computed vectors that need a local: used more than once, stored, running, or nested deep. */
  #nodesToBind(): VectorNode[] {
    const uses = new Map<number, number>();
    const use = (node: IrNode): void => void uses.set(node.id, (uses.get(node.id) ?? 0) + 1);
    for (const sink of this.#loop.sinks) use(sink.value);
    for (const node of this.#nodes)
      if (this.#isComputed(node)) for (const operand of operands(node)) use(operand);
    const depths = new Map<number, number>();
    return this.#nodes.filter((node) => {
      if (!this.#isComputed(node)) return node.kind === "rows" && (uses.get(node.id) ?? 0) > 1;
      const depth = 1 + Math.max(0, ...operands(node).map((operand) => depths.get(operand.id) ?? 0));
      const bind = node.kind === "scan" || (uses.get(node.id) ?? 0) > 1 || depth > INLINE_DEPTH;
      depths.set(node.id, bind ? 0 : depth);
      return bind;
    });
  }

  #accumulator(op: keyof typeof START): number[] {
    const locals = this.#frame.vectors();
    for (const local of locals) {
      this.#frame.pushConstant(this.#entry, START[op]);
      this.#entry.set(local);
    }
    return locals;
  }

  #bindValues(id: number, offset: number): void {
    const local = this.#frame.locals.vector();
    this.#body.loadSplat(this.#pointers.pool(), offset);
    this.#body.set(local);
    this.#bound.set(id, new Array<number>(this.#frame.unroll).fill(local));
  }

  /** Row after row: an inner loop over the columns. */
  #bindProduct(node: ProductNode): void {
    const frame = this.#frame;
    if (this.#isRead(node)) return;
    const sums = frame.vectors();
    const body = new Code();
    const inner = new Pointers(frame, node.columns);
    const matrix = this.#matrixPointer(node);
    const weight = frame.locals.vector();
    for (const local of sums) {
      frame.pushConstant(this.#body, 0);
      this.#body.set(local);
    }
    body.loadSplat(matrix, 0);
    body.set(weight);
    for (let u = 0; u < frame.unroll; u++) {
      body.get(sums[u] ?? 0);
      body.get(weight);
      pushElement(body, inner, frame, node.of, u);
      body.simd("mul");
      body.simd("add");
      body.set(sums[u] ?? 0);
    }
    body.advance(matrix, 8);
    inner.writeAdvance(body);
    inner.writeEntry(this.#body);
    const counter = frame.locals.integer();
    this.#body.integer(node.columns);
    this.#body.set(counter);
    this.#body.loop(counter, 1, body);
    this.#bound.set(node.id, sums);
  }

  /** A pointer that runs through the whole matrix, from the first turn of the outer loop to the last. */
  #matrixPointer(node: ProductNode): number {
    const local = this.#frame.locals.integer();
    this.#entry.get(PARAMETERS.pool);
    this.#entry.integer(this.#frame.pool.vector(node.matrix));
    this.#entry.op(OP.i32Add);
    this.#entry.set(local);
    return local;
  }

  #compute(node: VectorNode, u: number): void {
    const local = this.#bound.get(node.id)?.[u] ?? 0;
    if (node.kind === "scan") {
      this.#body.get(local);
      this.#push(node.of, u);
      this.#body.simd(COMBINE[node.op]);
    } else {
      this.#pushComputed(node, u);
    }
    this.#body.set(local);
  }

  #push(node: IrNode, u: number): void {
    if (!isVector(node)) return this.#frame.pushNumber(this.#body, node, u);
    const bound = this.#bound.get(node.id);
    if (bound !== undefined) this.#body.get(bound[u] ?? 0);
    else this.#pushComputed(node, u);
  }

  #pushComputed(node: VectorNode, u: number): void {
    if (node.kind !== "apply" || this.#isRead(node)) {
      return pushElement(this.#body, this.#pointers, this.#frame, node, u);
    }
    writeOperation(this.#body, node.op, node.args.length, {
      push: (argument) => this.#push(node.args[argument] as IrNode, u),
      pushOne: () => this.#frame.pushConstant(this.#body, 1),
      kernel: (name) => this.#frame.kernels.splice(this.#body, name),
    });
  }
}

/** Pushes the current element of coordinates or of a vector in memory. */
function pushElement(code: Code, pointers: Pointers, frame: Frame, node: VectorNode, u: number): void {
  if (node.kind === "rows") pointers.pushRow(code, node, u);
  else if (node.kind === "slice") pointers.pushMemory(code, node.of, node.first, node.step, u);
  else if (frame.plan.memory.has(node.id)) pointers.pushMemory(code, node, 0, 1, u);
  else throw new TypeError(`a ${node.kind} that is not in memory`);
}

function writeStore(
  code: Code,
  pointers: Pointers,
  frame: Frame,
  node: VectorNode,
  push: () => void,
  u: number,
): void {
  code.get(pointers.memory(1));
  push();
  code.store(frame.memoryOffset(node, 0) + u * VECTOR);
}
