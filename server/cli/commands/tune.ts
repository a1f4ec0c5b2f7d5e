import { EXIT, type ExitStatus } from "#server/cli/exit.ts";
export async function tune(_argv: string[]): Promise<ExitStatus> {
  return EXIT.fault;
}
