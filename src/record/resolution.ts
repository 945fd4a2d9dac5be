/** What output bits cost an integrand, as plain data. */

/** An estimate over replicates: standard error of its mean, and Student's interval at the level asked for. */
export interface PairedEstimate {
  readonly bias: number;
  readonly standardError: number;
  readonly interval: readonly [number, number];
}

/** The bias that b bits make: E f(rounded to b bits) - E f. */
export interface ResolutionCost extends PairedEstimate {
  readonly bits: number;
  readonly endpoint: "middle" | "left";
  readonly confidence: number;
  /** Its part that comes from points with a coordinate in an outermost cell. */
  readonly unreachableTail: PairedEstimate & {
    /** Share of all points with a coordinate nearer to 0 or 1 than any that b bits give. */
    readonly probability: number;
  };
  readonly points: number;
  readonly replicates: number;
  /** Evaluations, rounded or not, whose value was not finite; the figures are then not finite either. */
  readonly nonFinite: number;
}

/** Several numbers of bits, ascending, those of the source among them. */
export interface ResolutionLadder {
  readonly own: number;
  readonly costs: readonly ResolutionCost[];
}
