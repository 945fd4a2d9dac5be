/** `tolerand problems`: the shipped suites; `--copy SUITE` puts one into the working folder. */
import { join } from "node:path";
import { copySuite, listProblems } from "../../problem/catalogue.js";
import { jsonText } from "../../record/json.js";
import { textTable } from "../../report/text-table.js";
import { EXIT, type Arguments, type Io } from "../command.js";
import { booleanFlag, textFlag } from "../read.js";

export async function run(args: Arguments, io: Io): Promise<number> {
  const copy = textFlag(args, "copy");
  if (copy !== null) {
    const written = await copySuite(copy, join(io.cwd, copy));
    io.stdout.write(`${written.join("\n")}\n`);
    io.stderr.write(`Next: tolerand study ./${copy}\n`);
    return EXIT.done;
  }
  const suites = await listProblems();
  if (booleanFlag(args, "json")) {
    io.stdout.write(`${jsonText(suites, 2)}\n`);
    return EXIT.done;
  }
  for (const { name, title, problems } of suites) {
    const rows = problems.map((problem) => [
      problem.name,
      String(problem.dimension),
      problem.distributions.join(", "),
      problem.basis === null ? "consensus" : "exact value",
      problem.title,
    ]);
    const columns = [
      { title: name, align: "left" },
      { title: "d", align: "right" },
      { title: "inputs", align: "left" },
      { title: "reference", align: "left" },
      { title: title, align: "left" },
    ] as const;
    io.stdout.write(`${textTable(columns, rows).join("\n")}\n\n`);
  }
  io.stderr.write(
    "Next: tolerand study tidal runs a suite, tolerand problems --copy tidal copies it here.\n",
  );
  return EXIT.done;
}
