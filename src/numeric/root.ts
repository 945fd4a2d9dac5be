/**
 * Root of an increasing function of one variable: a bracket grown by doubling, then Brent's method (Brent, Algorithms
 * for Minimization without Derivatives, 1973, chapter 4): inverse quadratic steps where they help, halving where not.
 */

/**
 * The x with f(x) = 0, to a few units in the last place. `start` is a guess, `step` the first width of the bracket.
 * f must be non-decreasing; infinite values count by their sign.
 */
export function findRoot(f: (x: number) => number, start: number, step: number): number {
  let a = start;
  let fa = f(a);
  if (fa === 0) return a;
  const direction = fa < 0 ? 1 : -1;
  let b = a;
  let fb = fa;
  for (let width = step; fb !== 0 && Math.sign(fb) === Math.sign(fa); width *= 2) {
    if (!(width < 1e300)) throw new RangeError("findRoot: no change of sign");
    a = b;
    fa = fb;
    b = a + direction * width;
    fb = f(b);
  }
  return brent(f, a, fa, b, fb);
}

function brent(f: (x: number) => number, a0: number, fa0: number, b0: number, fb0: number): number {
  let [a, fa, b, fb] = [a0, fa0, b0, fb0];
  let [c, fc] = [a, fa];
  let last = b - a;
  let beforeLast = last;
  for (;;) {
    if (Math.sign(fb) === Math.sign(fc)) {
      [c, fc] = [a, fa];
      last = beforeLast = b - a;
    }
    if (Math.abs(fc) < Math.abs(fb)) [a, fa, b, fb, c, fc] = [b, fb, c, fc, b, fb];
    const tolerance = 2 * Number.EPSILON * Math.abs(b) + Number.MIN_VALUE;
    const half = (c - b) / 2;
    if (Math.abs(half) <= tolerance || fb === 0) return b;
    let step = half;
    if (Math.abs(beforeLast) >= tolerance && Math.abs(fa) > Math.abs(fb) && Number.isFinite(fa)) {
      const trial = interpolate(a, fa, b, fb, c, fc);
      if (Math.abs(trial) < Math.min(1.5 * Math.abs(half), Math.abs(beforeLast) / 2) && trial * half > 0) {
        step = trial;
      }
    }
    beforeLast = step === half ? half : last;
    last = step;
    [a, fa] = [b, fb];
    b += Math.abs(step) > tolerance ? step : Math.sign(half) * tolerance;
    fb = f(b);
  }
}

/** Step from b by the secant through two points, or by the inverse quadratic through three. */
function interpolate(a: number, fa: number, b: number, fb: number, c: number, fc: number): number {
  if (a === c || !Number.isFinite(fc)) return (-fb * (b - a)) / (fb - fa);
  const [q, r, s] = [fa / fc, fb / fc, fb / fa];
  const numerator = s * (2 * ((c - b) / 2) * q * (q - r) - (b - a) * (r - 1));
  return numerator / -((q - 1) * (r - 1) * (s - 1)) || 0;
}
