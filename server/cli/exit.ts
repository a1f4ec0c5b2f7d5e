import { Refusal } from "#shared/refusal.ts";

/** What the command line ends with; a contract with whoever calls it. */
export const EXIT = { done: 0, fault: 1, usage: 2, refused: 3, proofFailed: 4 } as const;
export type ExitStatus = (typeof EXIT)[keyof typeof EXIT];

/** The command was called wrongly. */
export class UsageError extends Error {
  override readonly name = "UsageError";
  /** the command whose usage helps, if it is known */
  readonly command: string | undefined;

  constructor(message: string, command?: string) {
    super(message);
    this.command = command;
  }
}

/** A refusal together with the file it is about, as the caller named it. */
export class InputRefused extends Error {
  override readonly name = "InputRefused";
  readonly refusal: Refusal;
  readonly file: string;

  constructor(refusal: Refusal, file: string) {
    super(refusal.message);
    this.refusal = refusal;
    this.file = file;
  }
}

/** What stands in the way is neither the call nor the input: a full disk, a folder that can't be written. */
export class Obstacle extends Error {
  override readonly name = "Obstacle";
  readonly remedy: string;

  constructor(message: string, remedy: string) {
    super(message);
    this.remedy = remedy;
  }
}

/** Runs work on one input, so that a refusal names it. */
export async function aboutFile<Result>(file: string, work: () => Result | Promise<Result>): Promise<Result> {
  try {
    return await work();
  } catch (error) {
    throw error instanceof Refusal ? new InputRefused(error, file) : error;
  }
}

/** The system's code of an error, such as `ENOENT`. */
export function errorCode(error: unknown): string | undefined {
  return error instanceof Error && "code" in error && typeof error.code === "string" ? error.code : undefined;
}
