import { contentOf } from "#shared/formats/document.ts";
import { type Machine, writeMachine } from "#shared/formats/machine.ts";
import { type Polymer, writePolymer } from "#shared/formats/polymer.ts";
import { holds, type Profile, writeProfile } from "#shared/formats/profile.ts";
import type { Check, ProofDocument } from "#shared/formats/proof.ts";
import type { Reading } from "#shared/layers/reading.ts";
import type { Plan } from "#shared/plan/plan.ts";
import { planDuties } from "#shared/plan/plan-duties.ts";
import { checkBytesKept, type FileDigest } from "#shared/prove/checks/bytes-kept.ts";
import { checkChangePerLayer } from "#shared/prove/checks/change-per-layer.ts";
import { checkHeaterBeforeFirstLayer } from "#shared/prove/checks/heater-before-first-layer.ts";
import { checkInsertedInside } from "#shared/prove/checks/inserted-inside.ts";
import { checkInsertedLegal } from "#shared/prove/checks/inserted-legal.ts";
import { checkLimits } from "#shared/prove/checks/limits.ts";
import { checkMotion } from "#shared/prove/checks/motion.ts";
import { checkNumbering } from "#shared/prove/checks/numbering.ts";
import { checkOffAtEnd } from "#shared/prove/checks/off-at-end.ts";
import { checkPausesIdle } from "#shared/prove/checks/pauses-idle.ts";
import { checkPlan } from "#shared/prove/checks/plan.ts";
import { checkProvenance, type Documents, type Expected } from "#shared/prove/checks/provenance.ts";
import { checkRate } from "#shared/prove/checks/rate.ts";
import { checkReadersAgree } from "#shared/prove/checks/readers-agree.ts";
import { checkRemovedOnlyDriven } from "#shared/prove/checks/removed-only-driven.ts";
import { checkSeal } from "#shared/prove/checks/seal.ts";
import { checkWithinLayer } from "#shared/prove/checks/within-layer.ts";
import { compareStreams } from "#shared/prove/compare-streams.ts";
import { Evidence } from "#shared/prove/evidence.ts";
import { Refusal } from "#shared/refusal.ts";

export interface ProveInput {
  /** the bytes of both files, in chunks cut anywhere; each is read once, to its end */
  original: AsyncIterable<Uint8Array>;
  tuned: AsyncIterable<Uint8Array>;
  /** of the original */
  reading: Reading;
  machine: Machine;
  /** with it, the tuned file is also held against the plan */
  profile?: Profile;
  /** card that duties were solved with: a profile that holds is held against its plan only with it */
  polymer?: Polymer;
  /** hex SHA-256 of a text */
  digest: (text: string) => string;
  /** size and SHA-256 of both files; asked for once both have been read to their ends */
  hashes: () => { input: FileDigest; output: FileDigest };
  /** version of the engine that makes the proof */
  engine: string;
  /** what the provenance line has to say besides, where the caller knows it */
  expected?: Expected;
}

/**
 * Proves that a tuned file is its original but for what it may differ in. This is a second reader of both files: it
 * shares no code with the one that wrote the tuned file beyond the byte reader, and finds every line of ours, every
 * command of an output and every pause by itself.
 *
 * A proof that fails says why; only unreadable input is an error.
 */
export async function prove(input: ProveInput): Promise<ProofDocument> {
  const { reading, machine, profile, polymer, digest } = input;
  const comparison = await compareStreams(input);
  const evidence = new Evidence(reading, machine, profile, comparison);
  const hashes = input.hashes();
  const documents: Documents = {
    profile: profile ? { name: profile.name, sha256: digest(writeProfile(contentOf(profile))) } : null,
    machine: { name: machine.name, sha256: digest(writeMachine(contentOf(machine))) },
  };
  const card = polymer && { name: polymer.name, sha256: digest(writePolymer(contentOf(polymer))) };
  const first = checkBytesKept(evidence, hashes.input);
  const checks = [first, ...(comparison.difference ? [] : checksOf(evidence, { ...documents, polymer: card }, input))];
  if (!comparison.difference) checks.push(checkMotion(evidence, checks));
  return {
    format: "quenchline.proof/1",
    passed: checks.every(({ passed }) => passed),
    ...hashes,
    kept: { lines: comparison.kept },
    removed: { lines: comparison.removed },
    inserted: { lines: comparison.inserted },
    renumbered: { lines: comparison.renumbered },
    checks,
    engine: input.engine,
    ...documents,
  };
}

/** Where the files part, nothing behind that place was looked at and no other check can be made. */
function checksOf(
  evidence: Evidence,
  documents: Documents,
  { profile, polymer, digest, expected = {} }: ProveInput,
): Check[] {
  const plan = profile && (polymer || !holds(profile)) ? planAfresh(evidence, profile, polymer) : undefined;
  return [
    checkReadersAgree(evidence),
    checkRemovedOnlyDriven(evidence),
    checkInsertedLegal(evidence),
    checkInsertedInside(evidence),
    checkProvenance(evidence, documents, expected),
    checkSeal(evidence, digest),
    checkWithinLayer(evidence),
    checkLimits(evidence),
    ...(plan === undefined ? [] : [checkChangePerLayer(evidence, plan)]),
    checkRate(evidence),
    checkHeaterBeforeFirstLayer(evidence),
    checkPausesIdle(evidence),
    checkOffAtEnd(evidence),
    ...(profile === undefined || plan === undefined ? [] : [checkPlan(evidence, profile, plan)]),
    ...(evidence.reading.file.numbered ? [checkNumbering(evidence)] : []),
  ];
}

/** The plan, or why there is none. */
function planAfresh({ reading, machine }: Evidence, profile: Profile, polymer?: Polymer): Plan | string {
  try {
    return planDuties({ layers: reading.layers, machine, profile, polymer });
  } catch (error) {
    if (error instanceof Refusal) return `No plan can be made: ${error.message}`;
    throw error;
  }
}
