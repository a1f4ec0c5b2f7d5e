// `npm test`: installs what is missing, packages and Chromium, then runs every test.
import { spawnSync } from "node:child_process";
import { existsSync } from "node:fs";
import { fileURLToPath } from "node:url";

const root = fileURLToPath(new URL("..", import.meta.url));
const run = (command, args) => spawnSync(command, args, { cwd: root, stdio: "inherit" }).status ?? 1;

function must(command, args) {
  const status = run(command, args);
  if (status !== 0) process.exit(status);
}

if (!existsSync(`${root}node_modules/vitest`)) must("npm", ["ci"]);

const only = process.argv.slice(2);
const needsBrowser = existsSync(`${root}tests/e2e`) && only.length === 0;
if (needsBrowser && !existsSync("/usr/bin/chromium")) {
  if (process.getuid?.() !== 0) {
    process.stderr.write(
      "The browser tests need Chromium: install the package chromium (as root: apt-get install chromium).\n",
    );
    process.exit(1);
  }
  must("apt-get", ["update", "-qq"]);
  must("apt-get", ["install", "-y", "-qq", "chromium"]);
}

process.exit(run(process.execPath, ["node_modules/vitest/vitest.mjs", "run", ...only]));
