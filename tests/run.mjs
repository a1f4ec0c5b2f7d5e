// `npm test` on a fresh clone: installs what is missing, then runs every test.
import { spawnSync } from "node:child_process";
import { existsSync } from "node:fs";
import { fileURLToPath } from "node:url";

const root = fileURLToPath(new URL("..", import.meta.url));
const run = (command, args) => spawnSync(command, args, { cwd: root, stdio: "inherit" }).status ?? 1;

if (!existsSync(`${root}node_modules/vitest`)) {
  const status = run("npm", ["ci"]);
  if (status !== 0) process.exit(status);
}
process.exit(run(process.execPath, ["node_modules/vitest/vitest.mjs", "run", ...process.argv.slice(2)]));
