import { readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import { parsePrediction } from "#shared/formats/prediction.ts";
import {
  quenchline,
  SEAL_RING,
  SEAL_RING_PROFILE,
  sample,
  scratchFolder,
  smallPart,
  TERN,
} from "#tests/server/cli/command-line.ts";

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

test("without a card the one that comes with Quenchline is taken, and that is told", async () => {
  const call = ["predict", SEAL_RING, "--machine", TERN, "--profile", SEAL_RING_PROFILE, "--json"];
  const given = await quenchline([...call, "--polymer", sample("polymers/peek.json")]);
  const { status, stdout } = await quenchline(call);
  expect(status).toBe(0);
  const { advice, ...prediction } = JSON.parse(stdout);
  const { advice: ownAdvice, ...expected } = JSON.parse(given.stdout);
  expect(prediction).toEqual(expected);
  expect(advice).toEqual([
    { layer: 1, code: "card-shipped", message: expect.stringContaining("peek.json") },
    ...ownAdvice,
  ]);
});

describe("refused is", () => {
  test("a polymer of which no card is given and none comes with Quenchline", async () => {
    const profile = { ...JSON.parse(readFileSync(SEAL_RING_PROFILE, "utf8")), polymer: "Buoy resin 7" };
    const path = join(scratchFolder(), "profile.json");
    writeFileSync(path, JSON.stringify(profile));
    const call = ["predict", "-", "--machine", TERN, "--profile", path];
    const { status, stdout, stderr } = await quenchline([...call, "--json"], { input: smallPart() });
    expect(status).toBe(3);
    expect(stderr).toContain("Buoy resin 7");
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
