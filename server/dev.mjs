// `npm run dev`: the server from source, started again when a file changes, and the client with live updates before it.
import { spawn } from "node:child_process";
import { join } from "node:path";
import { ROOT } from "./bundle.mjs";
import { installMissing } from "./install.mjs";

await installMissing();
const bin = (...path) => join(ROOT, "node_modules", ...path);
const programs = [
  [bin("tsx", "dist", "cli.mjs"), "watch", "--clear-screen=false", "server/index.ts"],
  [bin("vite", "bin", "vite.js")],
].map((argv) => spawn(process.execPath, argv, { cwd: ROOT, stdio: "inherit" }));

const stop = () => {
  for (const program of programs) program.kill("SIGTERM");
};
for (const signal of ["SIGINT", "SIGTERM"]) process.on(signal, stop);
// One without the other is of no use.
for (const program of programs) program.on("exit", stop);
