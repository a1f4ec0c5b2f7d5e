import { holds, type Profile } from "#shared/formats/profile.ts";
import type { Check, ProofDocument } from "#shared/formats/proof.ts";
import { verdict } from "#shared/prove/checks/verdict.ts";
import type { Evidence } from "#shared/prove/evidence.ts";
import type { ProvenanceFacts } from "#shared/prove/provenance.ts";
import { listed } from "#shared/prove/wording.ts";

/** What the caller knows of the tuning and the provenance line has to say too; what is left out is not compared. */
export interface Expected {
  engine?: string;
  status?: ProvenanceFacts["status"];
}

/** The documents that the proof is made with, as it names them. */
export type Documents = Pick<ProofDocument, "machine" | "profile"> & { polymer?: ProofDocument["machine"] };

/** Exactly one provenance line, directly where the first layer begins, and everything it says is so. */
export function checkProvenance(evidence: Evidence, documents: Documents, expected: Expected): Check {
  const { facts } = evidence.provenance;
  const found =
    facts &&
    `One line, where the first layer begins: profile "${facts.profile.name}", machine "${facts.machine.name}", ${facts.status}, engine ${facts.engine}.`;
  return verdict(
    "provenance",
    lineProblem(evidence) ?? (facts && (factsProblem(evidence, facts, documents) ?? expectedProblem(facts, expected))),
    found ?? "",
  );
}

function lineProblem({ provenance, comparison, reading }: Evidence): string | undefined {
  const { entries, problem } = provenance;
  if (entries.length !== 1) return `The tuned file has ${entries.length || "no"} provenance lines; it has to have one.`;
  const [line] = entries;
  const { offset } = reading.window.start;
  const firstOwn = comparison.entries.find(({ what }) => what === "provenance" || what === "own");
  if (firstOwn !== line) return `Line ${firstOwn?.tunedLine} of the tuned file stands before the provenance line.`;
  if (line.from > offset || line.to < offset)
    return `The provenance line is line ${line.tunedLine} of the tuned file, not where the first layer begins.`;
  if (line.oddEnd) return "The provenance line does not end as the lines of the file do.";
  return problem && `The provenance line ${problem}.`;
}

function factsProblem(evidence: Evidence, facts: ProvenanceFacts, documents: Documents): string | undefined {
  const { profile, reading, own } = evidence;
  const driven = evidence.channels().map(({ channel }) => channel.id);
  const another =
    anotherProblem("machine", facts.machine, documents.machine) ??
    (documents.profile === null ? undefined : anotherProblem("profile", facts.profile, documents.profile)) ??
    polymerProblem(facts, profile, documents.polymer);
  if (another !== undefined) return another;
  const version =
    versionProblem("machine", facts.machine, evidence.machine) ??
    (profile && versionProblem("profile", facts.profile, profile));
  if (version !== undefined) return version;
  if (profile && facts.withinLayer !== profile.withinLayer)
    return `The provenance line says "${facts.withinLayer}", the profile "${profile.withinLayer}".`;
  if (facts.channels.join() !== driven.join())
    return `The provenance line names ${listed(facts.channels) || "no channel"}, but ${listed(driven) || "none"} of the machine can be driven.`;
  if (facts.lines !== own.length)
    return `The provenance line counts ${facts.lines} commands of ours, the tuned file has ${own.length}.`;
  const original = untunedDigest(reading);
  return facts.original === original ? undefined : "The provenance line names another untuned file than this original.";
}

/** Solved duties come from a card, and the line names it; others don't. */
function polymerProblem(
  { polymer }: ProvenanceFacts,
  profile: Profile | undefined,
  given: Documents["polymer"],
): string | undefined {
  if (profile && holds(profile) !== (polymer !== undefined))
    return `The provenance line names ${polymer ? `the polymer card "${polymer.name}", and no rule of the profile holds` : "no polymer card, and a rule of the profile holds"}.`;
  return polymer && given && anotherProblem("polymer card", polymer, given);
}

function anotherProblem(
  kind: "machine" | "profile" | "polymer card",
  named: Documents["machine"],
  given: Documents["machine"],
): string | undefined {
  if (named.name !== given.name)
    return `The tuned file was made with the ${kind} "${named.name}", not "${given.name}".`;
  return named.sha256 === given.sha256
    ? undefined
    : `The tuned file was made with a ${kind} "${named.name}" that says something else.`;
}

/** A document without a version says nothing of the tuned file's; with one it is the one that the file was made with. */
function versionProblem(
  kind: "machine" | "profile",
  { name, version }: ProvenanceFacts["machine"],
  given: { version?: number },
): string | undefined {
  if (given.version === undefined || given.version === version) return undefined;
  const said = version === undefined ? "does not say which version" : `names version ${version}`;
  return `The provenance line ${said} of the ${kind} "${name}", and the document given is version ${given.version}.`;
}

/** The original's own digest, or, where it was tuned before, that of the file it came from. */
function untunedDigest({ provenance, file }: Evidence["reading"]): unknown {
  if (!provenance) return file.sha256;
  const { data } = provenance;
  return typeof data === "object" && data !== null && "original" in data ? data.original : undefined;
}

function expectedProblem(facts: ProvenanceFacts, { engine, status }: Expected): string | undefined {
  if (engine !== undefined && facts.engine !== engine)
    return `The provenance line names engine ${facts.engine}, not ${engine}.`;
  if (status !== undefined && facts.status !== status)
    return `The provenance line says ${facts.status}, not ${status}.`;
  return undefined;
}
