import { parseArguments, required } from "#server/cli/arguments.ts";
import { loadMachine, loadPolymer, loadProfile } from "#server/cli/documents.ts";
import { aboutFile, EXIT, type ExitStatus, UsageError } from "#server/cli/exit.ts";
import { ToolpathInput } from "#server/cli/input-stream.ts";
import { failedChecks, proofText } from "#server/cli/proof-text.ts";
import { proveInputs } from "#server/cli/prove-inputs.ts";
import { readInput } from "#server/cli/read-input.ts";
import { complain, print, printable } from "#server/cli/terminal.ts";
import { checkFit } from "#shared/formats/fit.ts";
import { writeProof } from "#shared/formats/proof.ts";

/** `prove`: compares a tuned toolpath with its original. */
export async function prove(argv: string[]): Promise<ExitStatus> {
  const { files, values } = parseArguments("prove", argv, ["ORIGINAL", "TUNED"]);
  const [originalName, tunedName] = files;
  if (originalName === "-" && tunedName === "-")
    throw new UsageError("only one of ORIGINAL and TUNED can be standard input", "prove");
  const machine = await loadMachine(required(values.machine, "machine", "prove"));
  const { profile: profileName } = values;
  const profile = profileName === undefined ? undefined : await loadProfile(profileName);
  const polymer = values.polymer === undefined ? undefined : await loadPolymer(values.polymer);
  if (profile) await aboutFile(profileName as string, () => checkFit(machine, profile, polymer));
  const original = await ToolpathInput.open(originalName, "several times");
  try {
    const tuned = await ToolpathInput.open(tunedName, "several times");
    try {
      const reading = await readInput(original, machine);
      const proof = await proveInputs({ original, tuned, reading, machine, profile, polymer });
      await print(values.json ? writeProof(proof) : printable(proofText(originalName, tunedName, proof)));
      if (proof.passed) return EXIT.done;
      if (values.json) complain(failedChecks(proof));
      return EXIT.proofFailed;
    } finally {
      await tuned.close();
    }
  } finally {
    await original.close();
  }
}
