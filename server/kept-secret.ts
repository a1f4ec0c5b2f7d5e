import { randomBytes } from "node:crypto";
import { chmod, mkdir, readFile, writeFile } from "node:fs/promises";
import { join } from "node:path";

/**
 * A secret that is made at the first start and kept in the data folder, readable for its owner only.
 *
 * @param bytes of randomness; the text is base64url
 */
export async function keptSecret(dataDir: string, name: string, bytes: number): Promise<string> {
  const path = join(dataDir, name);
  await mkdir(dataDir, { recursive: true, mode: 0o700 });
  try {
    // A second start at the same moment finds the file complete, or makes it: `wx` lets only one through.
    const secret = randomBytes(bytes).toString("base64url");
    await writeFile(path, secret, { mode: 0o600, flag: "wx" });
    return secret;
  } catch (error) {
    if (!(error instanceof Error && "code" in error && error.code === "EEXIST")) throw error;
  }
  await chmod(path, 0o600);
  const secret = (await readFile(path, "utf8")).trim();
  if (secret === "") throw new Error(`${path} is empty. Remove it, and a new secret is made at the next start.`);
  return secret;
}
