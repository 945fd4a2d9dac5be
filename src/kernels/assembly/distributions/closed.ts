// Quantiles that elementary functions give, as block passes over raw coordinates, in place.
//
// The formulas are those of N. L. Johnson, S. Kotz and N. Balakrishnan, "Continuous Univariate Distributions", 2nd ed.
// (Wiley 1994-95), each written so that neither tail cancels: u near 0 is taken as it is, u near 1 as 1 - u (exact).
// Good for: both tails at full relative accuracy (a few ulp of the functions used). Bad at: a zero of
// location + scale * q away from the centre of symmetry, where the error is a few ulp of the larger term.
import { add, div, mul, splat, sub } from "../vector";
import { vec_exp } from "../math/exp";
import { vec_log, vec_log1p } from "../math/log";
import { vec_normalCdf } from "../math/normal-cdf";
import { vec_pow } from "../math/pow";
import { vec_tan } from "../math/sine";

const PI: f64 = 3.141592653589793;

@inline
function choose(a: v128, b: v128, mask: v128): v128 {
  return v128.bitselect(a, b, mask);
}

/** min(u, 1 - u): the mass of the nearer tail. */
@inline
function nearer(u: v128): v128 {
  return f64x2.min(u, sub(splat(1), u));
}

/** log(u / (1 - u)); from the middle outwards as log1p of the excess over 1, so that the zero at 1/2 is exact. */
function logOdds(u: v128): v128 {
  let t = nearer(u);
  let c = sub(splat(1), t);
  let near = vec_log1p(div(sub(c, t), t)); // log(c / t) >= 0
  return choose(near, f64x2.neg(near), f64x2.gt(u, splat(0.5)));
}

/** Sign of u - 1/2 times log(1 / (2 t)). */
function laplace(u: v128): v128 {
  let t = nearer(u);
  let size = f64x2.neg(vec_log(add(t, t)));
  return choose(size, f64x2.neg(size), f64x2.gt(u, splat(0.5)));
}

/** tan(pi (u - 1/2)): within a quarter of the middle as it is, outside as a cotangent of the tail. */
function cauchy(u: v128): v128 {
  let t = nearer(u);
  let outside = f64x2.lt(t, splat(0.25));
  let angle = mul(splat(PI), choose(t, sub(splat(0.5), t), outside));
  let tangent = vec_tan(angle);
  let size = choose(div(splat(1), tangent), tangent, outside);
  return choose(size, f64x2.neg(size), f64x2.gt(u, splat(0.5)));
}

/** Triangle on 0 to 1 with its peak at `peak`. */
function triangular(u: v128, peak: v128): v128 {
  let below = f64x2.sqrt(mul(u, peak));
  let above = sub(splat(1), f64x2.sqrt(mul(sub(splat(1), u), sub(splat(1), peak))));
  return choose(below, above, f64x2.lt(u, peak));
}

function standard(form: i32, u: v128, shape: v128): v128 {
  switch (form) {
    case 2: return f64x2.neg(vec_log1p(f64x2.neg(u)));
    case 3: return logOdds(u);
    case 4: return laplace(u);
    case 5: return cauchy(u);
    case 6: return f64x2.neg(vec_log(f64x2.neg(choose(vec_log(u), vec_log1p(sub(u, splat(1))), f64x2.lt(u, splat(0.5))))));
    case 7: return vec_pow(f64x2.neg(vec_log1p(f64x2.neg(u))), shape);
    case 8: return vec_pow(sub(splat(1), u), shape);
    case 9: return triangular(u, shape);
    case 10: return vec_normalCdf(u);
    default: return u;
  }
}

/**
 * Replaces the values u in `rows` rows of `count` by location + scale * q(u), or for form 1 by exp(location + scale * u);
 * value i of row r stands at pointer + (r * stride + i) * 8. `stride` is even; of an odd row one more value is changed.
 * Forms: 0 u itself, 1 exponential of a normal, 2 exponential, 3 logistic, 4 Laplace, 5 Cauchy, 6 Gumbel,
 * 10 distribution function of the
 * normal, 7 Weibull (shape: 1 / its shape), 8 Pareto (shape: -1 / its shape), 9 triangular (shape: place of the peak in 0 to 1).
 */
export function closedBlock(
  form: i32, pointer: usize, stride: i32, rows: i32, count: i32, location: f64, scale: f64, shape: f64,
): void {
  let a = splat(location);
  let b = splat(scale);
  let c = splat(shape);
  for (let r = 0; r < rows; r++) {
    let end = pointer + (<usize>count << 3);
    for (let at = pointer; at < end; at += 16) {
      let u = v128.load(at);
      let x = form == 1 ? vec_exp(add(a, mul(b, u))) : add(a, mul(b, standard(form, u, c)));
      v128.store(at, x);
    }
    pointer += <usize>stride << 3;
  }
}
