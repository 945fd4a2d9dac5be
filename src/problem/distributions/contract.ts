/** What a distribution is to the program: its parameters, its moments and density, and the passes that draw from it. */

/** A parameter of a distribution: a number with a range. */
export interface Parameter {
  readonly about: string;
  /** Completes "expected ...". */
  readonly what: string;
  readonly holds: (x: number) => boolean;
  /** Absent where the problem file has to give it. */
  readonly default?: number;
  /** True where it is a list, each number of which is in the range. */
  readonly list?: true;
}

/** Parameters by name; those of a list (values, probabilities) are vectors. */
export type ParameterValues = Readonly<Record<string, number | readonly number[]>>;

/** Forms of closed quantiles, see kernels/assembly/distributions/closed.ts. */
export const CLOSED = {
  identity: 0,
  exponentialOfNormal: 1,
  exponential: 2,
  logistic: 3,
  laplace: 4,
  cauchy: 5,
  gumbel: 6,
  weibull: 7,
  pareto: 8,
  triangular: 9,
  normalCdf: 10,
} as const;

/** One change of a row of the block, in place. Plain data, so that it can be posted to a thread. */
export type Pass =
  | { readonly kind: "normal" }
  | {
      readonly kind: "closed";
      readonly form: number;
      readonly location: number;
      readonly scale: number;
      readonly shape: number;
    }
  | { readonly kind: "pieces" | "steps" | "linear"; readonly table: Float64Array<ArrayBuffer> };

/** A distribution with its parameters set. */
export interface Law {
  /** Infinite where it diverges, NaN where it does not exist. */
  readonly mean: number;
  readonly variance: number;
  /** Least and largest value. */
  readonly support: readonly [number, number];
  /** Density at x inside the support, or the probability of x for a discrete law. For tests and displays only. */
  readonly density: (x: number) => number;
  /** The passes from uniforms on (0, 1). Made when asked for, as tables take some milliseconds. */
  readonly passes: () => readonly Pass[];
}

export interface Distribution {
  readonly title: string;
  /** Published source of the law and of its quantile. */
  readonly citation: string;
  readonly discrete: boolean;
  /** The quantile is exact to this, with the reason. */
  readonly accuracy: string;
  readonly parameters: Readonly<Record<string, Parameter>>;
  /** What is wrong with parameters that are each in range; null if nothing is. */
  readonly check?: (values: ParameterValues) => string | null;
  readonly law: (values: ParameterValues) => Law;
}
