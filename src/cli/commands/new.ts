/** `tolerand new NAME`: a commented problem file that runs as it is. */
import { relative, resolve } from "node:path";
import { newProblem } from "../../problem/template.js";
import { EXIT, type Arguments, type Io } from "../command.js";

export async function run(args: Arguments, io: Io): Promise<number> {
  const path = relative(io.cwd, await newProblem(resolve(io.cwd, String(args["name"]))));
  io.stdout.write(`${path}\n`);
  io.stderr.write(`Next: tolerand check ${path}, then tolerand study ${path}\n`);
  return EXIT.done;
}
