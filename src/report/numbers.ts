/**
 * Numbers as a reader meets them: only the digits that their interval supports, a true minus sign, thousands apart.
 */

const MINUS = "\u2212";

function dressed(text: string): string {
  return text.replace(/^-/, MINUS).replace(/e([+-]?)(\d+)$/, (_, sign: string, digits: string) => {
    return `e${sign === "-" ? MINUS : ""}${digits}`;
  });
}

function thousands(digits: string): string {
  return digits.replace(/\B(?=(\d{3})+(?!\d))/g, ",");
}

/** A whole number with its thousands apart: `262,144`. */
export function wholeNumber(n: number): string {
  if (!Number.isFinite(n)) return String(n);
  return n < 0 ? `${MINUS}${thousands(String(-Math.round(n)))}` : thousands(String(Math.round(n)));
}

/** A number with `digits` significant digits, in powers of ten where it is very small or large. */
export function rounded(value: number, digits = 2): string {
  if (!Number.isFinite(value)) return dressed(String(value)).replace("Infinity", "∞");
  if (value === 0) return "0";
  const size = Math.abs(value);
  if (size < 1e-4 || size >= 1e9) return dressed(value.toExponential(digits - 1));
  const exponent = Math.floor(Math.log10(Number(size.toPrecision(digits))));
  const fixed = value.toFixed(Math.max(0, digits - 1 - exponent));
  const cut = exponent >= digits ? String(Number(value.toPrecision(digits))) : fixed;
  const [whole = "", part] = cut.split(".");
  return dressed(thousands(whole) + (part === undefined ? "" : `.${part}`));
}

/** About how many: `≈ 2.0 million`, `≈ 34,000`. */
export function roughNumber(n: number): string {
  if (n >= 1e12) return `≈ ${rounded(n, 2)}`;
  if (n >= 9.95e8) return `≈ ${rounded(n / 1e9, 2)} billion`;
  if (n >= 9.95e5) return `≈ ${rounded(n / 1e6, 2)} million`;
  return `≈ ${rounded(n, 2)}`;
}

/**
 * A value with the digits that `uncertainty` (one standard error, or half an interval) supports: the last digit shown
 * is the second significant digit of the uncertainty. Without an uncertainty: six significant digits at most.
 */
export function withUncertainty(value: number, uncertainty: number | null): string {
  if (!Number.isFinite(value)) return rounded(value);
  if (uncertainty === null || !(uncertainty > 0) || !Number.isFinite(uncertainty))
    return plainNumber(value, 6);
  const last = Math.floor(Math.log10(Number(uncertainty.toPrecision(2)))) - 1;
  const size = Math.abs(value);
  if (size < 10 ** last / 2) return "0";
  const digits = Math.min(15, Math.max(1, Math.floor(Math.log10(size)) - last + 1));
  return rounded(value, digits);
}

/** The same with its sign always shown. */
export function signed(value: number, uncertainty: number | null): string {
  const text = withUncertainty(value, uncertainty);
  return value > 0 && text !== "0" ? `+${text}` : text;
}

/** A given number (a reference, a tolerance) as it is, up to `digits` significant digits and no idle zeros. */
export function plainNumber(value: number, digits = 10): string {
  if (!Number.isFinite(value)) return rounded(value);
  const [, whole = "", part, power = ""] =
    /^(-?\d+)(?:\.(\d+))?(e.*)?$/.exec(String(Number(value.toPrecision(digits)))) ?? [];
  return dressed(thousands(whole) + (part === undefined ? "" : `.${part}`) + power);
}

/** A length of time: `0.04 s`, `6.0 s`, `12 min`, `3.1 h`, `2.4 days`. */
export function duration(seconds: number): string {
  if (seconds < 0.001) return `${rounded(seconds * 1e3, 1)} ms`;
  if (seconds < 120) return `${rounded(seconds, 2)} s`;
  if (seconds < 7200) return `${rounded(seconds / 60, 2)} min`;
  if (seconds < 172800) return `${rounded(seconds / 3600, 2)} h`;
  return `${rounded(seconds / 86400, 2)} days`;
}

/** A share as a percentage: `99 %`, `99.9 %`. */
export function percentage(share: number): string {
  return `${plainNumber(share * 100, 6)} %`;
}

/** A known value in words, or a dash. */
export function orDash(value: number | null | undefined, words: (value: number) => string): string {
  return typeof value === "number" ? words(value) : "–";
}
