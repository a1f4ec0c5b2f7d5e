import { lineCounts } from "#server/cli/proof-text.ts";
import { counted, sizeText } from "#server/cli/terminal.ts";
import type { Machine } from "#shared/formats/machine.ts";
import type { Profile } from "#shared/formats/profile.ts";
import type { ProofDocument } from "#shared/formats/proof.ts";
import type { Finding, Reading } from "#shared/layers/reading.ts";
import type { Tuning } from "#shared/rewrite/prepare-tuning.ts";
import { durationText } from "#shared/units/words.ts";

interface Tuned {
  machine: Machine;
  profile: Profile;
  reading: Reading;
  tuning: Tuning;
  proof: ProofDocument;
  /** where the tuned toolpath stands now */
  path: string;
}

const CAUTIONS = [
  "Trial only: nobody has approved this file. Predictions are estimates; confirm them by a trial print.",
  "Lamp, nozzle and bed burn and can start fires; the lamp stays hot after it is off.",
  "No line of this file runs when a print is cancelled, halted or loses power: an over-temperature cut-out that does",
  "not depend on G-code must switch the lamp off. Never leave a heater unattended without one.",
  "Keep the door closed, and speed and fan overrides at 100 %.",
];

/** What `tune` says once the tuned toolpath is written. */
export function tuningText({ machine, profile, reading, tuning, proof, path }: Tuned): string {
  const warnings = reading.findings.filter(({ severity }) => severity === "warning");
  const lines = [
    `${path}: ${sizeText(proof.output.bytes)}, SHA-256 ${proof.output.sha256}`,
    `Profile ${profile.name} on machine ${machine.name}, channels ${tuning.provenance.channels.join(", ")}`,
    "",
    `Layers  ${counted(reading.totals.layers, "layer")}, ${durationText(reading.totals.printTimeS)}`,
    `Lines   ${lineCounts(proof)}`,
    `Proof   passed, ${counted(proof.checks.length, "check")}`,
    ...section(
      "Advice",
      tuning.plan.advice.map(({ message }) => message),
    ),
    ...section("Findings", warnings.map(findingText)),
    ...section("Cautions", CAUTIONS),
  ];
  return `${lines.join("\n")}\n`;
}

function section(title: string, entries: readonly string[]): string[] {
  return entries.length === 0 ? [] : ["", title, ...entries.map((entry) => `  ${entry}`)];
}

function findingText({ line, message }: Finding): string {
  return line === undefined ? message : `line ${line}: ${message}`;
}
