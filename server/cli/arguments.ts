import { type ParseArgsConfig, parseArgs } from "node:util";
import { UsageError } from "#server/cli/exit.ts";

const TEXT = { type: "string" } as const;
const FLAG = { type: "boolean" } as const;

/** What each command knows, and no other option. */
const OPTIONS = {
  read: { machine: TEXT, json: FLAG },
  tune: {
    machine: TEXT,
    profile: TEXT,
    polymer: TEXT,
    out: TEXT,
    "in-place": FLAG,
    plan: TEXT,
    proof: TEXT,
  },
  predict: { machine: TEXT, profile: TEXT, polymer: TEXT, json: FLAG },
  prove: { machine: TEXT, profile: TEXT, polymer: TEXT, json: FLAG },
} as const;

export type Command = keyof typeof OPTIONS;
export const COMMANDS = Object.keys(OPTIONS) as Command[];

type Values<Options> = {
  [Name in keyof Options]?: Options[Name] extends { type: "string" } ? string : boolean;
};

/** A command's arguments as they were given: files in their order, options by name. */
export interface Arguments<Name extends Command> {
  files: string[];
  values: Values<(typeof OPTIONS)[Name]>;
}

/**
 * @param fileNames what the command's files are called in its usage, one for each
 * @throws UsageError that names what is wrong
 */
export function parseArguments<Name extends Command>(
  command: Name,
  argv: string[],
  fileNames: readonly string[],
): Arguments<Name> {
  const options: NonNullable<ParseArgsConfig["options"]> = OPTIONS[command];
  const { values, positionals: files } = parse(command, argv, options);
  const missing = fileNames[files.length];
  if (missing !== undefined) throw new UsageError(`${missing} is missing`, command);
  if (files.length > fileNames.length)
    throw new UsageError(`"${files[fileNames.length]}" is one file too many`, command);
  for (const [name, value] of Object.entries(values))
    if (value === "") throw new UsageError(`--${name} needs the name of a file`, command);
  return { files, values: values as Arguments<Name>["values"] };
}

/** The value of an option that has to be there. */
export function required(value: string | undefined, option: string, command: Command): string {
  if (value !== undefined) return value;
  // npm takes options for its own where the two dashes are forgotten, and leaves them in its environment.
  const swallowed = process.env[`npm_config_${option}`] !== undefined;
  const hint = swallowed ? ": npm took it for itself; put -- before the command" : "";
  throw new UsageError(`--${option} is missing${hint}`, command);
}

function parse(command: Command, argv: string[], options: NonNullable<ParseArgsConfig["options"]>) {
  try {
    return parseArgs({ args: argv, options, allowPositionals: true, strict: true });
  } catch (error) {
    const message = error instanceof Error ? error.message : String(error);
    // The rest of the message explains how to pass a file name that begins with a dash.
    throw new UsageError(message.split(". To specify")[0], command);
  }
}
