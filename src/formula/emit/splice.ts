/** Kernels in emitted code: spliced in place where they sit in a loop over elements, called elsewhere. */
import { kernelExport } from "../primitives.js";
import type { KernelName } from "../primitives.js";
import type { Code, Locals } from "./code.js";
import { writeUnsigned } from "./leb.js";
import type { KernelModule } from "./module.js";
import { OP, V128 } from "./opcodes.js";
import { readTemplate } from "./template.js";
import type { Template } from "./template.js";

const ZERO: Readonly<Record<number, readonly number[]>> = {
  0x7f: [0x41, 0],
  0x7e: [0x42, 0],
  0x7d: [0x43, 0, 0, 0, 0],
  0x7c: [0x44, 0, 0, 0, 0, 0, 0, 0, 0],
  [V128]: [0xfd, 0x0c, ...new Array<number>(16).fill(0)],
};

interface Prepared {
  readonly template: Template;
  /** Locals of the host function that stand for the kernel's; all splices of one kernel share them. */
  readonly locals: readonly number[];
}

export class Kernels {
  readonly module: KernelModule;
  readonly #locals: Locals;
  readonly #prepared = new Map<KernelName, Prepared>();

  constructor(module: KernelModule, locals: Locals) {
    this.module = module;
    this.#locals = locals;
  }

  call(code: Code, name: KernelName): void {
    code.call(this.module.indexOf(kernelExport(name)));
  }

  /** Appends the kernel's body; its arguments are on the stack. */
  splice(code: Code, name: KernelName): void {
    const { template, locals } = this.#prepare(name);
    for (let i = template.parameters - 1; i >= 0; i--) code.set(locals[i] ?? 0);
    for (const index of template.zeroed) {
      code.raw(ZERO[template.locals[index] ?? 0] ?? []);
      code.set(locals[index] ?? 0);
    }
    code.raw([OP.block, template.result]);
    for (const step of template.steps) {
      if (step.kind === "raw") code.raw(step.bytes);
      else if (step.kind === "local") code.local(step.opcode, locals[step.index] ?? 0);
      else {
        code.op(OP.br);
        writeUnsigned(code.bytes, step.depth);
      }
    }
    code.op(OP.end);
  }

  #prepare(name: KernelName): Prepared {
    const known = this.#prepared.get(name);
    if (known !== undefined) return known;
    const template = readTemplate(this.module, kernelExport(name));
    const prepared = { template, locals: template.locals.map((type) => this.#locals.add(type)) };
    this.#prepared.set(name, prepared);
    return prepared;
  }
}
