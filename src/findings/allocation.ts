/**
 * Allocation: points for each problem of a weighted sum, at least total cost for a tolerance on the sum, or with the least
 * error for a time. The error of sum w_i Q_i has bias sum |w_i| |b_i| at most and variance sum w_i^2 s_i(n_i)^2, the
 * estimates being independent. With s_i(n) = C_i n^-p_i and c_i seconds a point, the method of Lagrange gives
 *
 *     n_i = (mu p_i w_i^2 C_i^2 / c_i)^(1 / (2 p_i + 1)),
 *
 * mu set by the tolerance (after the biases are subtracted) or the time. For crude sampling, p = 1/2 and C = sigma, that is
 * n_i in proportion to w_i sigma_i / sqrt(c_i) (Cochran, Sampling Techniques, 3rd ed., 1977, section 5.5, there for strata).
 * Each problem takes the source with the smallest c n + (mu / 2) w^2 s^2, its share of the Lagrangian.
 *
 * Then sizes are rounded up to valid ones and held against the deviations as they were measured, not the power law: raised
 * where the sum is still outside, the raise with the most variance per second first; halved where it stays inside.
 */

/** One way to integrate one problem. */
export interface AllocationChoice {
  readonly source: string;
  /** Seconds per point, > 0. */
  readonly cost: number;
  /** p > 0 and C > 0 of s(n) = C n^-p. */
  readonly order: number;
  readonly constant: number;
  /** Known bias, >= 0. */
  readonly bias: number;
  /** s(n) as measured and fitted. */
  readonly deviation: (n: number) => number;
  /** The smallest valid size of at least n. */
  readonly up: (n: number) => number;
  /** Beyond it s is extrapolated. */
  readonly known: number;
}

export interface AllocationItem {
  readonly problem: string;
  /** Not 0. */
  readonly weight: number;
  /** At least one. */
  readonly choices: readonly AllocationChoice[];
}

export interface AllocatedRow {
  readonly problem: string;
  readonly weight: number;
  readonly source: string;
  readonly n: number;
  readonly seconds: number;
  /** |w| s(n): the problem's share of the deviation of the sum. */
  readonly deviation: number;
  readonly extrapolated: boolean;
}

export interface Allocation {
  readonly rows: readonly AllocatedRow[];
  /** sum |w b| + k sqrt(sum w^2 s^2). */
  readonly total: number;
  readonly bias: number;
  readonly seconds: number;
}

/** What an allocation is to keep: a total error, or a time. */
export type AllocationGoal = { readonly tolerance: number } | { readonly seconds: number };

interface Placed {
  readonly item: AllocationItem;
  readonly choice: AllocationChoice;
  readonly n: number;
}

/** Largest n of a problem, and the multipliers between which mu is sought (natural logarithms). */
const MOST_POINTS = 2 ** 40;
const [LEAST_MU, MOST_MU] = [-300, 300];

/**
 * The least-cost allocation for a tolerance, or the least-error one for a time; `factor` is the coverage factor k. Null
 * where no sizes keep the goal.
 */
export function allocate(
  items: readonly AllocationItem[],
  goal: AllocationGoal,
  factor: number,
): Allocation | null {
  if (items.length === 0) return null;
  if ("tolerance" in goal) {
    const inside = (rows: readonly Placed[]) => measuredTotal(rows, factor) <= goal.tolerance;
    const mu = bisect((x) => fittedTotal(continuous(items, x), factor) <= goal.tolerance, true);
    if (mu === null) return null;
    const raised = raise(rounded(continuous(items, mu)), inside);
    return raised === null ? null : summary(lower(raised, inside), factor);
  }
  const affordable = (rows: readonly Placed[]) => secondsOf(rows) <= goal.seconds;
  const mu = bisect((x) => affordable(continuous(items, x)), false);
  if (mu === null) return null;
  const cut = reduce(rounded(continuous(items, mu)), affordable);
  return cut === null ? null : summary(grow(cut, affordable), factor);
}

/** The same n for every problem, from the same sources as `like`: what allocation is compared with. */
export function equalAllocation(
  items: readonly AllocationItem[],
  like: Allocation,
  tolerance: number,
  factor: number,
): Allocation | null {
  const rows = (n: number): Placed[] =>
    items.flatMap((item, i) => {
      const choice = item.choices.find(({ source }) => source === like.rows[i]?.source);
      return choice === undefined ? [] : [{ item, choice, n: choice.up(n) }];
    });
  const holds = (n: number) => measuredTotal(rows(n), factor) <= tolerance;
  let high = 1;
  while (!holds(high)) {
    high *= 2;
    if (high > MOST_POINTS) return null;
  }
  let low = high / 2;
  while (high - low > 1 && high / low > 1.001) {
    const middle = Math.round((low + high) / 2);
    if (holds(middle)) high = middle;
    else low = middle;
  }
  return summary(rows(high), factor);
}

/** Lagrange's sizes, not rounded, for ln mu; each problem with the source of the smallest share. */
function continuous(items: readonly AllocationItem[], logMu: number): Placed[] {
  return items.map((item) => {
    const placed = item.choices.map((choice): Placed => {
      const { order: p, constant, cost } = choice;
      const square = 2 * Math.log(Math.abs(item.weight) * constant);
      const n = Math.exp((logMu + Math.log(p) + square - Math.log(cost)) / (2 * p + 1));
      return { item, choice, n: Math.min(MOST_POINTS, Math.max(1, n)) };
    });
    const share = ({ choice, n }: Placed): number =>
      choice.cost * n + (Math.exp(logMu) / 2) * (item.weight * fittedDeviation(choice, n)) ** 2;
    return placed.reduce((a, b) => (share(b) < share(a) ? b : a));
  });
}

function fittedDeviation({ constant, order }: AllocationChoice, n: number): number {
  return constant * n ** -order;
}

function fittedTotal(rows: readonly Placed[], factor: number): number {
  const parts = rows.map(({ item, choice, n }) => item.weight * fittedDeviation(choice, n));
  return biasOf(rows) + factor * Math.hypot(...parts);
}

function measuredTotal(rows: readonly Placed[], factor: number): number {
  return biasOf(rows) + factor * Math.hypot(...rows.map(share));
}

function share({ item, choice, n }: Placed): number {
  return Math.abs(item.weight) * choice.deviation(n);
}

function biasOf(rows: readonly Placed[]): number {
  return rows.reduce((sum, { item, choice }) => sum + Math.abs(item.weight) * choice.bias, 0);
}

function secondsOf(rows: readonly Placed[]): number {
  return rows.reduce((sum, { choice, n }) => sum + choice.cost * n, 0);
}

/** The least (or largest) ln mu at which the condition, which holds from (or up to) some mu, holds. */
function bisect(holds: (logMu: number) => boolean, least: boolean): number | null {
  let [good, bad] = least ? [MOST_MU, LEAST_MU] : [LEAST_MU, MOST_MU];
  if (!holds(good)) return null;
  for (let i = 0; i < 60; i++) {
    const middle = (good + bad) / 2;
    if (holds(middle)) good = middle;
    else bad = middle;
  }
  return good;
}

function rounded(rows: readonly Placed[]): Placed[] {
  return rows.map((row) => ({ ...row, n: row.choice.up(row.n) }));
}

function replaced(rows: readonly Placed[], i: number, n: number): Placed[] {
  return rows.map((row, j) => (j === i ? { ...row, n } : row));
}

/** The change of one size with the largest merit, of those that are allowed; null where none is. */
function best(
  rows: readonly Placed[],
  next: (row: Placed) => number,
  allowed: (rows: readonly Placed[]) => boolean,
): Placed[] | null {
  let found: { rows: Placed[]; merit: number } | null = null;
  for (const [i, row] of rows.entries()) {
    const n = next(row);
    if (n === row.n || !(n <= MOST_POINTS)) continue;
    const changed = replaced(rows, i, n);
    if (!allowed(changed)) continue;
    const seconds = Math.abs(n - row.n) * row.choice.cost;
    const variance = Math.abs(share({ ...row, n }) ** 2 - share(row) ** 2);
    const merit = n > row.n ? variance / seconds : seconds / (variance + Number.MIN_VALUE);
    if (found === null || merit > found.merit) found = { rows: changed, merit };
  }
  return found?.rows ?? null;
}

const always = () => true;
/** Steps of a tenth where any n is valid; the next valid size elsewhere. */
const larger = ({ choice, n }: Placed) => choice.up(Math.ceil(n * 1.1));
const smaller = ({ choice, n }: Placed) => {
  const near = choice.up(Math.ceil(n / 1.1));
  return near < n ? near : choice.up(Math.ceil(n / 2));
};

function raise(rows: Placed[], inside: (rows: readonly Placed[]) => boolean): Placed[] | null {
  for (let i = 0; i < 10_000 && !inside(rows); i++) {
    const next = best(rows, larger, always);
    if (next === null) return null;
    rows = next;
  }
  return inside(rows) ? rows : null;
}

function lower(rows: Placed[], inside: (rows: readonly Placed[]) => boolean): Placed[] {
  for (let next = best(rows, smaller, inside); next !== null; next = best(rows, smaller, inside)) rows = next;
  return rows;
}

function reduce(rows: Placed[], affordable: (rows: readonly Placed[]) => boolean): Placed[] | null {
  for (let i = 0; i < 10_000 && !affordable(rows); i++) {
    const next = best(rows, smaller, always);
    if (next === null) return null;
    rows = next;
  }
  return affordable(rows) ? rows : null;
}

function grow(rows: Placed[], affordable: (rows: readonly Placed[]) => boolean): Placed[] {
  for (let next = best(rows, larger, affordable); next !== null; next = best(rows, larger, affordable))
    rows = next;
  return rows;
}

function summary(rows: readonly Placed[], factor: number): Allocation {
  return {
    rows: rows.map((row) => ({
      problem: row.item.problem,
      weight: row.item.weight,
      source: row.choice.source,
      n: row.n,
      seconds: row.n * row.choice.cost,
      deviation: share(row),
      extrapolated: row.n > row.choice.known,
    })),
    total: measuredTotal(rows, factor),
    bias: biasOf(rows),
    seconds: secondsOf(rows),
  };
}
