/** States of a stream as JSON: exact to the bit, 64-bit words in hexadecimal. */

const WORD = /^[0-9a-f]{16}$/;

export function saveStates(id: string, states: readonly (readonly bigint[])[]): string {
  const words = states.map((state) => state.map((word) => word.toString(16).padStart(16, "0")));
  return JSON.stringify({ source: id, states: words });
}

/** The words of `count` states of `length` words each, checked against the source they are restored to. */
export function restoreStates(saved: string, id: string, count: number, length: number): bigint[][] {
  const { source, states } = parse(saved, id);
  if (source !== id) {
    throw new RangeError(`state: expected a saved state of source "${id}", found one of "${String(source)}"`);
  }
  const fits =
    Array.isArray(states) &&
    states.length === count &&
    states.every((state) => Array.isArray(state) && state.length === length && state.every(isWord));
  if (!fits) {
    throw new RangeError(
      `state: expected ${count} saved state(s) of ${length} hexadecimal words for source "${id}", found another layout`,
    );
  }
  return (states as string[][]).map((state) => state.map((word) => BigInt(`0x${word}`)));
}

function isWord(value: unknown): boolean {
  return typeof value === "string" && WORD.test(value);
}

function parse(saved: string, id: string): { source?: unknown; states?: unknown } {
  try {
    const value: unknown = JSON.parse(saved);
    if (typeof value === "object" && value !== null) return value;
  } catch {
    // not JSON: reported below
  }
  throw new RangeError(
    `state: expected the JSON text of a saved state of source "${id}", found another text`,
  );
}
