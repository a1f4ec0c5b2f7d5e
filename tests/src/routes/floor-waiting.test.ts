import { expect, test } from "vitest";
import { may, type Role } from "#shared/contract/roles.ts";
import { nextStep, waitingItems } from "#src/routes/floor-waiting.ts";

const reading = {
  id: "r1",
  toolpathId: "t1",
  machineId: "m",
  machineVersion: 1,
  machineName: "Tern",
  jobId: "j",
  createdAt: "",
};
const toolpath = (state: "done" | "refused" | "running", more: object = {}) => ({
  id: "t1",
  name: "part.gcode",
  sha256: "",
  bytes: 1,
  createdAt: "",
  createdBy: "",
  readings: [{ ...reading, state, ...more }],
});
const tuning = (state: "done" | "refused" | "running", acknowledged: boolean) => ({
  id: "u1",
  readingId: "r1",
  toolpathId: "t1",
  toolpathName: "part.gcode",
  machineId: "m",
  machineVersion: 1,
  machineName: "Tern",
  profileId: "p",
  profileVersion: 1,
  profileName: "Profile",
  status: "approved" as const,
  state,
  jobId: "j",
  createdAt: "",
  createdBy: "",
  original: { sha256: "", bytes: 1 },
  fileName: "part.tuned.gcode",
  acknowledged,
});
const profile = (approved: number[]) => ({
  id: "p",
  name: "Profile",
  versions: 2,
  latest: { number: 2, createdAt: "", createdBy: "engineer@alderbay.example" },
  approved,
});
const as = (role: Role) => ({ may: (permission: Parameters<typeof may>[1]) => may(role, permission) });
const acts = (sources: Parameters<typeof waitingItems>[0]) => waitingItems(sources).map(({ act }) => act);

test("a toolpath that was read waits to be tuned, until it is", () => {
  expect(acts({ toolpaths: [toolpath("done")], tunings: [], ...as("operator") })).toEqual(["Tune"]);
  expect(acts({ toolpaths: [toolpath("done")], tunings: [tuning("done", true)], ...as("operator") })).toEqual([]);
  expect(acts({ toolpaths: [toolpath("running")], ...as("operator") })).toEqual([]);
});

test("a refusal waits with its reason", () => {
  const refusal = { code: "no-extrusion", message: "nothing is extruded", remedy: "Slice again.", place: {} };
  const [item] = waitingItems({ toolpaths: [toolpath("refused", { refusal })], ...as("operator") });
  expect(item.why).toContain("nothing is extruded");
});

test("a written file waits for the checklist of who looks", () => {
  expect(acts({ tunings: [tuning("done", false)], ...as("operator") })).toEqual(["Checklist"]);
  expect(acts({ tunings: [tuning("done", true)], ...as("operator") })).toEqual([]);
});

test("only the lead is asked to approve, and only the latest version", () => {
  expect(acts({ profiles: [profile([1])], ...as("lead") })).toEqual(["Review"]);
  expect(acts({ profiles: [profile([1, 2])], ...as("lead") })).toEqual([]);
  expect(acts({ profiles: [profile([])], ...as("engineer") })).toEqual([]);
});

test("nothing waits for a viewer", () => {
  const sources = { toolpaths: [toolpath("done")], tunings: [tuning("refused", false)], profiles: [profile([])] };
  expect(acts({ ...sources, ...as("viewer") })).toEqual([]);
});

test("the next step of a toolpath is to tune it, for who may, or to see why it was not read", () => {
  const step = (state: "done" | "refused" | "running", role: Role) => nextStep(toolpath(state), as(role).may)?.act;
  expect(step("done", "operator")).toBe("Tune");
  expect(step("done", "viewer")).toBeUndefined();
  expect(step("running", "operator")).toBeUndefined();
  expect(step("refused", "viewer")).toBe("See why");
});

test("a written file is told apart from another of the same toolpath by its profile and version", () => {
  const [item] = waitingItems({ tunings: [tuning("done", false)], ...as("operator") });
  expect(item.why).toContain("with Profile, version 1");
});
