/** Reads the kernel module and appends functions to it (WebAssembly core specification, 5.5: modules). */
import { Reader, writeUnsigned } from "./leb.js";

export interface FunctionType {
  readonly parameters: readonly number[];
  readonly results: readonly number[];
}

/** A function to be appended: its type, its locals and code (without the size in front), and its exported name. */
export interface NewFunction {
  readonly name: string;
  readonly type: FunctionType;
  readonly body: readonly number[];
}

interface Section {
  readonly id: number;
  readonly content: Uint8Array;
}

const SECTION = { type: 1, import: 2, function: 3, export: 7, code: 10, custom: 0 } as const;
const FUNCTION_TYPE = 0x60;
const HEADER = [0x00, 0x61, 0x73, 0x6d, 0x01, 0x00, 0x00, 0x00];

export class KernelModule {
  readonly #sections: Section[] = [];
  readonly #types: FunctionType[] = [];
  readonly #functionTypes: number[] = [];
  readonly #bodies: Uint8Array[] = [];
  readonly #exports = new Map<string, number>();
  #imported = 0;

  constructor(bytes: Uint8Array) {
    const reader = new Reader(bytes, HEADER.length);
    while (!reader.done) {
      const id = reader.byte();
      const content = reader.take(reader.unsigned());
      // Names and other custom sections only cost the threads time.
      if (id !== SECTION.custom) this.#sections.push({ id, content });
    }
    this.#read(SECTION.type, (section) => this.#types.push(readType(section)));
    this.#read(SECTION.import, (section) => {
      section.name();
      section.name();
      if (section.byte() !== 0)
        throw new TypeError("the kernel module imports something else than a function");
      section.unsigned();
      this.#imported += 1;
    });
    this.#read(SECTION.function, (section) => this.#functionTypes.push(section.unsigned()));
    this.#read(SECTION.export, (section) => {
      const name = section.name();
      const kind = section.byte();
      const index = section.unsigned();
      if (kind === 0) this.#exports.set(name, index);
    });
    this.#read(SECTION.code, (section) => this.#bodies.push(section.take(section.unsigned())));
  }

  has(name: string): boolean {
    return this.#exports.has(name);
  }

  /** Index of an exported function, for `call`. */
  indexOf(name: string): number {
    const index = this.#exports.get(name);
    if (index === undefined) throw new RangeError(`the kernel module exports no function "${name}"`);
    return index;
  }

  /** Type and body (locals and code) of an exported function. */
  functionOf(name: string): { readonly type: FunctionType; readonly body: Uint8Array } {
    const own = this.indexOf(name) - this.#imported;
    const type = this.#types[this.#functionTypes[own] ?? -1];
    const body = this.#bodies[own];
    if (type === undefined || body === undefined)
      throw new RangeError(`"${name}" is not a function of the module`);
    return { type, body };
  }

  /** The module with `functions` appended and exported. */
  with(functions: readonly NewFunction[]): Uint8Array<ArrayBuffer> {
    const added = {
      [SECTION.type]: [],
      [SECTION.function]: [],
      [SECTION.export]: [],
      [SECTION.code]: [],
    } as Record<number, number[]>;
    functions.forEach((item, i) => {
      const write = (section: number, ...bytes: readonly number[]): void => {
        for (const byte of bytes) added[section]?.push(byte);
      };
      const count = (section: number, value: number): void => {
        const list = added[section];
        if (list !== undefined) writeUnsigned(list, value);
      };
      write(SECTION.type, FUNCTION_TYPE, item.type.parameters.length, ...item.type.parameters);
      write(SECTION.type, item.type.results.length, ...item.type.results);
      count(SECTION.function, this.#types.length + i);
      const name = new TextEncoder().encode(item.name);
      write(SECTION.export, name.length, ...name, 0);
      count(SECTION.export, this.#imported + this.#bodies.length + i);
      count(SECTION.code, item.body.length);
      const code = added[SECTION.code];
      for (const byte of item.body) code?.push(byte);
    });
    const parts: Uint8Array[] = [Uint8Array.from(HEADER)];
    for (const section of this.#sections) {
      const extra = added[section.id];
      parts.push(
        ...frame(
          section.id,
          extra === undefined ? [section.content] : grow(section.content, functions.length, extra),
        ),
      );
    }
    return concatenate(parts);
  }

  #read(id: number, each: (reader: Reader) => void): void {
    const section = this.#sections.find((candidate) => candidate.id === id);
    if (section === undefined) return;
    const reader = new Reader(section.content);
    for (let left = reader.unsigned(); left > 0; left--) each(reader);
  }
}

function readType(reader: Reader): FunctionType {
  if (reader.byte() !== FUNCTION_TYPE)
    throw new TypeError("the kernel module holds a type that is not a function");
  const parameters = [...reader.take(reader.unsigned())];
  const results = [...reader.take(reader.unsigned())];
  return { parameters, results };
}

/** A section that is a vector of entries, with more entries at its end. */
function grow(content: Uint8Array, entries: number, extra: readonly number[]): Uint8Array[] {
  const reader = new Reader(content);
  const size: number[] = [];
  writeUnsigned(size, reader.unsigned() + entries);
  return [Uint8Array.from(size), content.subarray(reader.position), Uint8Array.from(extra)];
}

function frame(id: number, parts: readonly Uint8Array[]): Uint8Array[] {
  const head = [id];
  writeUnsigned(
    head,
    parts.reduce((total, part) => total + part.length, 0),
  );
  return [Uint8Array.from(head), ...parts];
}

function concatenate(parts: readonly Uint8Array[]): Uint8Array<ArrayBuffer> {
  const bytes = new Uint8Array(parts.reduce((total, part) => total + part.length, 0));
  let at = 0;
  for (const part of parts) {
    bytes.set(part, at);
    at += part.length;
  }
  return bytes;
}
