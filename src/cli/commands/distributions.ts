/** `tolerand distributions`: the laws and paths that an input may have, from their registries. */
import type { Parameter } from "../../problem/distributions/contract.js";
import { distributionIds, distributionOf } from "../../problem/distributions/registry.js";
import { CONSTRUCTIONS } from "../../problem/gaussian/constructions.js";
import { processIds, processOf, TIMES } from "../../problem/gaussian/paths.js";
import { jsonText } from "../../record/json.js";
import { EXIT, type Arguments, type Io } from "../command.js";
import { booleanFlag } from "../read.js";

interface ParameterRow {
  readonly name: string;
  readonly about: string;
  readonly range: string;
  readonly default: number | null;
}

export function run(args: Arguments, io: Io): Promise<number> {
  const laws = distributionIds.map((id) => {
    const { title, discrete, citation, accuracy, parameters } = distributionOf(id);
    return {
      id,
      kind: "distribution",
      title,
      discrete,
      parameters: parametersOf(parameters),
      accuracy,
      citation,
    };
  });
  const paths = processIds.map((id) => {
    const { title, citation, parameters } = processOf(id);
    return { id, kind: "path", title, parameters: parametersOf({ ...parameters, times: TIMES }), citation };
  });
  if (booleanFlag(args, "json")) {
    io.stdout.write(`${jsonText([...laws, ...paths], 2)}\n`);
    return Promise.resolve(EXIT.done);
  }
  for (const { id, title, discrete, parameters, accuracy, citation } of laws) {
    entry(io, id, `${title}${discrete ? " (discrete)" : ""}`, parameters, [
      `quantile: ${accuracy}`,
      citation,
    ]);
  }
  io.stdout.write(`\nPaths (path: instead of distribution:), by ${CONSTRUCTIONS.join(", ")}\n\n`);
  for (const { id, title, parameters, citation } of paths) entry(io, id, title, parameters, [citation]);
  io.stderr.write("Next: docs/inputs.md shows each in a problem file; tolerand check FILE prints moments.\n");
  return Promise.resolve(EXIT.done);
}

function entry(io: Io, id: string, title: string, parameters: readonly ParameterRow[], more: string[]): void {
  const lines = [...parameters.map(parameterWords), ...more].map((line) => `${"".padEnd(20)}${line}\n`);
  io.stdout.write(`${id.padEnd(20)}${title}\n${lines.join("")}`);
}

function parametersOf(parameters: Readonly<Record<string, Parameter>>): ParameterRow[] {
  return Object.entries(parameters).map(([name, { about, what, list, default: standard }]) => {
    return { name, about, range: list ? `a list, each ${what}` : what, default: standard ?? null };
  });
}

function parameterWords({ name, range, about, default: standard }: ParameterRow): string {
  const needed = name === "times" ? "" : ", needed";
  return `${name}: ${range}${standard === null ? needed : `, default ${standard}`}. ${about}`;
}
