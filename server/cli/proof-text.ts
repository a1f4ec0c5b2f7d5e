import { counted } from "#server/cli/terminal.ts";
import type { Check, ProofDocument } from "#shared/formats/proof.ts";
import { countText } from "#shared/units/words.ts";

/** What `prove` shows people: every check, and how the lines were counted. */
export function proofText(originalName: string, tunedName: string, proof: ProofDocument): string {
  const { passed, checks, machine, profile } = proof;
  const documents = `machine ${machine.name}${profile ? `, profile ${profile.name}` : ", without a profile"}`;
  const lines = [
    `${tunedName} against ${originalName}; ${documents}`,
    "",
    ...checkLines(checks),
    "",
    `Lines  ${lineCounts(proof)}`,
    passed ? `Proof passed: ${counted(checks.length, "check")}.` : `${failure(checks)} Do not print this file.`,
  ];
  return `${lines.join("\n")}\n`;
}

/** The checks that failed, for standard error. */
export function failedChecks({ checks }: ProofDocument): string {
  return `${checkLines(checks.filter(({ passed }) => !passed)).join("\n")}\n${failure(checks)}\n`;
}

/** `17 520 kept, 2 taken out, 101 put in` */
export function lineCounts({ kept, removed, inserted, renumbered }: ProofDocument): string {
  const number = ({ lines }: { lines: number }) => countText(lines);
  const again = renumbered.lines === 0 ? "" : `, ${number(renumbered)} renumbered`;
  return `${number(kept)} kept, ${number(removed)} taken out, ${number(inserted)} put in${again}`;
}

function checkLines(checks: readonly Check[]): string[] {
  const width = Math.max(0, ...checks.map(({ id }) => id.length));
  return checks.map(
    ({ id, passed, detail }) => `  ${passed ? "passed" : "FAILED"}  ${id.padEnd(width)}  ${oneLine(detail)}`,
  );
}

/** A detail may quote the file. */
function oneLine(text: string): string {
  return text.replace(/[\r\n]+/g, " ");
}

function failure(checks: readonly Check[]): string {
  const failed = checks.filter(({ passed }) => !passed).length;
  return `Proof failed: ${failed} of ${counted(checks.length, "check")}.`;
}
