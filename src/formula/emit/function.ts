/**
 * A plan as one WebAssembly function over a block of points. Each turn of its main loop computes `unroll` vectors of
 * two points, all stages of the plan one after the other; scratch memory holds the vectors of one turn only.
 */
import type { VectorNode } from "../ir.js";
import type { Plan } from "../plan.js";
import { Code, functionBody } from "./code.js";
import { Frame, PARAMETERS, PARAMETER_TYPES, VECTOR } from "./frame.js";
import type { FunctionOptions } from "./frame.js";
import { writeLoop } from "./loop.js";
import type { FunctionType } from "./module.js";
import { OP } from "./opcodes.js";

export interface EmittedFunction {
  readonly body: number[];
  readonly pool: Float64Array<ArrayBuffer>;
  readonly scratchBytes: number;
}

export const FUNCTION_TYPE: FunctionType = { parameters: PARAMETER_TYPES, results: [] };

/** Name of the kernel that sorts the rows of one vector in place: (first row, number of rows, bytes between rows). */
export const SORT_EXPORT = "sortRows";

/** Writes the function of a plan. */
export function emitFunction(plan: Plan, options: FunctionOptions): EmittedFunction {
  const frame = new Frame(plan, options);
  const { code, unroll } = frame;
  for (const stage of plan.stages) {
    for (const node of stage.numbers) frame.writeNumber(node);
    for (const loop of stage.loops) writeLoop(frame, loop);
    for (const sort of stage.sorts) writeSort(frame, sort);
  }
  plan.roots.forEach((root, channel) => {
    for (let u = 0; u < unroll; u++) {
      code.get(PARAMETERS.result);
      frame.pushNumber(code, root, u);
      code.store(channel * frame.rowStride + u * VECTOR);
    }
  });
  code.advance(PARAMETERS.x, unroll * VECTOR);
  code.advance(PARAMETERS.result, unroll * VECTOR);
  const whole = new Code();
  frame.pool.writeEntry(whole, PARAMETERS.pool);
  whole.loop(PARAMETERS.count, 2 * unroll, code);
  return {
    body: functionBody(frame.locals, whole),
    pool: frame.pool.content(),
    scratchBytes: plan.memoryRows * frame.memoryStride,
  };
}

function writeSort(frame: Frame, node: VectorNode): void {
  for (let u = 0; u < frame.unroll; u++) {
    frame.code.get(PARAMETERS.scratch);
    frame.code.integer(frame.memoryOffset(node, 0) + u * VECTOR);
    frame.code.op(OP.i32Add);
    frame.code.integer(node.length);
    frame.code.integer(frame.memoryStride);
    frame.code.call(frame.options.module.indexOf(SORT_EXPORT));
  }
}
