import type { ProofDocument } from "#shared/formats/proof.ts";

type Check = ProofDocument["checks"][number];

/** What each check says where it holds. */
export const CHECK_NAMES: Record<string, string> = {
  "bytes-kept": "Every other byte is the original's",
  "removed-only-driven": "Only commands of driven channels are taken out",
  "inserted-legal": "Every line put in drives a channel",
  "inserted-inside": "Lines stand between first and last layer",
  numbering: "Line numbers and checksums are right",
  motion: "Motion and print time are the same",
  "readers-agree": "Both readers see the same file",
  limits: "Duties are within the limits",
  rate: "No change a second is too large",
  "change-per-layer": "No change from layer to layer is too large",
  "within-layer": "Commands inside layers are as chosen",
  "heater-before-first-layer": "Heaters are off before the first layer",
  "pauses-idle": "Heaters idle in every pause",
  "off-at-end": "Heaters are off at the end",
  plan: "The duties are those of the plan",
  provenance: "It says what it was made from",
  seal: "The seal is whole",
};

const GROUPS: { title: string; ids: readonly string[] }[] = [
  {
    title: "Bytes",
    ids: [
      "bytes-kept",
      "removed-only-driven",
      "inserted-legal",
      "inserted-inside",
      "numbering",
      "motion",
      "readers-agree",
    ],
  },
  { title: "Duties", ids: ["limits", "rate", "change-per-layer", "within-layer"] },
  { title: "Heaters", ids: ["heater-before-first-layer", "pauses-idle", "off-at-end"] },
  { title: "Plan and origin", ids: ["plan", "provenance", "seal"] },
];

/** Checks by what they are about; those of a kind this page does not know stand last. */
export function checkGroups(checks: readonly Check[]): { title: string; checks: Check[] }[] {
  const known = new Set(GROUPS.flatMap(({ ids }) => ids));
  return [
    ...GROUPS.map(({ title, ids }) => ({ title, checks: checks.filter(({ id }) => ids.includes(id)) })),
    { title: "Others", checks: checks.filter(({ id }) => !known.has(id)) },
  ].filter((group) => group.checks.length > 0);
}
