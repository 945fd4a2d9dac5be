/** `tolerand distributions`: the laws that an input may have, from their registry. */
import { distributionIds, distributionOf } from "../../problem/distributions/registry.js";
import { jsonText } from "../../record/json.js";
import { EXIT, type Arguments, type Io } from "../command.js";
import { booleanFlag } from "../read.js";

export function run(args: Arguments, io: Io): Promise<number> {
  const rows = distributionIds.map((id) => {
    const { title, discrete, citation, accuracy, parameters } = distributionOf(id);
    const list = Object.entries(parameters).map(([name, { about, what, default: standard }]) => ({
      name,
      about,
      range: what,
      default: standard ?? null,
    }));
    return { id, title, discrete, parameters: list, accuracy, citation };
  });
  if (booleanFlag(args, "json")) io.stdout.write(`${jsonText(rows, 2)}\n`);
  else {
    for (const { id, title, discrete, parameters, accuracy, citation } of rows) {
      io.stdout.write(`${id.padEnd(18)}${title}${discrete ? " (discrete)" : ""}\n`);
      for (const one of parameters) {
        const fallback = one.default === null ? "needed" : `default ${one.default}`;
        io.stdout.write(`${"".padEnd(18)}${one.name}: ${one.range}, ${fallback}. ${one.about}\n`);
      }
      io.stdout.write(`${"".padEnd(18)}quantile: ${accuracy}\n${"".padEnd(18)}${citation}\n`);
    }
    io.stderr.write(
      "Next: docs/inputs.md shows each in a problem file; tolerand check FILE prints moments.\n",
    );
  }
  return Promise.resolve(EXIT.done);
}
