import { describe, expect, test } from "vitest";
import { quenchline, SEAL_RING, TERN } from "#tests/server/cli/command-line.ts";

test("--help names every command, an example and the exit statuses, on standard output alone", async () => {
  const { status, stdout, stderr } = await quenchline(["--help"]);
  expect(status).toBe(0);
  expect(stderr).toBe("");
  for (const word of ["read", "tune", "predict", "prove", "samples/seal-ring.gcode", "Exit status"])
    expect(stdout).toContain(word);
});

test.each(["read", "tune", "predict", "prove"])(
  "%s --help shows its usage, an example and every option",
  async (command) => {
    const { status, stdout, stderr } = await quenchline([command, "--help"]);
    expect(status).toBe(0);
    expect(stderr).toBe("");
    expect(stdout).toMatch(new RegExp(`^Usage\\n  npm run -s quenchline -- ${command} `));
    expect(stdout).toContain("Example");
    const [usage] = stdout.split("\n\n");
    for (const option of usage.match(/--[a-z-]+(?= )/g) ?? []) expect(stdout.split("Options")[1]).toContain(option);
    for (const line of stdout.split("\n")) expect(line.length).toBeLessThanOrEqual(120);
  },
);

describe("a wrong call ends with status 2 and says what is wrong, with the usage", () => {
  test.each([
    [[], "COMMAND is missing"],
    [["melt"], 'there is no command "melt"'],
    [["--machine", TERN, "read"], "the command comes first"],
    [["predict", SEAL_RING, "--machine", TERN], "--profile is missing"],
    [["read", "--machine", TERN], "FILE is missing"],
    [["read", SEAL_RING], "--machine is missing"],
    [["read", SEAL_RING, "more.gcode", "--machine", TERN], '"more.gcode" is one file too many'],
    [["read", SEAL_RING, "--machine"], "--machine"],
    [["read", SEAL_RING, "--machine", TERN, "--jsn"], "Unknown option '--jsn'"],
    [["read", SEAL_RING, "--machine", ""], "--machine needs the name of a file"],
    [["tune", SEAL_RING, "--machine", TERN, "--out", "x"], "--profile is missing"],
    [["prove", SEAL_RING, "--machine", TERN], "TUNED is missing"],
    [["prove", "-", "-", "--machine", TERN], "only one of ORIGINAL and TUNED"],
  ])("%j", async (argv, message) => {
    const { status, stdout, stderr } = await quenchline(argv);
    expect(status).toBe(2);
    expect(stdout).toBe("");
    expect(stderr).toContain(message);
    expect(stderr).toContain("usage: npm run -s quenchline -- ");
  });

  test("where npm has taken an option for itself, the two dashes are named", async () => {
    const { status, stderr } = await quenchline(["read", SEAL_RING], { env: { npm_config_machine: TERN } });
    expect(status).toBe(2);
    expect(stderr).toContain("put -- before the command");
  });
});
