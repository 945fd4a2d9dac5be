/** The tables of keys in docs/problem-file.md, made from the published JSON Schema. */

interface Part {
  readonly type?: string;
  readonly const?: unknown;
  readonly enum?: readonly unknown[];
  readonly anyOf?: readonly Part[];
  readonly items?: Part;
  readonly properties?: Readonly<Record<string, Part>>;
  readonly additionalProperties?: Part | boolean;
  readonly required?: readonly string[];
  readonly description?: string;
  readonly default?: unknown;
}

const code = (value: unknown): string => `\`${typeof value === "string" ? value : JSON.stringify(value)}\``;

function holds(part: Part): string {
  if (part.const !== undefined) return code(part.const);
  if (part.enum !== undefined) return part.enum.map(code).join(" or ");
  if (part.anyOf !== undefined) {
    const kinds = part.anyOf.map(holds);
    if (kinds.join() === "number,text") return "number or formula";
    return [...new Set(kinds)].join(" or ");
  }
  if (part.type === "array") {
    const item = part.items === undefined ? "" : holds(part.items);
    return item === "mapping" ? "list of mappings" : "list";
  }
  return part.type === "string" ? "text" : part.type === "number" ? "number" : "mapping";
}

function rows(part: Part, prefix: string): string[] {
  const lines: string[] = [];
  for (const [key, child] of Object.entries(part.properties ?? {})) {
    const name = `${prefix}${key}`;
    const needed = part.required?.includes(key) === true;
    const given = child.default;
    const fallback = needed
      ? "needed"
      : given === undefined
        ? ""
        : Array.isArray(given)
          ? code(given.join(", "))
          : code(given);
    lines.push(`| \`${name}\` | ${holds(child)} | ${fallback} | ${child.description ?? ""} |`);
    const entries = child.additionalProperties;
    lines.push(...rows(child, `${name}.`));
    if (typeof entries === "object") lines.push(...rows(entries, `${name}.NAME.`));
    if (child.items !== undefined) lines.push(...rows(child.items, `${name}[].`));
  }
  return lines;
}

/** A Markdown table with one row per key of a JSON Schema. */
export function keyTable(schema: unknown): string {
  return [
    "| key | holds | if absent | meaning |",
    "| --- | --- | --- | --- |",
    ...rows(schema as Part, ""),
  ].join("\n");
}
