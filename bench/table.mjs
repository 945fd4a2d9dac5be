// Small helpers of the benchmarks: medians, Markdown tables, and putting a table between its marks in a page.

export function median(values) {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = sorted.length / 2;
  return sorted.length % 2 === 1 ? sorted[Math.floor(middle)] : (sorted[middle - 1] + sorted[middle]) / 2;
}

/** A Markdown table; `align` has one letter a column, l or r. */
export function table(head, rows, align) {
  const line = (cells) => `| ${cells.join(" | ")} |\n`;
  return line(head) + line([...align].map((a) => (a === "r" ? "---:" : "---"))) + rows.map(line).join("");
}

/** Puts `text` between <!-- name --> and <!-- end --> of `page`. */
export function insert(page, name, text) {
  const begin = `<!-- ${name} -->\n`;
  const at = page.indexOf(begin);
  if (at < 0) throw new Error(`no mark for ${name}`);
  const end = page.indexOf("<!-- end -->", at);
  return `${page.slice(0, at + begin.length)}\n${text}\n${page.slice(end)}`;
}
