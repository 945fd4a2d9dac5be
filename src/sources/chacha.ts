/**
 * ChaCha keystreams of 8 and 20 rounds: D. J. Bernstein, "ChaCha, a variant of Salsa20" (2008); block function, counter
 * and nonce as in RFC 8439 (Y. Nir and A. Langley 2018). Good for: output that nobody has told from random. Bad at: speed.
 * This is a source of points, not a vetted cryptographic use: keys come from a seed that a report prints.
 *
 * Two 32-bit words make one coordinate of 52 bits, the first one low, as for Philox4x32. The 32-bit counter carries into
 * the first nonce word, as in the original of 2008 with its 64-bit counter.
 *
 * Starting states: 256-bit key from the stream's key, counter and nonce 0. The published form is "key;counter;nonce": the
 * bytes of key and nonce in hexadecimal, the counter a number.
 */
import type { FillWords, GeneratorExports } from "../kernels/generator-exports.js";
import { pseudoRandom, type PseudoRandomSource, type State } from "./pseudo-random.js";

const COUNTERS = 1n << 64n;

/** 64-bit words per block. */
const BLOCK = 8n;

function rotl(x: number, k: number): number {
  return (x << k) | (x >>> (32 - k));
}

/** The 16 words of the block that a state comes to. */
function block([a = 0n, b = 0n, c = 0n, d = 0n, counter = 0n, nonce = 0n]: State, rounds: number): bigint[] {
  const constants = [0x61707865, 0x3320646e, 0x79622d32, 0x6b206574];
  const input = [...constants, ...new Uint32Array(new BigUint64Array([a, b, c, d, counter, nonce]).buffer)];
  const x = Int32Array.from(input);
  const quarter = (p: number, q: number, r: number, s: number): void => {
    for (const [first, second] of [
      [16, 12],
      [8, 7],
    ] as const) {
      x[p] = (x[p] ?? 0) + (x[q] ?? 0);
      x[s] = rotl((x[s] ?? 0) ^ (x[p] ?? 0), first);
      x[r] = (x[r] ?? 0) + (x[s] ?? 0);
      x[q] = rotl((x[q] ?? 0) ^ (x[r] ?? 0), second);
    }
  };
  for (let round = 0; round < rounds; round += 2) {
    for (const k of [0, 1, 2, 3]) quarter(k, 4 + k, 8 + k, 12 + k);
    for (const k of [0, 1, 2, 3]) quarter(k, 4 + ((k + 1) % 4), 8 + ((k + 2) % 4), 12 + ((k + 3) % 4));
  }
  return Array.from(x, (word, k) => BigInt((word + (input[k] ?? 0)) >>> 0));
}

function parse(text: string, id: string): State {
  const [, key, counter, nonce] = /^([0-9a-f]{64});(\d{1,10});([0-9a-f]{24})$/i.exec(text.trim()) ?? [];
  if (key !== undefined && nonce !== undefined && BigInt(counter ?? 0) < 1n << 32n) {
    const bytes = (hex: string): number[] => (hex.match(/../g) ?? []).map((pair) => parseInt(pair, 16));
    const start = new Uint8Array(48);
    start.set(bytes(key));
    new DataView(start.buffer).setUint32(32, Number(counter), true);
    start.set(bytes(nonce), 36);
    return [...new BigUint64Array(start.buffer), 0n];
  }
  throw new RangeError(
    `state: expected "key;counter;nonce", 64 hexadecimal digits, a number below 2^32 and 24 hexadecimal digits, for source "${id}", found "${text}"`,
  );
}

function chacha(rounds: number, kernel: (exports: GeneratorExports) => FillWords): PseudoRandomSource {
  const id = `chacha${rounds}`;
  return pseudoRandom({
    about: {
      id,
      title: `ChaCha keystream, ${rounds} rounds`,
      citation: "D. J. Bernstein, ChaCha, a variant of Salsa20 (2008); RFC 8439 (2018)",
      method: "counter-based",
      outputBits: 64,
      // 16 words of 32 bits a block
      period: 16n * COUNTERS,
      knownStructure: null,
    },
    output: { modulus: 1n << 64n, bytes: 8, zeroless: false, integers: 2 },
    stateFromKey: (key) => [...key.words64(4), 0n, 0n, 0n],
    stateFromText: (text) => parse(text, id),
    kernel,
    *integers(start) {
      const [a = 0n, b = 0n, c = 0n, d = 0n, first = 0n, nonce = 0n, used = 0n] = start;
      for (let counter = first, skip = Number(2n * used); ; skip = 0) {
        yield* block([a, b, c, d, counter, nonce], rounds).slice(skip);
        counter = (counter + 1n) % COUNTERS;
      }
    },
    advance: ([a = 0n, b = 0n, c = 0n, d = 0n, counter = 0n, nonce = 0n, used = 0n], words) => {
      const total = used + words;
      return [a, b, c, d, (counter + total / BLOCK) % COUNTERS, nonce, total % BLOCK];
    },
  });
}

export const chacha8 = chacha(8, (exports) => exports.fillChaCha8);
export const chacha20 = chacha(20, (exports) => exports.fillChaCha20);
