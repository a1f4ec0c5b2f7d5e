import { COMMANDS, type Command } from "#server/cli/arguments.ts";
import { EXIT, type ExitStatus, UsageError } from "#server/cli/exit.ts";
import { help } from "#server/cli/help.ts";
import { report } from "#server/cli/report.ts";
import { print } from "#server/cli/terminal.ts";
import { version } from "#server/cli/version.ts";

type Run = (argv: string[]) => Promise<ExitStatus>;

/** Each command is loaded when it is called: help and wrong calls answer without the engine. */
const RUN: Record<Command, () => Promise<Run>> = {
  read: async () => (await import("#server/cli/commands/read.ts")).read,
  tune: async () => (await import("#server/cli/commands/tune.ts")).tune,
  predict: async () => (await import("#server/cli/commands/predict.ts")).predict,
  prove: async () => (await import("#server/cli/commands/prove.ts")).prove,
};

process.exitCode = await main(process.argv.slice(2));

async function main(argv: string[]): Promise<ExitStatus> {
  // Without a listener a closed pipe would end the process with a stack trace; print() learns of it by itself.
  process.stdout.on("error", () => {});
  process.stderr.on("error", () => {});
  try {
    return await run(argv);
  } catch (error) {
    return await report(error, argv.includes("--json"));
  }
}

async function run([name, ...rest]: string[]): Promise<ExitStatus> {
  if (name === undefined) throw new UsageError("COMMAND is missing");
  if (name === "--version") return answer(`${version}\n`);
  if (name === "--help" || name === "-h" || name === "help") return answer(help(COMMANDS.find((it) => it === rest[0])));
  const command = COMMANDS.find((it) => it === name);
  if (command === undefined) throw new UsageError(unknownCommand(name));
  if (rest.includes("--help") || rest.includes("-h")) return answer(help(command));
  const start = await RUN[command]();
  return start(rest);
}

async function answer(text: string): Promise<ExitStatus> {
  await print(text);
  return EXIT.done;
}

function unknownCommand(name: string): string {
  if (name.startsWith("-")) return `the command comes first, before ${name}`;
  return `there is no command "${name}"`;
}
