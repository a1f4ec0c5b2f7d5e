import { cpSync, existsSync, mkdirSync, readdirSync, readFileSync, symlinkSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { expect, test } from "vitest";
import { outcome, ROOT, SEAL_RING, scratchFolder, start, TERN } from "#tests/server/cli/command-line.ts";

/** The program's own files in a folder of their own, with the packages but without a bundle. */
function copyOfProject(): string {
  const root = scratchFolder();
  for (const name of ["server", "shared", "package.json", "package-lock.json"])
    cpSync(join(ROOT, name), join(root, name), { recursive: true });
  mkdirSync(join(root, "node_modules"));
  for (const name of readdirSync(join(ROOT, "node_modules")))
    if (name !== ".cache") symlinkSync(join(ROOT, "node_modules", name), join(root, "node_modules", name));
  return root;
}

const bundles = (root: string) => {
  const folder = join(root, "node_modules/.cache/quenchline");
  return existsSync(folder) ? readdirSync(folder) : [];
};
const launch = (root: string, argv: string[]) =>
  outcome(start(process.execPath, [join(root, "server/cli/launch.mjs"), ...argv]));

test("launches at the same time, the first ones ever, all work and leave one bundle", async () => {
  const root = copyOfProject();
  const argv = ["read", SEAL_RING, "--machine", TERN];
  const runs = await Promise.all(Array.from({ length: 4 }, () => launch(root, argv)));
  for (const run of runs) {
    expect(run).toMatchObject({ status: 0, stderr: "" });
    expect(run.stdout).toBe(runs[0].stdout);
  }
  expect(bundles(root)).toHaveLength(1);
});

test("a bundle is made anew when a source has changed, and only then", async () => {
  const root = copyOfProject();
  await launch(root, ["--version"]);
  await launch(root, ["--version"]);
  expect(bundles(root)).toHaveLength(1);
  const help = join(root, "server/cli/help.ts");
  writeFileSync(help, readFileSync(help, "utf8").replace("To begin with", "Begin like this"));
  expect((await launch(root, ["--help"])).stdout).toContain("Begin like this");
  expect(bundles(root)).toHaveLength(2);
});

test("a source that can't be bundled ends with status 1 and a reason, with nothing on standard output", async () => {
  const root = copyOfProject();
  writeFileSync(join(root, "server/cli/help.ts"), "export const = ;");
  const { status, stdout, stderr } = await launch(root, ["--help"]);
  expect(status).toBe(1);
  expect(stdout).toBe("");
  expect(stderr).toContain("quenchline could not start");
  expect(bundles(root)).toEqual([]);
});

test("npm run build puts a program into dist that runs", async () => {
  const root = copyOfProject();
  expect(await outcome(start(process.execPath, [join(root, "server/build.mjs"), "--programs"]))).toMatchObject({
    status: 0,
  });
  const { version } = JSON.parse(readFileSync(join(root, "package.json"), "utf8"));
  const built = await outcome(start(process.execPath, [join(root, "dist/quenchline.mjs"), "--version"]));
  expect(built).toMatchObject({ status: 0, stdout: `${version}\n`, stderr: "" });
});
