import { contentOf } from "#shared/formats/document.ts";
import { checkFit } from "#shared/formats/fit.ts";
import { type Machine, writeMachine } from "#shared/formats/machine.ts";
import { type Polymer, writePolymer } from "#shared/formats/polymer.ts";
import { holds, type Profile, writeProfile } from "#shared/formats/profile.ts";
import { OWN_TAGS } from "#shared/gcode/own-lines.ts";
import { writeDuty } from "#shared/gcode/write-command.ts";
import type { ControlLine, Reading } from "#shared/layers/reading.ts";
import { drivenChannels } from "#shared/plan/driven-channels.ts";
import type { Advice, Plan } from "#shared/plan/plan.ts";
import { planDuties } from "#shared/plan/plan-duties.ts";
import { Boundaries } from "#shared/rewrite/boundaries.ts";
import { type Edit, EditList } from "#shared/rewrite/edits.ts";
import {
  type Digest,
  type Named,
  type Provenance,
  provenanceLine,
  provenanceText,
  untunedDigest,
} from "#shared/rewrite/provenance.ts";
import { keepRaises } from "#shared/rewrite/raises.ts";
import { refuseUnsafe } from "#shared/rewrite/refuse-unsafe.ts";
import { scheduleChannel } from "#shared/rewrite/schedule.ts";
import type { Write } from "#shared/rewrite/write.ts";

export interface TuningInput {
  reading: Reading;
  machine: Machine;
  profile: Profile;
  polymer?: Polymer;
  digest: Digest;
  /** version of the engine, as it goes into the provenance line */
  engine: string;
  status: Provenance["status"];
}

export interface Tuning {
  plan: Plan;
  /** ascending by offset, not overlapping */
  edits: Edit[];
  provenance: Provenance;
}

/**
 * Everything about a tuning that is decided before a byte is written: the plan, and the edits that carry it into the
 * file. Applying the edits (Rewriter) is the second pass.
 *
 * @throws Refusal when profile, machine and polymer don't fit, or when the file can't be tuned safely
 */
export function prepareTuning({ reading, machine, profile, polymer, ...about }: TuningInput): Tuning {
  checkFit(machine, profile, polymer);
  const driven = drivenChannels(machine, profile);
  const documents = {
    profile: named(profile, writeProfile(contentOf(profile)), about.digest),
    machine: named(machine, writeMachine(contentOf(machine)), about.digest),
  };
  const original = untunedDigest(reading, driven, { ...documents, withinLayer: profile.withinLayer });
  const advice: Advice[] = [];
  refuseUnsafe(reading, machine, driven, advice);
  const plan = planDuties({ layers: reading.layers, machine, profile, polymer });
  const channels = new Set(driven.map((channel) => machine.channels.indexOf(channel)));
  const removable = reading.controls.filter(
    (line) => line.does === "duty" && (line.ours || (channels.has(line.channel) && isInside(line))),
  );
  const boundaries = new Boundaries(reading, removable);
  const kept = new Set<ControlLine>();
  const commands = driven.flatMap((channel) => {
    const input = { reading, boundaries, machine, profile, plan };
    const planned = scheduleChannel(channel, input, advice);
    const keeps = channel.kind === "fan" && profile.withinLayer === "keep-raises";
    const raises = keeps ? keepRaises(channel, input, planned) : undefined;
    for (const line of raises?.kept ?? []) kept.add(line);
    return (raises?.writes ?? planned).map((write) => ({ ...write, text: writeDuty(channel.drive, write.duty) }));
  });
  // At one place the plan's come first: what raises a fan stands where the file's own line stood.
  commands.sort((a, b) => a.offset - b.offset || Number(a.tag !== "plan") - Number(b.tag !== "plan"));
  if (kept.size > 0)
    advice.push({
      layer: 1,
      code: "raises-kept",
      message: `${kept.size} raises of the fan inside layers are kept as the file has them.`,
    });

  const removed = removable.filter((line) => !kept.has(line));
  const provenance: Provenance = {
    v: 1,
    ...documents,
    // Only duties that were solved depend on the card.
    ...(polymer && holds(profile) ? { polymer: named(polymer, writePolymer(contentOf(polymer)), about.digest) } : {}),
    original,
    engine: about.engine,
    status: about.status,
    channels: driven.map(({ id }) => id),
    withinLayer: profile.withinLayer,
    lines: commands.length,
    seal: "",
  };
  provenance.seal = about.digest(`${provenanceText(provenance)}\n${sealText(reading, commands, removed, kept)}`);
  plan.advice = [...plan.advice, ...advice].sort((a, b) => a.layer - b.layer);
  return { plan, edits: layEdits(reading, commands, removed, provenance), provenance };
}

type Command = Write & { text: string };

const isInside = ({ layer }: ControlLine): boolean => layer >= 1 && layer < Number.POSITIVE_INFINITY;

const named = ({ name, version }: Pick<Named, "name" | "version">, content: string, digest: Digest): Named => ({
  name,
  sha256: digest(content),
  ...(version === undefined ? {} : { version }),
});

/**
 * What is sealed beside the provenance line itself: every command of ours and every kept raise, each with the number of the
 * file's own lines before it. Any change to one of them, or to its place, shows.
 */
function sealText(
  reading: Reading,
  commands: readonly Command[],
  removed: readonly ControlLine[],
  kept: ReadonlySet<ControlLine>,
): string {
  const goneLines = removed.map(({ line }) => line);
  if (reading.provenance) goneLines.push(reading.provenance.line);
  goneLines.sort((a, b) => a - b);
  const entries = [
    ...commands.map(({ offset, line, tag, text }) => ({ offset, line, entry: `${tag} ${text}` })),
    ...[...kept].map(({ offset, line, code }) => ({ offset, line, entry: `kept ${code}` })),
  ];
  entries.sort((a, b) => a.offset - b.offset);
  let gone = 0;
  let text = "";
  for (const { line, entry } of entries) {
    while (gone < goneLines.length && goneLines[gone] < line) gone++;
    text += `${line - 1 - gone} ${entry}\n`;
  }
  return text;
}

function layEdits(
  reading: Reading,
  commands: readonly Command[],
  removed: readonly ControlLine[],
  provenance: Provenance,
): Edit[] {
  const list = new EditList();
  for (const { offset, length } of removed) list.remove(offset, length);
  if (reading.provenance) list.remove(reading.provenance.offset, reading.provenance.length);
  list.insert(reading.window.start.offset, provenanceLine(provenance));
  for (const { offset, text, tag } of commands) list.insert(offset, `${text} ${OWN_TAGS[tag]}`);
  return list.end(NEWLINE[reading.file.newline], reading.file);
}

const NEWLINE = { lf: "\n", crlf: "\r\n", cr: "\r", mixed: "\n", none: "\n" } as const;
