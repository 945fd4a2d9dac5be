/**
 * Whole numbers as people write them: `65539`, `"2^31 - 1"`, `"7^5"`, `"(2^64 - 59)"`. Exact, in BigInt. The grammar
 * is + - * ^ and parentheses over decimal integers; ^ binds strongest and to the right, a sign may stand first.
 */

/** No value may pass this many bits: far above any modulus in use, and it keeps hostile powers cheap. */
const LARGEST_BITS = 4096n;
const LONGEST = 1000;
const DEEPEST = 50;

/**
 * The value of an integer formula. A number must be a whole one below 2^53 in size. Throws a RangeError or TypeError
 * that names `key`, what was found and what is allowed.
 */
export function parseInteger(written: unknown, key: string): bigint {
  if (typeof written === "bigint") return written;
  if (typeof written === "number") {
    if (Number.isSafeInteger(written)) return BigInt(written);
    throw new RangeError(
      `${key}: expected a whole number (write large ones as text, like "2^64 - 59"), found ${written}`,
    );
  }
  if (typeof written !== "string") {
    throw new TypeError(
      `${key}: expected a whole number or a formula like "2^31 - 1", found ${kindOf(written)}`,
    );
  }
  return new Parser(written, key).parse();
}

function kindOf(value: unknown): string {
  if (value === null) return "nothing";
  return Array.isArray(value) ? "a list" : `a value of type ${typeof value}`;
}

class Parser {
  readonly #tokens: readonly string[];
  #at = 0;
  #depth = 0;

  constructor(
    readonly text: string,
    readonly key: string,
  ) {
    if (text.length > LONGEST) this.#fail(`a text of ${text.length} characters`);
    this.#tokens = text.match(/\d+|\S/g) ?? [];
  }

  parse(): bigint {
    const value = this.#sum();
    if (this.#peek() !== undefined) this.#fail(`"${this.text}" (unexpected "${this.#peek()}")`);
    return value;
  }

  #peek(): string | undefined {
    return this.#tokens[this.#at];
  }

  #take(...expected: string[]): string | undefined {
    const token = this.#peek();
    if (token === undefined || !expected.includes(token)) return undefined;
    this.#at++;
    return token;
  }

  #sum(): bigint {
    let value = this.#product();
    for (let sign = this.#take("+", "-"); sign !== undefined; sign = this.#take("+", "-")) {
      const next = this.#product();
      value = this.#bounded(sign === "+" ? value + next : value - next);
    }
    return value;
  }

  #product(): bigint {
    let value = this.#signed();
    while (this.#take("*") !== undefined) value = this.#bounded(value * this.#signed());
    return value;
  }

  #signed(): bigint {
    if (this.#take("-") !== undefined) return -this.#nested(() => this.#signed());
    return this.#power();
  }

  #power(): bigint {
    const base = this.#atom();
    if (this.#take("^") === undefined) return base;
    const exponent = this.#nested(() => this.#signed());
    if (exponent < 0n) this.#fail(`"${this.text}" (a negative exponent)`);
    const bits = BigInt((base < 0n ? -base : base).toString(2).length);
    if (base * base > 1n && (exponent > LARGEST_BITS || bits * exponent > 2n * LARGEST_BITS))
      this.#tooLarge();
    // 0, 1 and -1 stay small whatever the exponent; its parity decides
    return this.#bounded(
      base * base > 1n ? base ** exponent : base ** (exponent > 0n ? 2n - (exponent & 1n) : 0n),
    );
  }

  #atom(): bigint {
    if (this.#take("(") !== undefined) {
      const value = this.#nested(() => this.#sum());
      if (this.#take(")") === undefined) this.#fail(`"${this.text}" (a parenthesis is not closed)`);
      return value;
    }
    const token = this.#peek();
    if (token === undefined) return this.#fail(`"${this.text}" (it ends too early)`);
    if (!/^\d+$/.test(token)) return this.#fail(`"${this.text}" (unexpected "${token}")`);
    this.#at++;
    return this.#bounded(BigInt(token));
  }

  #nested(inner: () => bigint): bigint {
    if (++this.#depth > DEEPEST) this.#fail(`a formula nested deeper than ${DEEPEST} levels`);
    const value = inner();
    this.#depth--;
    return value;
  }

  #bounded(value: bigint): bigint {
    if (value >> LARGEST_BITS > 0n || -value >> LARGEST_BITS > 0n) this.#tooLarge();
    return value;
  }

  #tooLarge(): never {
    throw new RangeError(
      `${this.key}: expected a value of at most ${LARGEST_BITS} bits, found "${this.text}"`,
    );
  }

  #fail(found: string): never {
    throw new RangeError(
      `${this.key}: expected a whole number or a formula of whole numbers with + - * ^ ( ), like "2^31 - 1", found ${found}`,
    );
  }
}
