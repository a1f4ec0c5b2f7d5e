import { EXIT, type ExitStatus, errorCode, InputRefused, Obstacle, UsageError } from "#server/cli/exit.ts";
import { usage } from "#server/cli/help.ts";
import { complain, print } from "#server/cli/terminal.ts";

/**
 * Tells why a command ended early: what is wrong, where, what to do.
 *
 * @param json also put a refusal on standard output as one JSON object
 */
export async function report(error: unknown, json: boolean): Promise<ExitStatus> {
  if (error instanceof UsageError) {
    complain(`quenchline: ${error.message}\n\n${usage(error.command)}`);
    return EXIT.usage;
  }
  if (error instanceof InputRefused) {
    complain(refusalText(error));
    if (json) await print(`${JSON.stringify(refusalDocument(error))}\n`);
    return EXIT.refused;
  }
  if (error instanceof Obstacle) {
    complain(`quenchline: ${error.message}\nwhat to do: ${error.remedy}\n`);
    return EXIT.fault;
  }
  // Whoever reads our output has had enough of it, as `head` does: no reason to complain.
  if (errorCode(error) === "EPIPE") return EXIT.done;
  const { message, stack } = error instanceof Error ? error : new Error(String(error));
  const details = process.env.DEBUG ? stack : `${message}\nIt happened inside quenchline; DEBUG=1 shows where.`;
  complain(`quenchline: this is a fault of ours: ${details}\n`);
  return EXIT.fault;
}

function refusalText({ refusal, file }: InputRefused): string {
  const { line, layer, path } = refusal.place;
  const where = [
    file === "-" ? "standard input" : file,
    ...(line === undefined ? [] : [`line ${line}`]),
    ...(layer === undefined ? [] : [`layer ${layer}`]),
    ...(path ? [path] : []),
  ];
  const what = refusal.message.replaceAll("\n", "\n  ");
  return `quenchline: ${what}\nwhere: ${where.join(", ")}\nwhat to do: ${refusal.remedy}\n`;
}

/** Fields that are not known are left out. */
function refusalDocument({ refusal, file }: InputRefused): object {
  const { code, message, remedy, place } = refusal;
  const { line, layer, path } = place;
  return { format: "quenchline.refusal/1", code, message, remedy, file, line, layer, path };
}
