/**
 * Decides in which order the graph is computed: stages of numbers and loops.
 *
 * Every reduction and every vector that must be kept in memory is a sink; what leads to it is computed inside the loop
 * over its elements and never written down. A sink's stage is one more than that of the reductions it needs, and sinks
 * of one stage and one length share a loop. A vector is kept in memory only if it is sliced, sorted, multiplied by a
 * matrix or, being expensive, needed by more than one loop.
 */
import { isVector, operands } from "./ir.js";
import type { IrNode, ReduceNode, SortNode, StackNode, VectorNode } from "./ir.js";

export type Sink =
  | { readonly kind: "reduce"; readonly node: ReduceNode; readonly value: VectorNode }
  /** Writes `value` to the memory of `node`; they differ for a sort only, which is filled first. */
  | { readonly kind: "store"; readonly node: VectorNode; readonly value: VectorNode };

export interface Loop {
  readonly length: number;
  readonly sinks: Sink[];
}

export interface Stage {
  /** Numbers to be kept in locals, then lists to be written to memory, in the order of their ids. */
  readonly numbers: (IrNode | StackNode)[];
  readonly loops: Loop[];
  /** Vectors to be sorted in place after the loops. */
  readonly sorts: SortNode[];
}

export interface Plan {
  readonly roots: readonly IrNode[];
  readonly stages: readonly Stage[];
  /** First row in scratch memory of each vector that is kept there, by id. */
  readonly memory: ReadonlyMap<number, number>;
  /** Rows of scratch memory in all. */
  readonly memoryRows: number;
}

/** An expression nested deeper than this gets a local, which bounds the recursion of the emitter. */
export const INLINE_DEPTH = 24;

/** Plans the computation of `roots` (numbers). `nodes` are all nodes by id; `isExpensive` as Builder's. */
export function makePlan(
  nodes: readonly IrNode[],
  roots: readonly IrNode[],
  isExpensive: (node: IrNode) => boolean,
): Plan {
  const live = reachable(nodes, roots);
  const kept = keptInMemory(live);
  const ready = readiness(live);
  const sinks = findSinks(live, kept, ready, isExpensive);
  const stageCount =
    1 + Math.max(0, ...live.map((node) => ready.get(node.id) ?? 0), ...sinks.map(({ stage }) => stage));
  const stages: Stage[] = Array.from({ length: stageCount }, () => ({ numbers: [], loops: [], sorts: [] }));
  for (const { sink, stage } of sinks) {
    // Loops of stage s run at the end of the stage before it.
    const loops = stages[stage - 1]?.loops ?? [];
    const length = sink.value.length;
    const loop = loops.find((candidate) => candidate.length === length);
    if (loop === undefined) loops.push({ length, sinks: [sink] });
    else loop.sinks.push(sink);
    if (sink.node.kind === "sort") stages[stage - 1]?.sorts.push(sink.node);
  }
  for (const node of numbersToBind(live, roots)) stages[ready.get(node.id) ?? 0]?.numbers.push(node);
  const memory = new Map<number, number>();
  let memoryRows = 0;
  for (const id of [...kept].sort((a, b) => a - b)) {
    memory.set(id, memoryRows);
    memoryRows += nodes[id]?.length ?? 0;
  }
  return { roots, stages, memory, memoryRows };
}

function reachable(nodes: readonly IrNode[], roots: readonly IrNode[]): IrNode[] {
  const marked = new Set(roots.map((root) => root.id));
  for (let id = nodes.length - 1; id >= 0; id--) {
    const node = nodes[id];
    if (node === undefined || !marked.has(id)) continue;
    for (const operand of operands(node)) marked.add(operand.id);
  }
  return nodes.filter((node) => marked.has(node.id));
}

/** Whether the elements of the vector can be read in any order without being written down first. */
function isAddressable(node: IrNode): boolean {
  return node.kind === "rows" || node.kind === "slice" || node.kind === "stack" || node.kind === "sort";
}

/** Vectors that are in memory whatever the loops. */
function keptInMemory(live: readonly IrNode[]): Set<number> {
  const kept = new Set<number>();
  for (const node of live) {
    if (node.kind === "sort") kept.add(node.id);
    if (node.kind === "slice" || node.kind === "pick") kept.add(node.of.id);
    if (node.kind === "product" && !isAddressable(node.of)) kept.add(node.of.id);
    for (const operand of operands(node)) {
      // A list is written down where a loop runs over it.
      if (operand.kind === "stack" && isVector(operand)) kept.add(operand.id);
    }
  }
  return kept;
}

/** The stage in which a number is known, or the stage before the first loop that can compute a vector's elements. */
function readiness(live: readonly IrNode[]): Map<number, number> {
  const ready = new Map<number, number>();
  const of = (node: IrNode): number => ready.get(node.id) ?? 0;
  // A vector written by a loop is in memory one stage later; lists are written between loops.
  const inMemory = (node: VectorNode): number =>
    node.kind === "stack" || node.kind === "sort" || node.kind === "slice" || node.kind === "rows"
      ? of(node)
      : of(node) + 1;
  for (const node of live) {
    switch (node.kind) {
      case "reduce":
      case "sort":
        ready.set(node.id, of(node.of) + 1);
        break;
      case "slice":
      case "pick":
      case "product":
        ready.set(node.id, inMemory(node.of));
        break;
      default:
        ready.set(node.id, Math.max(0, ...operands(node).map(of)));
    }
  }
  return ready;
}

interface PlacedSink {
  readonly sink: Sink;
  readonly stage: number;
}

/** All sinks with their stages. Adds to `kept` the expensive vectors that more than one loop needs. */
function findSinks(
  live: readonly IrNode[],
  kept: Set<number>,
  ready: ReadonlyMap<number, number>,
  isExpensive: (node: IrNode) => boolean,
): PlacedSink[] {
  const sinks: PlacedSink[] = [];
  /** Stages of the loops that need the elements of a vector; all these loops have its length. */
  const stagesOf = new Map<number, Set<number>>();
  const need = (node: IrNode, stages: Iterable<number>): void => {
    if (!isVector(node)) return;
    const known = stagesOf.get(node.id) ?? new Set<number>();
    for (const stage of stages) known.add(stage);
    stagesOf.set(node.id, known);
  };
  for (const node of [...live].reverse()) {
    if (node.kind === "reduce" || node.kind === "sort") {
      const stage = (ready.get(node.of.id) ?? 0) + 1;
      const kind = node.kind === "reduce" ? "reduce" : "store";
      sinks.push({ sink: { kind, node, value: node.of } as Sink, stage });
      need(node.of, [stage]);
      continue;
    }
    if (!isVector(node) || node.kind === "stack") continue;
    let stages = stagesOf.get(node.id) ?? new Set<number>();
    if (kept.has(node.id) || (stages.size > 1 && isExpensive(node))) {
      const first = (ready.get(node.id) ?? 0) + 1;
      const stage = kept.has(node.id) ? first : Math.min(...stages);
      kept.add(node.id);
      sinks.push({ sink: { kind: "store", node, value: node }, stage });
      stages = new Set([stage]);
    }
    if (node.kind === "apply") for (const arg of node.args) need(arg, stages);
    if (node.kind === "scan") need(node.of, stages);
  }
  return sinks.reverse();
}

/** Numbers that are used more than once or inside a loop, or nested too deep, and lists that loops run over. */
function numbersToBind(live: readonly IrNode[], roots: readonly IrNode[]): IrNode[] {
  const uses = new Map<number, number>();
  const use = (node: IrNode, times: number): void => void uses.set(node.id, (uses.get(node.id) ?? 0) + times);
  for (const root of roots) use(root, 1);
  for (const node of live)
    for (const operand of operands(node)) use(operand, isVector(node) && node.kind !== "stack" ? 2 : 1);
  const depth = new Map<number, number>();
  return live.filter((node) => {
    if (node.kind === "stack") return true;
    if (isVector(node) || node.kind === "number" || node.kind === "reduce") return false;
    const nested = 1 + Math.max(0, ...operands(node).map((operand) => depth.get(operand.id) ?? 0));
    const bind = (uses.get(node.id) ?? 0) > 1 || nested > INLINE_DEPTH;
    depth.set(node.id, bind ? 0 : nested);
    return bind;
  });
}
