import { mkdtempSync, rmSync } from "node:fs";
import { createServer } from "node:http";
import type { AddressInfo } from "node:net";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { build } from "vite";
import { buildApp } from "#server/app.ts";
import { openDatabase } from "#server/db/client.ts";
import { seedDemo } from "#server/db/seed.ts";
import { readEnv } from "#server/env.ts";
import { makeLog } from "#server/http/logging.ts";
import { makeParts } from "#server/make-parts.ts";

export const PASSWORD = "a password for the demo";

export interface RunningApp {
  url: string;
  /** a place for files of the test's own, gone when the app is */
  folder: string;
  close(): Promise<void>;
}

/** The whole application on data of its own: the client as it is shipped, the server with the demo team. */
export async function runApp(): Promise<RunningApp> {
  const folder = mkdtempSync(join(tmpdir(), "quenchline-e2e-"));
  const clientFolder = join(folder, "client");
  await build({ logLevel: "error", build: { outDir: clientFolder, emptyOutDir: true, reportCompressedSize: false } });

  const env = readEnv({ DATA_DIR: join(folder, "data"), PORT: "0", DEMO_PASSWORD: PASSWORD, LOG_LEVEL: "silent" });
  const closing = new AbortController();
  const database = await openDatabase(env.DATA_DIR);
  const made = await makeParts({ env, log: makeLog("silent"), db: database.db, closing: closing.signal });
  const parts = { ...made, clientFolder };
  await parts.workshop.start();
  await seedDemo(parts);
  const server = createServer(buildApp(parts));
  await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve));
  return {
    url: `http://127.0.0.1:${(server.address() as AddressInfo).port}`,
    folder,
    async close() {
      closing.abort();
      const closed = new Promise((resolve) => server.close(resolve));
      server.closeAllConnections();
      await closed;
      await parts.workshop.close();
      await database.close();
      rmSync(folder, { recursive: true, force: true });
    },
  };
}
