import { createServer, type Server } from "node:http";
import type { AddressInfo } from "node:net";
import type { Logger } from "pino";
import { buildApp } from "#server/app.ts";
import { openDatabase } from "#server/db/client.ts";
import type { Env } from "#server/env.ts";
import { makeParts } from "#server/make-parts.ts";
import type { Parts } from "#server/parts.ts";

/** Requests that are still being answered when the server stops get this long. */
const GRACE_MS = 5_000;

export interface RunningServer {
  /** where it can be reached from this computer */
  url: string;
  parts: Parts;
  /** Finishes what is being answered, stops working and closes the database. */
  close(): Promise<void>;
}

/**
 * Opens everything below the data folder and listens.
 *
 * @param prepare what must be there before the first request, such as the demo's data
 */
export async function serve(
  env: Env,
  log: Logger,
  prepare: (parts: Parts) => Promise<void> = async () => {},
): Promise<RunningServer> {
  const closing = new AbortController();
  const database = await openDatabase(env.DATA_DIR);
  let parts: Parts | undefined;
  const closeParts = async () => {
    closing.abort();
    await parts?.workshop.close();
    await database.close();
  };
  try {
    parts = await makeParts({ env, log, db: database.db, closing: closing.signal });
    await parts.workshop.start();
    await prepare(parts);
    const server = await listen(createServer(buildApp(parts)), env);
    const close = async () => {
      closing.abort();
      await stop(server);
      await closeParts();
    };
    return { url: urlOf(server, env), parts, close };
  } catch (error) {
    await closeParts();
    throw error;
  }
}

function listen(server: Server, { HOST, PORT }: Env): Promise<Server> {
  // A gigabyte over a workshop's network takes longer than Node's five minutes.
  server.requestTimeout = 0;
  return new Promise((resolve, reject) => {
    server.once("error", reject);
    server.listen(PORT, HOST, () => {
      server.off("error", reject);
      resolve(server);
    });
  });
}

function stop(server: Server): Promise<void> {
  return new Promise((resolve) => {
    const impatient = setTimeout(() => server.closeAllConnections(), GRACE_MS);
    server.close(() => {
      clearTimeout(impatient);
      resolve();
    });
    server.closeIdleConnections();
  });
}

function urlOf(server: Server, { HOST }: Env): string {
  const { port } = server.address() as AddressInfo;
  const here = HOST === "0.0.0.0" || HOST === "::" ? "localhost" : HOST.includes(":") ? `[${HOST}]` : HOST;
  return `http://${here}:${port}`;
}
