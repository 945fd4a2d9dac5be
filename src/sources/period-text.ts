/** Periods as people read them: exact where short, as a power of two where they are one or nearly one. */

/** "2^64", "2^128 − 1", "2,147,483,646" or "about 2^191". */
export function periodText(period: bigint): string {
  const bits = period.toString(2).length;
  if (period === 1n << BigInt(bits - 1)) return `2^${bits - 1}`;
  if (period === (1n << BigInt(bits)) - 1n && bits > 20) return `2^${bits} − 1`;
  if (period < 1_000_000_000_000n) return period.toLocaleString("en");
  const leading = Number(period >> BigInt(Math.max(0, bits - 53)));
  return `about 2^${Math.round(Math.max(0, bits - 53) + Math.log2(leading))}`;
}
