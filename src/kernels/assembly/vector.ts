// Short names for f64x2 arithmetic, shared by all kernels. Everything here is inlined.

@inline
export function splat(c: f64): v128 {
  return f64x2.splat(c);
}
@inline
export function add(a: v128, b: v128): v128 {
  return f64x2.add(a, b);
}
@inline
export function sub(a: v128, b: v128): v128 {
  return f64x2.sub(a, b);
}
@inline
export function mul(a: v128, b: v128): v128 {
  return f64x2.mul(a, b);
}
@inline
export function div(a: v128, b: v128): v128 {
  return f64x2.div(a, b);
}
