/** The frame of the command line: finds the command, checks its flags, runs it, turns errors into messages and exit codes. */
import yargs from "yargs";
import { nearest } from "../numeric/nearest.js";
import { EXIT, type Arguments, type Command, type Io } from "./command.js";
import { commands } from "./commands.js";
import { InputError } from "./errors.js";
import { messages, usage } from "./messages.js";

/** Runs the program on `argv` (without node and script) and gives its exit code. */
export async function runProgram(argv: readonly string[], io: Io, version: string): Promise<number> {
  try {
    return await dispatch(argv, io, version);
  } catch (error) {
    if (isInputError(error)) {
      io.stderr.write(`${error.message}\n`);
      return EXIT.badInput;
    }
    const text =
      error instanceof Error
        ? io.env["TOLERAND_TRACE"] === "1"
          ? error.stack
          : error.message
        : String(error);
    io.stderr.write(`${messages.internal(text ?? "unknown")}\n`);
    return EXIT.internal;
  }
}

/** Errors that rooms raise for what a user wrote. */
const INPUT_ERRORS = new Set(["InputError", "ProblemError", "FormulaError", "SourceError", "RecordError"]);

function isInputError(error: unknown): error is Error {
  return error instanceof Error && INPUT_ERRORS.has(error.name);
}

async function dispatch(argv: readonly string[], io: Io, version: string): Promise<number> {
  if (argv.length === 0) {
    io.stdout.write(usage);
    return EXIT.done;
  }
  const first = argv[0] as string;
  if (!first.startsWith("-") && first !== "help" && !commands.some((command) => command.name === first)) {
    const known = commands.map((command) => command.name);
    throw new InputError(messages.unknownCommand(first, nearest(first, known), known));
  }
  let chosen: { command: Command; args: Arguments } | null = null;
  const parser = yargs()
    .scriptName("tolerand")
    .usage("Measures, explains and budgets the error of Monte Carlo and quasi-Monte Carlo integration.")
    .version(version)
    .help()
    .alias("help", "h")
    .parserConfiguration({
      "duplicate-arguments-array": true,
      "greedy-arrays": false,
      "parse-positional-numbers": false,
    })
    .wrap(100)
    .exitProcess(false)
    .demandCommand(1)
    .fail((message, error) => {
      throw error instanceof InputError ? error : new InputError(message ?? String(error));
    });
  for (const command of commands) {
    parser.command(
      `${command.name} ${command.positional}`.trim(),
      command.summary,
      (builder) => builder.options(command.options),
      (args) => {
        chosen = { command, args };
      },
    );
  }
  let output = "";
  await parser.parseAsync(argv, {}, (_error: unknown, _args: unknown, text: string) => {
    output = text;
  });
  if (chosen === null) {
    io.stdout.write(`${output}\n`);
    return EXIT.done;
  }
  const { command, args } = chosen as { command: Command; args: Arguments };
  checkFlags(command, argv);
  const body = await command.load();
  return body.run(args, io);
}

/** yargs' own strict mode does not propose the nearest flag; names are compared as they were typed. */
function checkFlags(command: Command, argv: readonly string[]): void {
  const known = Object.entries(command.options).flatMap(([name, option]) => [
    name,
    ...[option.alias ?? []].flat(),
  ]);
  const end = argv.indexOf("--");
  for (const word of end < 0 ? argv : argv.slice(0, end)) {
    const match = /^--(?:no-)?([^=]+)/.exec(word);
    if (match === null) continue;
    const name = match[1] as string;
    if (known.includes(name) || name === "help" || name === "version") continue;
    throw new InputError(messages.unknownFlag(command.name, name, nearest(name, known)));
  }
}
