import type { Channel, Machine } from "#shared/formats/machine.ts";
import { pathText } from "#shared/formats/path-text.ts";
import type { Polymer } from "#shared/formats/polymer.ts";
import { type Problem, refuseProblems } from "#shared/formats/problems.ts";
import type { Limits, Profile, Rule, Zone } from "#shared/formats/profile.ts";
import { nearestSpelling } from "#shared/formats/spelling.ts";

/** A problem with the identifier the refusal gets when it is the only kind of problem. */
export interface Misfit extends Problem {
  code: string;
}

/** One rule of the profile and where it stands. */
interface PlacedRule {
  rule: Rule;
  path: PropertyKey[];
  side: "cooling" | "heating";
}

/** Everything that keeps a profile from being carried out on a machine, with the polymer's card where one is given. */
export function fitProblems(machine: Machine, profile: Profile, polymer?: Polymer): Misfit[] {
  const rules = placedRules(profile);
  const driven = new Set(rules.map(({ rule }) => rule.channel));
  return [
    ...rules.flatMap((placed) => ruleMisfits(placed, machine)),
    ...zoneMisfits(profile, driven),
    ...settingMisfits(profile, driven),
    ...limitMisfits(profile, machine, driven),
    ...(polymer === undefined ? [] : polymerMisfits(profile, polymer)),
  ];
}

/**
 * Checks that a profile can be carried out on a machine, with the polymer's card where one is given.
 *
 * @throws Refusal with one line for every problem. Its code is `profile-does-not-fit`, or, where all problems are of one
 * kind, that kind: `unknown-channel`, `wrong-kind`, `channel-not-driven`, `limits-too-wide`, `polymer-mismatch`,
 * `amorphous-out-of-reach`, `semi-crystalline-out-of-reach`
 */
export function checkFit(machine: Machine, profile: Profile, polymer?: Polymer): void {
  const misfits = fitProblems(machine, profile, polymer);
  if (misfits.length === 0) return;
  const sameCode = misfits.every(({ code }) => code === misfits[0].code);
  const headline = `The profile "${profile.name}" does not fit the machine "${machine.name}"`;
  refuseProblems(sameCode ? misfits[0].code : "profile-does-not-fit", headline, misfits);
}

/** A list of one rule is named as if it stood alone, which is how most documents write it. */
function placedRules(profile: Profile): PlacedRule[] {
  return profile.zones.flatMap((zone, z) =>
    (["cooling", "heating"] as const).flatMap((side) =>
      zone[side].map((rule, i) => ({
        rule,
        side,
        path: zone[side].length === 1 ? ["zones", z, side] : ["zones", z, side, i],
      })),
    ),
  );
}

function ruleMisfits({ rule, path, side }: PlacedRule, machine: Machine): Misfit[] {
  const misfits: Misfit[] = [];
  const report = (code: string, field: string, message: string) =>
    misfits.push({ code, path: pathText([...path, field]), message });

  const channel = machine.channels.find(({ id }) => id === rule.channel);
  const wanted = side === "cooling" ? "fan" : "heater";
  if (channel === undefined) report("unknown-channel", "channel", unknownChannel(rule.channel, machine));
  else if (channel.kind !== wanted) {
    const message = `"${channel.id}" is a ${channel.kind}, but ${side} needs a ${wanted}. Move the rule to ${side === "cooling" ? "heating" : "cooling"}, or name a ${wanted}`;
    report("wrong-kind", "channel", message);
  }
  return misfits;
}

function unknownChannel(id: string, machine: Machine): string {
  const has = machine.channels.map((channel) => channel.id);
  const meant = nearestSpelling(id, has);
  const remedy =
    meant === undefined ? "Name one of them, or add the channel to the machine" : `Did you mean "${meant}"?`;
  const list = has.length === 0 ? "it has none" : `it has ${has.join(", ")}`;
  return `the machine "${machine.name}" has no channel "${id}"; ${list}. ${remedy}`;
}

/** A channel that some zones drive and others do not would have no defined duty in the others. */
function zoneMisfits(profile: Profile, driven: ReadonlySet<string>): Misfit[] {
  return profile.zones.flatMap((zone, z) => {
    const here = new Set([...zone.cooling, ...zone.heating].map((rule) => rule.channel));
    const missing = [...driven].filter((id) => !here.has(id));
    return missing.map((id) => ({
      code: "channel-not-driven",
      path: pathText(["zones", z]),
      message: `zone "${zone.name}" has no rule for "${id}", which other zones drive, so its duty would be undefined here. Add a rule, for instance fixed`,
    }));
  });
}

/** Bed layers, limits and leads speak of channels; a name that no zone drives is most likely a slip. */
function settingMisfits(profile: Profile, driven: ReadonlySet<string>): Misfit[] {
  const settings: [PropertyKey[], object][] = [
    [["bedLayers", "duty"], profile.bedLayers.duty],
    [["limits"], profile.limits],
    [["lead"], profile.lead],
  ];
  return settings.flatMap(([path, entries]) =>
    Object.keys(entries)
      .filter((id) => !driven.has(id))
      .map((id) => {
        const meant = nearestSpelling(id, [...driven]);
        const remedy = meant === undefined ? "Remove it, or add a rule to every zone" : `Did you mean "${meant}"?`;
        const message = `no zone drives "${id}". ${remedy}`;
        return { code: "channel-not-driven", path: pathText([...path, id]), message };
      }),
  );
}

function limitMisfits(profile: Profile, machine: Machine, driven: ReadonlySet<string>): Misfit[] {
  return Object.entries(profile.limits).flatMap(([id, limits]) => {
    const channel = machine.channels.find((candidate) => candidate.id === id);
    return channel === undefined || !driven.has(id) ? [] : channelLimitMisfits(limits, channel);
  });
}

function channelLimitMisfits(limits: Limits, channel: Channel): Misfit[] {
  const misfits: Misfit[] = [];
  const report = (code: string, field: string, message: string) =>
    misfits.push({ code, path: pathText(["limits", channel.id, field]), message });
  const wider = (field: "minDuty" | "maxDuty" | "maxDutyPerS", side: "below" | "above") =>
    report(
      "limits-too-wide",
      field,
      `is ${limits[field]}, ${side} the machine's ${channel[field]}. A profile's limits can only narrow the machine's: give ${side === "below" ? "at least" : "at most"} ${channel[field]}, or leave it out`,
    );

  const { minDuty, maxDuty, maxDutyPerS, endRampMm } = limits;
  if (minDuty !== undefined && minDuty < channel.minDuty) wider("minDuty", "below");
  if (maxDuty !== undefined && maxDuty > channel.maxDuty) wider("maxDuty", "above");
  if (maxDutyPerS !== undefined && maxDutyPerS > (channel.maxDutyPerS ?? Number.POSITIVE_INFINITY)) {
    wider("maxDutyPerS", "above");
  }
  if (minDuty !== undefined && minDuty > channel.maxDuty) {
    const message = `is ${minDuty}, above the machine's maxDuty ${channel.maxDuty}, so no duty is left. Lower it`;
    report("limits-too-wide", "minDuty", message);
  }
  // 0 is left: it keeps the channel off.
  if (maxDuty !== undefined && maxDuty > 0 && maxDuty < channel.minDuty) {
    const message = `is ${maxDuty}, below the machine's minDuty ${channel.minDuty}, so no duty but 0 is left. Raise it, or give 0 to keep the channel off`;
    report("limits-too-wide", "maxDuty", message);
  }
  if (endRampMm !== undefined && channel.kind === "fan") {
    report("wrong-kind", "endRampMm", `is for heaters, and "${channel.id}" is a fan. Leave it out`);
  }
  return misfits;
}

function polymerMisfits(profile: Profile, polymer: Polymer): Misfit[] {
  const misfits: Misfit[] = [];
  const fullName = fullNameOf(polymer);
  if (!isCardFor(polymer, profile)) {
    const message = `is "${profile.polymer}", but the polymer card is for "${fullName}". Choose the card the profile was written for, or another profile`;
    misfits.push({ code: "polymer-mismatch", path: "polymer", message });
  }
  profile.zones.forEach((zone, z) => {
    const { states, field } = statesAskedFor(zone);
    const report = (code: string, message: string) =>
      misfits.push({ code, path: pathText(["zones", z, field]), message });
    if (states.includes("amorphous") && !polymer.amorphousReachable) {
      const why = `"amorphous" is out of reach for ${fullName}, which crystallises too fast`;
      report("amorphous-out-of-reach", `${why}. Use "semi-crystalline" or "none"`);
    }
    if (states.includes("semi-crystalline") && polymer.crystallinity === null) {
      const why = `"semi-crystalline" is out of reach for ${fullName}, of which nothing crystallises`;
      report("semi-crystalline-out-of-reach", `${why}. Use "amorphous" or "none"`);
    }
  });
  return misfits;
}

function statesAskedFor({ target, pattern }: Zone): { states: string[]; field: "target" | "pattern" } {
  if (pattern === undefined) return { states: [target], field: "target" };
  return { states: ["amorphous", "semi-crystalline"], field: "pattern" };
}

const fullNameOf = ({ name, variant }: Polymer): string => (variant === "" ? name : `${name} ${variant}`);

/** Whether a card is of the polymer that a profile names, with its variant or without. */
export const isCardFor = (polymer: Polymer, profile: Profile): boolean =>
  [polymer.name, fullNameOf(polymer)].some((name) => sameName(name, profile.polymer));

/** Names of polymers are typed by hand: case and runs of spaces do not distinguish them. */
function sameName(one: string, other: string): boolean {
  const plain = (name: string) => name.trim().replace(/\s+/g, " ").toLowerCase();
  return plain(one) === plain(other);
}
