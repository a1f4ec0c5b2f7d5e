import type { Logger } from "pino";
import type { Db } from "#server/db/client.ts";
import type { Env } from "#server/env.ts";
import type { Workshop } from "#server/jobs/workshop.ts";

/** What the server is put together from. Routes take the parts they need, so that tests can put in their own. */
export interface Parts {
  env: Env;
  log: Logger;
  db: Db;
  /** stored bytes, and the jobs that are done on them */
  workshop: Workshop;
  /** signs the session cookies */
  sessionSecret: string;
  /** where the built client stands */
  clientFolder: string;
  /** aborted when the server begins to stop: streams of events end, nothing new is begun */
  closing: AbortSignal;
}
