// What tools/measure-kernels.mjs measures: for each kernel the promised bound in ulp, the interval used for timing, one
// that takes the rare path (where an interval does), and the samples, each a share of the arguments. A sample is a
// function of a random source `r` that gives one argument, or a pair for the kernels of two. Here the elementary
// functions; the others are in special-samples.mjs.

/** A seeded source of 64-bit words (the mixing function of G. L. Steele, D. Lea and C. H. Flood, OOPSLA 2014). */
export function randomSource(seed) {
  let state = BigInt(seed);
  const view = new DataView(new ArrayBuffer(8));
  const word = () => {
    state = BigInt.asUintN(64, state + 0x9e3779b97f4a7c15n);
    let z = state;
    z = BigInt.asUintN(64, (z ^ (z >> 30n)) * 0xbf58476d1ce4e5b9n);
    z = BigInt.asUintN(64, (z ^ (z >> 27n)) * 0x94d049bb133111ebn);
    return z ^ (z >> 31n);
  };
  const unit = () => Number(word() >> 11n) * 2 ** -53;
  const fromBits = (bits) => (view.setBigUint64(0, bits), view.getFloat64(0));
  const uniform = (a, b) => a + (b - a) * unit();
  const sign = () => (unit() < 0.5 ? -1 : 1);
  const log2Uniform = (a, b) => 2 ** uniform(a, b);
  return {
    uniform,
    /** Magnitude 2^a ... 2^b with a uniform exponent, either sign. */
    scale: (a, b) => sign() * log2Uniform(a, b),
    positive: log2Uniform,
    /** Every bit pattern alike: infinities, NaN and subnormals included. */
    anything: () => fromBits(word()),
    subnormal: () => fromBits(word() >> BigInt(12 + Math.floor(unit() * 50))),
    /** A double near k pi/2, |k| up to 2^20. */
    nearMultiple: () =>
      Math.floor(sign() * log2Uniform(0, 20)) * (Math.PI / 2) +
      (unit() < 0.3 ? 0 : sign() * log2Uniform(-50, -3)),
    nearOne: () => 1 + sign() * log2Uniform(-52, -2),
  };
}

export const middle = (a, b) => [`${a} to ${b}`, (r) => r.uniform(a, b)];
export const anything = ["all bit patterns", (r) => r.anything()];
export const small = ["±2^-60 to 1", (r) => r.scale(-60, 0)];
export const tiny = ["subnormal", (r) => r.subnormal()];
const nearOne = ["1 ± 2^-52 to 1/4", (r) => r.nearOne()];
const angles = [
  middle(-10, 10),
  middle(-8192, 8192),
  ["near multiples of pi/2", (r) => r.nearMultiple()],
  ["±2^13 to 2^1023", (r) => r.scale(13, 1023)],
  small,
];
const logarithm = [anything, nearOne, middle(0, 10), tiny];
const hyperbolic = [middle(-5, 5), small, middle(-711, 711), anything];
const arc = [
  middle(-1, 1),
  ["±(1 - 2^-52 to 1/2)", (r) => Math.sign(r.uniform(-1, 1)) * (1 - r.positive(-52, -1))],
  small,
];

export const ELEMENTARY_GROUPS = [
  {
    title: "Exponentials, logarithms, powers",
    functions: [
      {
        name: "exp",
        bound: 1,
        timed: [-5, 5],
        rare: [691, 709],
        samples: [middle(-5, 5), middle(-745, 710), small, anything],
      },
      {
        name: "expm1",
        bound: 1,
        timed: [-5, 5],
        rare: [691, 709],
        samples: [middle(-1, 1), middle(-40, 710), small, anything],
      },
      { name: "log", bound: 0.6, timed: [1e-9, 1], rare: [1e-310, 2e-308], samples: logarithm },
      {
        name: "log1p",
        bound: 0.6,
        timed: [-0.9, 10],
        rare: [1e301, 1e302],
        samples: [middle(-1, 10), small, anything, tiny],
      },
      { name: "log2", bound: 0.6, timed: [1e-9, 10], rare: [1e-310, 2e-308], samples: logarithm },
      { name: "log10", bound: 0.6, timed: [1e-9, 10], rare: [1e-310, 2e-308], samples: logarithm },
      {
        name: "cbrt",
        bound: 0.6,
        timed: [-10, 10],
        rare: [1e-310, 2e-308],
        samples: [anything, middle(-10, 10), tiny],
      },
      {
        name: "pow",
        bound: 1,
        timed: [0.1, 10],
        rare: [1e-310, 2e-308],
        samples: [
          ["x, y in 0 to 10, -20 to 20", (r) => [r.uniform(0, 10), r.uniform(-20, 20)]],
          [
            "y log x in -745 to 710",
            (r) => {
              const x = r.positive(-1022, 1023);
              return [x, r.uniform(-745, 710) / Math.log(x)];
            },
          ],
          [
            "x near 1, y log x in -745 to 710",
            (r) => {
              const x = r.nearOne();
              return [x, r.uniform(-745, 710) / Math.log(x)];
            },
          ],
          ["x subnormal, y in -0.95 to 1", (r) => [r.subnormal(), r.uniform(-0.95, 1)]],
          ["x negative, y whole", (r) => [-r.positive(-20, 20), Math.round(r.uniform(-30, 30))]],
        ],
      },
    ],
  },
  {
    title: "Trigonometric functions",
    functions: [
      { name: "sin", bound: 0.75, timed: [-10, 10], rare: [1e5, 1e9], samples: angles },
      { name: "cos", bound: 0.75, timed: [-10, 10], rare: [1e5, 1e9], samples: angles },
      { name: "tan", bound: 2.5, timed: [-10, 10], rare: [1e5, 1e9], samples: angles },
    ],
  },
  {
    title: "Inverse trigonometric functions",
    functions: [
      { name: "asin", bound: 1, timed: [-1, 1], samples: arc },
      { name: "acos", bound: 1, timed: [-1, 1], samples: arc },
      { name: "atan", bound: 0.75, timed: [-10, 10], samples: [middle(-10, 10), small, anything] },
      {
        name: "atan2",
        bound: 1.25,
        timed: [-10, 10],
        rare: [1e200, 1e201],
        samples: [
          ["both in -10 to 10", (r) => [r.uniform(-10, 10), r.uniform(-10, 10)]],
          ["both ±2^-30 to 2^30", (r) => [r.scale(-30, 30), r.scale(-30, 30)]],
          ["all bit patterns", (r) => [r.anything(), r.anything()]],
          ["subnormal", (r) => [r.subnormal(), r.subnormal()]],
        ],
      },
    ],
  },
  {
    title: "Hyperbolic functions",
    functions: [
      { name: "sinh", bound: 2, timed: [-5, 5], rare: [691, 709], samples: hyperbolic },
      { name: "cosh", bound: 1.5, timed: [-5, 5], rare: [691, 709], samples: hyperbolic },
      { name: "tanh", bound: 2.5, timed: [-5, 5], rare: [346, 800], samples: hyperbolic },
    ],
  },
];
