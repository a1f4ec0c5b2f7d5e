import { resolve } from "node:path";

/**
 * A path as the caller means it. npm runs scripts in the project's folder and leaves the caller's own in INIT_CWD. The
 * variable is inherited by everything an npm script starts, so it only counts when npm started this very script.
 */
export function callerPath(name: string): string {
  const { npm_lifecycle_event: script, INIT_CWD: folder } = process.env;
  return resolve((script === "quenchline" && folder) || process.cwd(), name);
}
