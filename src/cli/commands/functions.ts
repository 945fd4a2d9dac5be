/** `tolerand functions`: the formula language, from its table. */
import { FUNCTIONS } from "../../formula/language.js";
import { jsonText } from "../../record/json.js";
import { textTable } from "../../report/text-table.js";
import { EXIT, type Arguments, type Io } from "../command.js";
import { booleanFlag } from "../read.js";

export function run(args: Arguments, io: Io): Promise<number> {
  const rows = Object.entries(FUNCTIONS).map(
    ([
      name,
      {
        arguments: [least, most],
        shape,
        group,
        help,
      },
    ]) => ({
      name,
      group,
      shape,
      least,
      most,
      help,
    }),
  );
  if (booleanFlag(args, "json")) {
    io.stdout.write(`${jsonText(rows, 2)}\n`);
    return Promise.resolve(EXIT.done);
  }
  for (const group of new Set(rows.map((row) => row.group))) {
    const members = rows.filter((row) => row.group === group);
    const columns = [
      { title: group, align: "left" },
      { title: "arguments", align: "left" },
      { title: "meaning", align: "left" },
    ] as const;
    const lines = textTable(
      columns,
      members.map(({ name, least, most, help }) => [name, countText(least, most), help]),
    );
    io.stdout.write(`${lines.join("\n")}\n\n`);
  }
  io.stderr.write(
    "Next: docs/formula.md describes the language; tolerand new NAME writes a problem to begin with.\n",
  );
  return Promise.resolve(EXIT.done);
}

function countText(least: number, most: number): string {
  if (least === most) return String(least);
  return most === Infinity ? `${least} or more` : `${least} to ${most}`;
}
