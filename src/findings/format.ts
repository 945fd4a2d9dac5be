/**
 * Numbers in words: only the digits that their uncertainty supports (two digits of the uncertainty, as the GUM, JCGM
 * 100:2008, 7.2.6, advises). Shared by the command line and the report.
 */

/** `value` to the second significant digit of `uncertainty`; without one, two significant digits. */
export function formatValue(value: number, uncertainty: number | null = null): string {
  if (!Number.isFinite(value)) return String(value);
  if (value === 0 && uncertainty === null) return "0";
  if (uncertainty === null || !(uncertainty > 0) || !Number.isFinite(uncertainty)) return plain(value, 2);
  const size = Math.abs(value);
  const place = Math.floor(Math.log10(uncertainty)) - 1;
  const digits = Math.min(17, Math.floor(Math.log10(size)) - place + 1);
  // A value far below its own uncertainty keeps the places of the uncertainty, unless those are too many to read.
  if (digits < 1 && place < -8) return "0";
  if ((size < 1e-4 || size >= 1e9) && digits >= 1) return exponential(value, digits);
  return place < 0 ? fixed(value, -place) : fixed(Math.round(value / 10 ** place) * 10 ** place, 0);
}

/** `digits` significant digits, with an exponent only below 1e-4 or from 1e9 on. */
function plain(value: number, digits: number): string {
  const size = Math.abs(value);
  if (size !== 0 && (size < 1e-4 || size >= 1e9)) return exponential(value, digits);
  const rounded = Number(value.toPrecision(digits));
  return fixed(rounded, Math.max(0, digits - 1 - Math.floor(Math.log10(Math.abs(rounded) || 1))));
}

function exponential(value: number, digits: number): string {
  return signs(value.toExponential(digits - 1));
}

/** The exponent of a number's text with a true minus sign or none. */
function signs(text: string): string {
  return minus(text).replace("e+", "e").replace("e-", "e\u2212");
}

/** Fixed places after the point, thousands apart before it. */
function fixed(value: number, places: number): string {
  const [whole = "", part] = value.toFixed(Math.min(100, places)).split(".");
  const apart = whole.replace(/\B(?=(\d{3})+$)/g, ",");
  return minus(part === undefined ? apart : `${apart}.${part}`);
}

/** A true minus sign in place of the hyphen, none before zeros. */
function minus(text: string): string {
  if (!text.startsWith("-")) return text;
  return /[1-9]/.test(text) ? text.replace("-", "\u2212") : text.slice(1);
}

/** A given number (a tolerance, a constant) as it is, up to `digits` significant digits and no idle zeros. */
export function plainNumber(value: number, digits = 10): string {
  if (!Number.isFinite(value)) return formatValue(value);
  const [, whole = "", rest = ""] = /^-?(\d+)(.*)$/.exec(String(Number(value.toPrecision(digits)))) ?? [];
  const sign = value < 0 ? "\u2212" : "";
  return sign + whole.replace(/\B(?=(\d{3})+$)/g, ",") + signs(rest);
}

/** A value to the digits of its uncertainty, its sign always shown. */
export function signed(value: number, uncertainty: number | null): string {
  const text = formatValue(value, uncertainty);
  return value > 0 && /[1-9]/.test(text) ? `+${text}` : text;
}

/** A value to the digits that its interval supports (a 95 % interval is about four standard errors wide). */
export function withInterval(value: number, interval: readonly [number, number] | null): string {
  if (value === 0) return "0";
  return formatValue(value, interval === null ? null : (interval[1] - interval[0]) / 4);
}

/** A known value in words, or a dash. */
export function orDash(value: number | null | undefined, words: (value: number) => string): string {
  return typeof value === "number" ? words(value) : "\u2013";
}

/** An interval with the digits that its own width supports. */
export function formatInterval([low, high]: readonly [number, number]): string {
  const width = (high - low) / 4;
  return `${formatValue(low, width)} to ${formatValue(high, width)}`;
}

/** A whole number with thousands separated: 262,144; from a million on, if `about`, "2.0 million". */
export function formatCount(count: number, about = false): string {
  if (!Number.isFinite(count)) return String(count);
  if (!about) return fixed(count, 0);
  if (count >= 1e15) return plain(count, 2);
  for (const [size, name] of SCALES) {
    if (count >= 0.9995 * size) return `${(count / size).toPrecision(count < 9.95 * size ? 2 : 3)} ${name}`;
  }
  // Two digits: a fitted number of points supports no more.
  return fixed(Number(count.toPrecision(2)), 0);
}

/** Numbers of points above this are not told apart: no machine gets there. */
export const COUNTLESS = 1e15;

/**
 * The n to tolerance in words: fitted, so "≈" and two digits; exact where even the smallest size measured keeps the
 * tolerance (its interval is then that one size).
 */
export function formatReach(reach: {
  readonly n: number;
  readonly interval: readonly [number, number] | null;
}): string {
  if (reach.n > COUNTLESS) return "more than 10^15";
  if (reach.interval !== null && reach.interval[0] === reach.interval[1]) return formatCount(reach.n);
  return `\u2248 ${formatCount(reach.n, true)}`;
}

const SCALES = [
  [1e12, "trillion"],
  [1e9, "billion"],
  [1e6, "million"],
] as const;

/** A duration in the unit that suits it. */
export function formatSeconds(seconds: number): string {
  if (!(seconds >= 0) || !Number.isFinite(seconds)) return String(seconds);
  if (seconds === 0) return "0 s";
  if (seconds < 1e-3) return `${plain(seconds * 1e6, 2)} \u00b5s`;
  if (seconds < 1) return `${plain(seconds * 1e3, 2)} ms`;
  if (seconds < 120) return `${plain(seconds, 2)} s`;
  if (seconds < 7200) return `${plain(seconds / 60, 2)} min`;
  if (seconds < 172_800) return `${plain(seconds / 3600, 2)} h`;
  if (seconds < 730 * 86_400) return `${plain(seconds / 86_400, 2)} days`;
  return `${plain(seconds / (365.25 * 86_400), 2)} years`;
}

/** A confidence or a share, without digits that were not given: 99 %, 99.9 %. */
export function formatPercent(share: number): string {
  return `${Number((share * 100).toPrecision(10))} %`;
}

/** A p-value: two digits, "< 1e−12" below that. */
export function formatPValue(p: number): string {
  return p < 1e-12 ? "< 1e\u221212" : plain(p, 2);
}

/** The parameters of a distribution that a problem file gives, in brackets after its name; nothing where there are none. */
export function formatParameters(
  parameters: Readonly<Record<string, number | readonly number[]>> | undefined,
): string {
  const words = Object.entries(parameters ?? {}).map(([name, value]) => {
    const text = typeof value === "number" ? String(value) : `${value.length} numbers`;
    return `${name} ${text}`;
  });
  return words.length === 0 ? "" : ` (${words.join(", ")})`;
}
