// `npm run bench`: bundles the bench as the product is bundled, and runs it. `-- --quick` leaves the 1 GB rows out.
import { spawnSync } from "node:child_process";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { bundle, ROOT } from "../../server/bundle.mjs";

/** the compiler works as it does in the product */
const FLAGS = pathToFileURL(join(ROOT, "server/engine-flags.mjs")).href;
const folder = join(ROOT, "node_modules", ".cache", "quenchline-bench");
await bundle({ bench: "tests/bench/bench.ts", job: "tests/bench/job.ts" }, folder);
const { status } = spawnSync(
  process.execPath,
  ["--expose-gc", "--import", FLAGS, join(folder, "bench.mjs"), ...process.argv.slice(2)],
  {
    cwd: ROOT,
    stdio: "inherit",
  },
);
process.exit(status ?? 1);
