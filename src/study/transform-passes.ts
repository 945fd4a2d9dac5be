/** The passes that turn the uniform coordinates of a block into inputs, in place, in one kernel instance. */
import type { Kernels } from "../kernels/instance.js";
import type { Transform } from "../problem/contract.js";

export class TransformPasses {
  readonly #steps: readonly ((count: number) => void)[];

  /** For the block at `x`, coordinates `stride` values apart; tables are copied into the memory of the instance. */
  constructor(kernels: Kernels, transforms: readonly Transform[], x: number, stride: number) {
    const { exports, arena } = kernels;
    const scratch = arena.allocate(exports.normalBlockScratch());
    const placed = new Map<Float64Array, number>();
    const place = (table: Float64Array): number => {
      const address = placed.get(table) ?? arena.allocate(table.byteLength);
      kernels.f64(address, table.length).set(table);
      placed.set(table, address);
      return address;
    };
    this.#steps = transforms.map((one) => {
      const { first, rows } = one;
      const at = x + first * stride * 8;
      if (one.kind === "normal") return (count) => exports.normalBlock(at, stride, rows, count, scratch);
      if (one.kind === "closed") {
        const { form, location, scale, shape } = one;
        return (count) => exports.closedBlock(form, at, stride, rows, count, location, scale, shape);
      }
      const table = place(one.table);
      if (one.kind === "linear") {
        const room = arena.allocate((one.table[0] ?? 0) * 64);
        return (count) => exports.linearBlock(x, stride, count, table, room);
      }
      if (one.kind === "pieces") return (count) => exports.piecesBlock(at, stride, rows, count, table);
      return (count) => exports.stepsBlock(at, stride, rows, count, table);
    });
  }

  run(count: number): void {
    for (const step of this.#steps) step(count);
  }
}
