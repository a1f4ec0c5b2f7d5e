// `npm run bench`: bundles the bench as the product is bundled, and runs it. `-- --quick` leaves the 1 GB rows out.
import { spawnSync } from "node:child_process";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { bundle, ROOT } from "../../server/bundle.mjs";

/** compiler and memory work as they do in the product: see `quenchline` in package.json */
const FLAGS = pathToFileURL(join(ROOT, "server/engine-flags.mjs")).href;
const folder = join(ROOT, "node_modules", ".cache", "quenchline-bench");
await bundle({ bench: "tests/bench/bench.ts", job: "tests/bench/job.ts" }, folder);
const { status } = spawnSync(
  process.execPath,
  ["--expose-gc", "--max-semi-space-size=4", "--import", FLAGS, join(folder, "bench.mjs"), ...process.argv.slice(2)],
  {
    cwd: ROOT,
    stdio: "inherit",
  },
);
process.exit(status ?? 1);
