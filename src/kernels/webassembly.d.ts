/** The part of the WebAssembly JavaScript interface (W3C) that the program uses; Node's own typings leave it to the DOM library. */
declare namespace WebAssembly {
  class Module {
    constructor(bytes: Uint8Array<ArrayBuffer>);
    static exports(module: Module): { name: string; kind: string }[];
  }
  class Instance {
    constructor(module: Module, imports: Record<string, Record<string, unknown>>);
    readonly exports: Record<string, unknown>;
  }
  class Memory {
    readonly buffer: ArrayBuffer;
    grow(pages: number): number;
  }
  function validate(bytes: Uint8Array<ArrayBuffer>): boolean;
}
