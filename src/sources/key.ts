/**
 * Keys: where a stream's randomness comes from. A stream is a pure function of (seed, purpose, problem, source,
 * replicate[, n]); the key is SHA-256 (FIPS 180-4) of the canonical text of these, expanded in counter mode. Nothing
 * else enters: not the order of runs, not threads, not shards. Not for cryptography.
 */
import { createHash } from "node:crypto";

/** Why points are drawn; different purposes never share points. */
export type Purpose =
  | "study"
  | "pilot"
  | "reference"
  | "confirmation"
  | "points"
  | "resolution"
  | "explain"
  | "budget"
  | "sensitivity";

export interface KeyParts {
  readonly seed: number;
  readonly purpose: Purpose;
  /** The problem's declared name. */
  readonly problem: string;
  /** The source's canonical id, randomisations included. */
  readonly source: string;
  readonly replicate: number;
  /** Only for sources built for one size. */
  readonly n?: number;
}

/** An expandable key. All methods are pure: the same call gives the same words. */
export class Key {
  readonly text: string;

  constructor(text: string) {
    this.text = text;
  }

  /** `count` bytes of SHA-256(text, counter = 0, 1, ...). */
  bytes(count: number): Uint8Array {
    const out = new Uint8Array(count);
    for (let at = 0, counter = 0; at < count; at += 32, counter++) {
      const block = createHash("sha256").update(`${this.text}\n${counter}`).digest();
      out.set(block.subarray(0, Math.min(32, count - at)), at);
    }
    return out;
  }

  /** `count` words of 64 bits, little-endian from `bytes`. */
  words64(count: number): BigUint64Array {
    return new BigUint64Array(this.bytes(count * 8).buffer);
  }

  /** `count` words of 32 bits, little-endian from `bytes`. */
  words32(count: number): Uint32Array {
    return new Uint32Array(this.bytes(count * 4).buffer);
  }

  /** A whole number uniform on 0...bound - 1 (bias below 2^-64: 64 more bits are drawn than the bound has). */
  below(bound: bigint): bigint {
    const length = Math.ceil(bound.toString(2).length / 8) + 8;
    let value = 0n;
    for (const byte of this.bytes(length)) value = (value << 8n) | BigInt(byte);
    return value % bound;
  }

  /** An independent key below this one. */
  derive(label: string): Key {
    return new Key(`${this.text}/${label}`);
  }
}

/** The key of a stream. The text is canonical JSON, so that no name can imitate another's parts. */
export function makeKey(parts: KeyParts): Key {
  const { seed, purpose, problem, source, replicate, n } = parts;
  return new Key(JSON.stringify(["tolerand", seed, purpose, problem, source, replicate, n ?? null]));
}
