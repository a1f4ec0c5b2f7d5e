// The server as a program: reads the environment, serves until it is told to stop.
import { AlreadyOpen } from "#server/db/lock.ts";
import { demoSignIns, seedDemo } from "#server/db/seed.ts";
import { BadEnvironment, readEnv } from "#server/env.ts";
import { makeLog } from "#server/http/logging.ts";
import { serve } from "#server/serve.ts";

async function main(): Promise<void> {
  const env = readEnv(process.env);
  const log = makeLog(env.LOG_LEVEL);
  const server = await serve(env, log, seedDemo);
  const stop = async (signal: string): Promise<void> => {
    log.info({ signal }, "stopping");
    await server.close();
    // Whatever is still open by now must not keep the process.
    process.exit(0);
  };
  for (const signal of ["SIGINT", "SIGTERM"]) process.once(signal, (name: string) => void stop(name));
  process.stdout.write(`Quenchline is ready at ${server.url}\n${await demoSignIns(server.parts)}`);
}

main().catch((error: unknown) => {
  process.stderr.write(`Quenchline could not start: ${reason(error)}\n`);
  process.exit(1);
});

/** What a person can mend is said in a sentence; for a fault of ours the stack is needed. */
function reason(error: unknown): string {
  if (error instanceof BadEnvironment || error instanceof AlreadyOpen) return error.message;
  if (!(error instanceof Error)) return String(error);
  const code = "code" in error ? error.code : undefined;
  if (code === "EADDRINUSE") return "the port is in use. Stop what uses it, or set PORT to another one.";
  if (code === "EACCES") return `${error.message}. Choose another PORT or DATA_DIR.`;
  return error.stack ?? error.message;
}
