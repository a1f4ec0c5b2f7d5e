import type { Channel, Machine } from "#shared/formats/machine.ts";
import type { Profile } from "#shared/formats/profile.ts";
import type { Reading } from "#shared/layers/reading.ts";
import { drivenChannels } from "#shared/plan/driven-channels.ts";
import { type DutyLimits, effectiveLimits } from "#shared/plan/limits.ts";
import type {
  Comparison,
  Entry,
  OutputEntry,
  OwnEntry,
  PauseEntry,
  ProvenanceEntry,
} from "#shared/prove/comparison.ts";
import { firstFrom, KnownTimes } from "#shared/prove/known-times.ts";
import { type ProvenanceFacts, readProvenance } from "#shared/prove/provenance.ts";
import { Refusal } from "#shared/refusal.ts";

/** A duty that a line of the tuned file sets. */
export interface DutyEvent {
  entry: OwnEntry | OutputEntry;
  /**
   * `plan`, `raise`, `restore`: a line of ours with that tag; `kept`: a command of the file on a driven channel inside the
   * window; `file`: any other command of the file
   */
  source: "plan" | "raise" | "restore" | "kept" | "file";
  /** 0-1; NaN where it is hidden */
  duty: number;
  /** print time from the file's start, NaN where the reading does not know the boundary, s */
  timeS: number;
}

/** Everything that the checks look at, put in order once. */
export class Evidence {
  readonly reading: Reading;
  readonly machine: Machine;
  readonly profile: Profile | undefined;
  readonly comparison: Comparison;
  /** index into machine.channels, in their order */
  readonly driven: readonly number[];
  readonly provenance: { entries: ProvenanceEntry[]; facts?: ProvenanceFacts; problem?: string };
  readonly own: readonly OwnEntry[];
  readonly pauses: readonly PauseEntry[];
  /** by channel: what sets its duty, in the order of the tuned file */
  readonly events: readonly DutyEvent[][];

  constructor(reading: Reading, machine: Machine, profile: Profile | undefined, comparison: Comparison) {
    this.reading = reading;
    this.machine = machine;
    this.profile = profile;
    this.comparison = comparison;
    const { entries } = comparison;
    this.provenance = provenanceAmong(entries);
    this.own = entries.filter((entry) => entry.what === "own");
    this.pauses = entries.filter((entry) => entry.what === "pause");
    this.driven = drivenIndices(machine, profile, this.provenance.facts);
    const times = new KnownTimes(reading);
    const events: DutyEvent[][] = machine.channels.map(() => []);
    for (const entry of entries) {
      if (entry.what !== "own" && entry.what !== "file") continue;
      if (!entry.set) continue;
      if (entry.what === "file" && entry.set.does === "configuration") continue;
      const source = entry.what === "own" ? entry.tag : this.isKept(entry) ? "kept" : "file";
      const timeS = times.within(entry.from, entry.to);
      events[entry.set.channel].push({ entry, source, duty: entry.set.duty, timeS });
    }
    this.events = events;
  }

  /** The driven channels, or those of them that are heaters. */
  channels(kind?: Channel["kind"]): { channel: Channel; index: number }[] {
    return this.driven
      .map((index) => ({ channel: this.machine.channels[index], index }))
      .filter(({ channel }) => kind === undefined || channel.kind === kind);
  }

  /** A command of the file that sets a duty on a driven channel inside the window. */
  isKept({ from, set }: OutputEntry): boolean {
    return set.does === "duty" && this.driven.includes(set.channel) && this.isInside(from);
  }

  /** A line of the original that starts at this byte stands inside the window. */
  isInside(offset: number): boolean {
    const { start, end } = this.reading.window;
    return offset >= start.offset && offset < end.offset;
  }

  /** Whether a pause stands between two bytes of the original, both included. */
  pauseWithin(from: number, to: number): boolean {
    const { pauses } = this;
    const next = firstFrom(pauses.length, (k) => pauses[k].from, from);
    return next < pauses.length && pauses[next].from <= to;
  }

  /** What the file itself has set a channel to before the window; 0 where it sets nothing. */
  dutyBefore(index: number): number {
    const { offset } = this.reading.window.start;
    const before = this.events[index].filter(({ entry }) => entry.what === "file" && entry.from < offset);
    return before[before.length - 1]?.duty ?? 0;
  }

  /** The machine's limits, narrowed by the profile where there is one. */
  limits(channel: Channel): DutyLimits {
    if (this.profile) {
      try {
        return effectiveLimits(channel, this.profile);
      } catch (error) {
        if (!(error instanceof Refusal)) throw error;
      }
    }
    const { minDuty, maxDuty, maxDutyPerS = Number.POSITIVE_INFINITY } = channel;
    return { minDuty, maxDuty, maxDutyPerS, mayBeOff: true, maxDutyPerLayer: Number.POSITIVE_INFINITY, endRampMm: 0 };
  }

  /** Number of layers whose write position lies at or before a byte of the original. */
  layersBy(offset: number): number {
    const { layers } = this.reading;
    return firstFrom(layers.length, (k) => layers[k].writeAt.offset, offset + 1);
  }

  /** `line 12 of the tuned file (layer 3)` */
  place({ tunedLine, from, to }: Pick<Entry, "tunedLine" | "from" | "to">): string {
    return `line ${tunedLine} of the tuned file (${this.layerText(Math.max(from, to))})`;
  }

  layerText(offset: number): string {
    const { layers, window } = this.reading;
    if (offset >= window.end.offset) return "behind the last layer";
    const count = this.layersBy(offset);
    return count === 0 ? "before the first layer" : `layer ${layers[count - 1].index}`;
  }
}

function provenanceAmong(entries: readonly Entry[]): Evidence["provenance"] {
  const found = entries.filter((entry) => entry.what === "provenance");
  if (found.length === 0) return { entries: found };
  const facts = readProvenance(found[0].text);
  return typeof facts === "string" ? { entries: found, problem: facts } : { entries: found, facts };
}

/** With a profile its channels, else those that the tuned file names. */
function drivenIndices(machine: Machine, profile: Profile | undefined, facts: ProvenanceFacts | undefined): number[] {
  const named = profile ? drivenChannels(machine, profile).map(({ id }) => id) : (facts?.channels ?? []);
  return [...machine.channels.keys()].filter((index) => named.includes(machine.channels[index].id));
}
