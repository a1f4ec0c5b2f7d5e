import { parseArguments, required } from "#server/cli/arguments.ts";
import { type TuneTargets, tuneTargets } from "#server/cli/commands/tune-targets.ts";
import { documentDigest, loadMachine, loadProfile } from "#server/cli/documents.ts";
import { aboutFile, EXIT, type ExitStatus, InputRefused } from "#server/cli/exit.ts";
import { ToolpathInput } from "#server/cli/input-stream.ts";
import { cardFor, type FoundCard } from "#server/cli/polymer-card.ts";
import { failedChecks } from "#server/cli/proof-text.ts";
import { proveInputs } from "#server/cli/prove-inputs.ts";
import { readInput } from "#server/cli/read-input.ts";
import type { Target } from "#server/cli/targets.ts";
import { TemporaryFile } from "#server/cli/temporary-file.ts";
import { complain, print, printable } from "#server/cli/terminal.ts";
import { tuningText } from "#server/cli/tuning-text.ts";
import { version } from "#server/cli/version.ts";
import { writeTuned } from "#server/cli/write-tuned.ts";
import { checkFit } from "#shared/formats/fit.ts";
import type { Machine } from "#shared/formats/machine.ts";
import { writePlan } from "#shared/formats/plan.ts";
import type { Polymer } from "#shared/formats/polymer.ts";
import { holds, type Profile } from "#shared/formats/profile.ts";
import { type ProofDocument, writeProof } from "#shared/formats/proof.ts";
import type { Reading } from "#shared/layers/reading.ts";
import { Refusal } from "#shared/refusal.ts";
import { prepareTuning, type Tuning } from "#shared/rewrite/prepare-tuning.ts";

/** Approval is for the team's own server to give. */
const STATUS = "trial-only" as const;

interface Documents {
  machine: Machine;
  profile: Profile;
  polymer?: Polymer;
  /** what has to be said of a card that nobody chose */
  notice?: string;
  /** as the caller named it: most refusals of a tuning point into it */
  profileName: string;
}

/** `tune`: writes the tuned toolpath, and puts it under its name only once the proof has passed. */
export async function tune(argv: string[]): Promise<ExitStatus> {
  const { files, values } = parseArguments("tune", argv, ["FILE"]);
  const machineName = required(values.machine, "machine", "tune");
  const profileName = required(values.profile, "profile", "tune");
  const targets = tuneTargets(files[0], values);
  const documents = await loadDocuments(machineName, profileName, values.polymer);
  const input = await ToolpathInput.open(files[0], "several times");
  const temporary: TemporaryFile[] = [];
  try {
    return await tuneInput(input, documents, targets, values["in-place"] === true, temporary);
  } finally {
    await input.close();
    for (const file of temporary) await file.discard();
  }
}

async function tuneInput(
  input: ToolpathInput,
  documents: Documents,
  targets: TuneTargets,
  inPlace: boolean,
  temporary: TemporaryFile[],
): Promise<ExitStatus> {
  const begin = async ({ path, mode }: Target): Promise<TemporaryFile> => {
    const file = await TemporaryFile.create(path, mode);
    temporary.push(file);
    return file;
  };
  const beside = async (target: Target | undefined, text: () => string): Promise<TemporaryFile[]> => {
    if (!target) return [];
    const file = await begin(target);
    file.write(Buffer.from(text()));
    await file.finish();
    return [file];
  };

  const reading = await readInput(input, documents.machine);
  const tuning = await prepare(input.name, reading, documents);
  const out = await begin(targets.out);
  const packed = inPlace ? await input.isPacked() : /\.gz$/i.test(targets.out.path);
  await writeTuned(input, tuning.edits, reading.file, out, packed);
  const proof = await proveWritten(input, out, reading, documents);
  const proofFile = await beside(targets.proof, () => writeProof(proof));
  if (!proof.passed) {
    for (const file of proofFile) file.place();
    complain(`quenchline: the proof failed, so nothing was written under ${targets.out.path}\n${failedChecks(proof)}`);
    return EXIT.proofFailed;
  }
  const planFile = await beside(targets.plan, () => writePlan(tuning.plan));
  await input.close();
  // The toolpath comes last: whoever finds it finds its plan and proof, too.
  for (const file of [...planFile, ...proofFile, out]) file.place();
  await print(printable(tuningText({ ...documents, reading, tuning, proof, path: targets.out.path })));
  return EXIT.done;
}

async function loadDocuments(machineName: string, profileName: string, polymerName?: string): Promise<Documents> {
  const machine = await loadMachine(machineName);
  const profile = await loadProfile(profileName);
  // Duties that are not solved don't depend on a card, so none is looked for.
  const { polymer, notice }: Partial<FoundCard> =
    polymerName !== undefined || holds(profile) ? await cardFor(profile, profileName, polymerName) : {};
  // Before the toolpath is read, which may take a while.
  await aboutFile(profileName, () => checkFit(machine, profile, polymer));
  return { machine, profile, polymer, notice, profileName };
}

async function prepare(
  fileName: string,
  reading: Reading,
  { profileName, notice, ...documents }: Documents,
): Promise<Tuning> {
  try {
    const tuning = prepareTuning({ ...documents, reading, digest: documentDigest, engine: version, status: STATUS });
    if (notice !== undefined) tuning.plan.advice.unshift({ layer: 1, code: "card-shipped", message: notice });
    return tuning;
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    throw new InputRefused(error, error.place.path === undefined ? fileName : profileName);
  }
}

async function proveWritten(
  input: ToolpathInput,
  out: TemporaryFile,
  reading: Reading,
  { machine, profile, polymer }: Documents,
): Promise<ProofDocument> {
  const tuned = await ToolpathInput.open(out.path, "several times");
  try {
    const expected = { engine: version, status: STATUS };
    return await proveInputs({ original: input, tuned, reading, machine, profile, polymer, expected });
  } finally {
    await tuned.close();
  }
}
