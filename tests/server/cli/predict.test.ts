import { describe, expect, test } from "vitest";
import { parsePrediction } from "#shared/formats/prediction.ts";
import { quenchline, SEAL_RING, SEAL_RING_PROFILE, sample, smallPart, TERN } from "#tests/server/cli/command-line.ts";

const PEEK = sample("polymers/peek.json");
const ON_TERN = ["--machine", TERN, "--profile", SEAL_RING_PROFILE, "--polymer", PEEK];

test("--json puts one prediction document on standard output and nothing else", async () => {
  const { status, stdout, stderr } = await quenchline(["predict", SEAL_RING, ...ON_TERN, "--json"]);
  expect(stderr).toBe("");
  expect(status).toBe(0);
  const prediction = parsePrediction(JSON.parse(stdout));
  expect(prediction.calibration).toBe("uncalibrated");
  expect(prediction.layers).toHaveLength(45);
  // The base is to be stiff, the lip tough: the lamp is what switches between them.
  expect(prediction.layers[9].verdicts.state).toBe("semi-crystalline");
  expect(prediction.layers[40].verdicts).toMatchObject({ state: "amorphous", reaches: "yes" });
  expect(prediction.layers[9].interlayerC).toBeGreaterThan(prediction.layers[40].interlayerC + 40);
});

test("the table has a row for every layer, units in its head, and at most 120 columns; what is assumed is listed", async () => {
  const profile = sample("profiles/sensor-cap-clear-dome.json");
  const documents = ["--machine", sample("machines/fulmar.json"), "--profile", profile];
  const call = ["predict", sample("sensor-cap.gcode"), ...documents, "--polymer", sample("polymers/pekk-60-40.json")];
  const { status, stdout } = await quenchline(call);
  expect(status).toBe(0);
  const lines = stdout.split("\n");
  const head = lines.findIndex((line) => line.startsWith("layer"));
  expect(lines[head]).toMatch(/part-cooling +halogen +temp\. +low +high +contact +solid/);
  const rows = lines.slice(head, head + 244);
  for (const row of rows) expect(row.length).toBeLessThanOrEqual(120);
  expect(rows[243]).toMatch(/^ +242 /);
  expect(stdout).toContain("Uncalibrated");
  expect(stdout).toContain("thermal.convection.h0WM2K 15 (10 to 20)");
  expect(stdout).toContain("never a certificate");
});

describe("refused is", () => {
  test("a call without the polymer's card: none is looked for", async () => {
    const call = ["predict", "-", "--machine", TERN, "--profile", SEAL_RING_PROFILE];
    const { status, stdout, stderr } = await quenchline([...call, "--json"], { input: smallPart() });
    expect(status).toBe(3);
    expect(stderr).toContain("PEEK");
    expect(stderr).toContain("--polymer");
    expect(JSON.parse(stdout)).toMatchObject({ code: "polymer-missing" });
  });

  test("a card of another polymer", async () => {
    const call = ["predict", SEAL_RING, "--machine", TERN, "--profile", SEAL_RING_PROFILE];
    const { status, stderr } = await quenchline([...call, "--polymer", sample("polymers/pps.json")]);
    expect(status).toBe(3);
    expect(stderr).toContain("PPS");
  });
});
