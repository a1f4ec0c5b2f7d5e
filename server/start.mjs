// `npm start`: installs what is missing, builds what has changed, then runs the server in this very process, so that it
// gets the signals that are meant for it.
import { pathToFileURL } from "node:url";
import { freshServer } from "./built.mjs";
import "./engine-flags.mjs";
import { installMissing } from "./install.mjs";

process.setSourceMapsEnabled(true);
try {
  await installMissing();
  await import(pathToFileURL(await freshServer()));
} catch (error) {
  process.stderr.write(`quenchline could not start: ${process.env.DEBUG ? error.stack : error.message}\n`);
  process.exitCode = 1;
}
