/** LEB128, the variable-length integers of the WebAssembly binary format (WebAssembly core specification, 5.2.2). */

/** Appends an unsigned integer below 2^32. */
export function writeUnsigned(bytes: number[], value: number): void {
  let rest = value >>> 0;
  while (rest >= 128) {
    bytes.push((rest & 127) | 128);
    rest >>>= 7;
  }
  bytes.push(rest);
}

/** Appends a signed 32-bit integer. */
export function writeSigned(bytes: number[], value: number): void {
  let rest = value | 0;
  for (;;) {
    const low = rest & 127;
    rest >>= 7;
    if ((rest === 0 && (low & 64) === 0) || (rest === -1 && (low & 64) !== 0)) {
      bytes.push(low);
      return;
    }
    bytes.push(low | 128);
  }
}

/** Reads a module byte by byte. */
export class Reader {
  readonly bytes: Uint8Array;
  position: number;

  constructor(bytes: Uint8Array, position = 0) {
    this.bytes = bytes;
    this.position = position;
  }

  get done(): boolean {
    return this.position >= this.bytes.length;
  }

  byte(): number {
    const value = this.bytes[this.position];
    if (value === undefined) throw new RangeError("the kernel module ends too early");
    this.position += 1;
    return value;
  }

  unsigned(): number {
    let value = 0;
    for (let shift = 0; ; shift += 7) {
      const next = this.byte();
      value |= (next & 127) << shift;
      if (next < 128) return value >>> 0;
    }
  }

  /** Passes over a LEB128 integer of any width. */
  skipInteger(): void {
    while (this.byte() >= 128);
  }

  take(length: number): Uint8Array {
    const part = this.bytes.subarray(this.position, this.position + length);
    this.position += length;
    return part;
  }

  name(): string {
    return new TextDecoder().decode(this.take(this.unsigned()));
  }
}
