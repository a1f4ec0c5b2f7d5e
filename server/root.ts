import { existsSync } from "node:fs";
import { dirname, join } from "node:path";

/** The project's folder, whether this runs from source or from a bundle in dist/. */
export const ROOT = findRoot(import.meta.dirname);

function findRoot(folder: string): string {
  if (existsSync(join(folder, "package.json"))) return folder;
  const parent = dirname(folder);
  if (parent === folder) throw new Error("The server must run from inside its project's folder");
  return findRoot(parent);
}
