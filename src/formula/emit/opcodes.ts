/** Opcodes of WebAssembly (core specification, chapter 5.4 and its vector instructions) that the emitter writes. */

export const I32 = 0x7f;
export const V128 = 0x7b;
/** Block type without a result. */
export const EMPTY = 0x40;

export const OP = {
  block: 0x02,
  loop: 0x03,
  else: 0x05,
  end: 0x0b,
  br: 0x0c,
  brIf: 0x0d,
  return: 0x0f,
  call: 0x10,
  localGet: 0x20,
  localSet: 0x21,
  localTee: 0x22,
  i32Const: 0x41,
  i32GreaterSigned: 0x4a,
  i32Add: 0x6a,
  i32Sub: 0x6b,
} as const;

/** Prefix of vector instructions. */
export const SIMD = 0xfd;

export const SIMD_OP = {
  load: 0x00,
  load64Splat: 0x0a,
  store: 0x0b,
  const: 0x0c,
  not: 0x4d,
  and: 0x4e,
  or: 0x50,
  bitselect: 0x52,
  eq: 0x47,
  ne: 0x48,
  lt: 0x49,
  gt: 0x4a,
  le: 0x4b,
  ge: 0x4c,
  ceil: 0x74,
  floor: 0x75,
  trunc: 0x7a,
  abs: 0xec,
  neg: 0xed,
  sqrt: 0xef,
  add: 0xf0,
  sub: 0xf1,
  mul: 0xf2,
  div: 0xf3,
  min: 0xf4,
  max: 0xf5,
} as const;

export type SimdName = keyof typeof SIMD_OP;
