// The samples of the special functions, in the form of tools/kernel-samples.mjs.

import { anything, middle, small, tiny } from "./kernel-samples.mjs";

/** Close to one of the whole numbers a, ..., b. */
const nearWhole = (a, b) => [
  `2^-50 to 2^-4 beside ${a}, …, ${b}`,
  (r) => Math.floor(r.uniform(a, b + 1)) + r.scale(-50, -4),
];

export const SPECIAL_GROUPS = [
  {
    title: "Error function and gamma function",
    note:
      "`gamma` close to a pole and `lgamma` close to its zeros 1 and 2 are measured like the rest: relative to the value " +
      "at the double given. `gamma` is infinite at its poles and `lgamma` is NaN below 0, as in mathjs.",
    functions: [
      {
        name: "erf",
        bound: 2,
        timed: [-3, 3],
        samples: [middle(-6.2, 6.2), middle(0, 0.1), small, tiny, anything],
      },
      {
        name: "erfc",
        bound: 3,
        timed: [-3, 6],
        samples: [middle(-7, 2), middle(0, 27.3), middle(26.5, 27.4), small, anything],
      },
      {
        name: "gamma",
        bound: 3.5,
        timed: [0, 12],
        rare: [-20, 0],
        samples: [
          middle(0, 12),
          middle(12, 171.63),
          middle(-20, 0),
          middle(-186, -20),
          nearWhole(-178, 12),
          small,
          anything,
        ],
      },
      {
        name: "lgamma",
        bound: 3.5,
        timed: [0, 30],
        samples: [
          middle(0, 3),
          middle(3, 12),
          nearWhole(1, 2),
          middle(12, 200),
          ["2^8 to 2^1013", (r) => r.positive(8, 1013)],
          ["2^-1022 to 1", (r) => r.positive(-1022, 0)],
          anything,
        ],
      },
    ],
  },
  {
    title: "Normal distribution",
    note:
      "The quantile follows AS 241, which is good to a relative error rather than to an ulp: the bound of 9 ulp stands for a " +
      "relative error of 1e-15.",
    functions: [
      {
        name: "normalPdf",
        bound: 2.5,
        timed: [-4, 4],
        samples: [middle(-3, 3), middle(-38.7, 38.7), middle(37.5, 38.7), small, anything],
      },
      {
        name: "normalCdf",
        bound: 3.5,
        timed: [-4, 4],
        samples: [
          middle(-1.5, 1.5),
          middle(-10, 9),
          middle(-38.6, -3),
          middle(-38.6, -37.5),
          small,
          anything,
        ],
      },
      {
        name: "normalQuantile",
        bound: 9,
        timed: [0, 1],
        rare: [0, 1e-12],
        samples: [
          middle(0, 1),
          ["2^-1074 to 1/2", (r) => r.positive(-1074, -1)],
          ["1/2 ± 2^-53 to 2^-2", (r) => 0.5 + r.scale(-53, -2)],
          ["1 - 2^-53 to 2^-3", (r) => 1 - r.positive(-53, -3)],
          anything,
        ],
      },
    ],
  },
];
