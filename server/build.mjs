// `npm run build`: bundles the programs that run outside the browser into dist/, and the client into dist/client/. With
// `-- --programs` the client is left out.
import { buildClient, buildPrograms } from "./built.mjs";

await buildPrograms();
if (!process.argv.includes("--programs")) await buildClient();
