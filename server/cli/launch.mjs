// `npm run -s quenchline -- …`: installs what is missing, bundles what has changed, runs the command.
// Standard output belongs to the command alone.
import { pathToFileURL } from "node:url";
import { freshCommandLine } from "../bundle.mjs";
import "../engine-flags.mjs";
import { installMissing } from "../install.mjs";

if (process.env.DEBUG) process.setSourceMapsEnabled(true);
try {
  await installMissing();
  await import(pathToFileURL(await freshCommandLine()));
} catch (error) {
  process.stderr.write(`quenchline could not start: ${process.env.DEBUG ? error.stack : error.message}\n`);
  process.exitCode = 1;
}
