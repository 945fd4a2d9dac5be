// Natural logarithm for the tails of the normal quantile: x = 2^k m with m in [sqrt(1/2), sqrt(2)), then
// log m = f - f^2/2 + s (f^2/2 + R(s^2)) with f = m - 1, s = f / (2 + f) and the minimax R of K. C. Ng's log in
// FDLIBM 5.3 (Sun Microsystems, 1993), error below 1 ulp. Zero gives -infinity, negative and NaN give NaN.
import { add, div, mul, splat, sub } from "../vector";

@inline
function logCore(x: v128, shift: v128): v128 {
  let b = i64x2.add(x, i64x2.splat(0x3ff0000000000000 - 0x3fe6a09e667f3bcd));
  let e = i64x2.shr_u(b, 52);
  let m = i64x2.add(v128.and(b, i64x2.splat(0x000fffffffffffff)), i64x2.splat(0x3fe6a09e667f3bcd));
  let dk = sub(sub(v128.or(e, i64x2.splat(0x4330000000000000)), splat(4503599627370496.0 + 1023.0)), shift);
  let f = sub(m, splat(1.0));
  let s = div(f, add(splat(2.0), f));
  let z = mul(s, s);
  let w = mul(z, z);
  let t1 = mul(w, add(splat(3.999999999940941908e-01), mul(w, add(splat(2.222219843214978396e-01), mul(w, splat(1.531383769920937332e-01))))));
  let t2 = mul(z, add(splat(6.666666666666735130e-01), mul(w, add(splat(2.857142874366239149e-01), mul(w, add(splat(1.818357216161805012e-01), mul(w, splat(1.479819860511658591e-01))))))));
  let r = add(t2, t1);
  let h = mul(splat(0.5), mul(f, f));
  return sub(mul(dk, splat(6.93147180369123816490e-01)), sub(sub(h, add(mul(s, add(h, r)), mul(dk, splat(1.90821492927058770002e-10)))), f));
}

function logSpecial(x: v128): v128 {
  let small = f64x2.lt(x, splat(2.2250738585072014e-308));
  let y = logCore(v128.bitselect(mul(x, splat(18014398509481984.0)), x, small), v128.and(splat(54.0), small));
  y = v128.bitselect(splat(-Infinity), y, f64x2.eq(x, splat(0.0)));
  return v128.bitselect(y, splat(NaN), f64x2.ge(x, splat(0.0)));
}

@inline
export function logPositive(x: v128): v128 {
  if (!i64x2.all_true(f64x2.ge(x, splat(2.2250738585072014e-308)))) return logSpecial(x);
  return logCore(x, splat(0.0));
}
