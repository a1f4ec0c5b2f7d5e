import { join } from "node:path";
import { openWorkshop } from "#server/jobs/workshop.ts";
import { keptSecret } from "#server/kept-secret.ts";
import type { Parts } from "#server/parts.ts";
import { ROOT } from "#server/root.ts";

/** Makes the parts that follow from the given ones. The workshop is open but doesn't work yet. */
export async function makeParts(given: Pick<Parts, "env" | "log" | "db" | "closing">): Promise<Parts> {
  const { SESSION_SECRET, DATA_DIR } = given.env;
  return {
    ...given,
    workshop: await openWorkshop(given),
    sessionSecret: SESSION_SECRET ?? (await keptSecret(DATA_DIR, "session-secret", 48)),
    clientFolder: join(ROOT, "dist", "client"),
  };
}
