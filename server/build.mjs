// `npm run build`: bundles what runs outside the browser into dist/.
import { rmSync } from "node:fs";
import { join } from "node:path";
import { bundle, ROOT } from "./bundle.mjs";

const outDir = join(ROOT, "dist");
rmSync(outDir, { recursive: true, force: true });
await bundle({ quenchline: "server/cli/quenchline.ts" }, outDir);
