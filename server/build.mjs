// `npm run build`, first half: bundles the programs that run outside the browser into dist/. The second is `vite build`.
import { buildPrograms } from "./built.mjs";

await buildPrograms();
