// Double-double building blocks: sums and products of two doubles with their rounding error. All inlined.
//
// twoSum: D. E. Knuth, "The Art of Computer Programming", vol. 2, section 4.2.2, theorem B; fastTwoSum and the product:
// T. J. Dekker, "A floating-point technique for extending the available precision", Numerische Mathematik 18 (1971)
// 224-242. WebAssembly has no fused multiply-add, so factors are split; the split cuts bits instead of multiplying by
// 2^27 + 1 (one operation less, and it cannot overflow). Each function returns the error term; the leading term is
// the plain sum or product, which the caller has at hand. Good for |values| well inside the range; no error term is
// exact where a product's low half underflows.
import { add, mul, sub } from "../vector";

const MASKS = memory.data<u64>([0xfffffffff8000000, 0xfffffffff8000000], 16);

/** Error of s = a + b, whatever their sizes. */
@inline
export function sumError(a: v128, b: v128, s: v128): v128 {
  let t = sub(s, a);
  return add(sub(a, sub(s, t)), sub(b, t));
}

/** Error of s = a + b where |a| >= |b| or a = 0. */
@inline
export function fastSumError(a: v128, b: v128, s: v128): v128 {
  return add(sub(a, s), b);
}

/** Leading 26 bits of a; a - upper(a) holds the other 27 exactly. */
@inline
export function upper(a: v128): v128 {
  return v128.and(a, v128.load(MASKS));
}

/** Error of p = a * b, to within 2^-105 of the product. */
@inline
export function productError(a: v128, b: v128, p: v128): v128 {
  let ah = upper(a), bh = upper(b);
  let al = sub(a, ah), bl = sub(b, bh);
  return add(add(add(sub(mul(ah, bh), p), mul(ah, bl)), mul(al, bh)), mul(al, bl));
}
