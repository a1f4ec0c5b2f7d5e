import type { Profile, Rule, Zone } from "#shared/formats/profile.ts";
import type { BorderScale, BorderUnit } from "#src/features/profiles/editor/band-axis.ts";

/** Changes of a profile's zones. Each returns a new profile; borders of neighbours always move together. */

export function withZone(profile: Profile, z: number, changes: Partial<Zone>): Profile {
  return { ...profile, zones: profile.zones.map((zone, i) => (i === z ? { ...zone, ...changes } : zone)) };
}

/** Moves the border between zone `z` and the one above it, as it is: what can't be is shown as a problem. */
export function withBorder(profile: Profile, z: number, border: number): Profile {
  return {
    ...profile,
    zones: profile.zones.map((zone, i) => {
      if (i === z) return { ...zone, to: border };
      return i === z + 1 ? { ...zone, from: border } : zone;
    }),
  };
}

/** Moves a border no further than its neighbours allow. */
export function movedBorder(profile: Profile, z: number, wanted: number, scale: BorderScale): Profile {
  const { zones } = profile;
  const lowest = scale.stepped(zones[z].from, 1);
  const above = zones[z + 1]?.to;
  const highest = above === undefined ? scale.borderAt(scale.topMm) : scale.stepped(above, -1);
  if (!(lowest <= highest)) return profile;
  const border = Math.min(Math.max(wanted, lowest), highest);
  return border === zones[z].to ? profile : withBorder(profile, z, border);
}

/** Cuts a zone in two at a border; the upper part keeps the rules and gets a name of its own. */
export function splitZone(profile: Profile, z: number, wanted: number, scale: BorderScale): Profile {
  const zone = profile.zones[z];
  const lowest = scale.stepped(zone.from, 1);
  const highest = zone.to === undefined ? wanted : scale.stepped(zone.to, -1);
  const border = Math.min(Math.max(wanted, lowest), highest);
  if (!(border > zone.from) || (zone.to !== undefined && !(border < zone.to))) return profile;
  const upper: Zone = { ...zone, name: freeName(profile, zone.name), from: border, rampMm: 0 };
  const zones = profile.zones.flatMap((each, i) => (i === z ? [{ ...each, to: border }, upper] : [each]));
  return { ...profile, zones };
}

/** Adds a zone above all others; the one that was the last gets an upper border for it. */
export function addZone(profile: Profile, scale: BorderScale): Profile {
  const z = profile.zones.length - 1;
  if (z < 0) return { ...profile, zones: [{ ...EMPTY_ZONE, unit: scale.unit }] };
  const last = profile.zones[z];
  const middle = (scale.heightOf(last.from) + scale.topMm) / 2;
  if (last.to === undefined) return splitZone(profile, z, scale.borderAt(middle), scale);
  const added: Zone = { ...last, name: freeName(profile, last.name), from: last.to, to: undefined, rampMm: 0 };
  return { ...profile, zones: [...profile.zones, added] };
}

const EMPTY_ZONE: Zone = { name: "zone 1", from: 0, unit: "mm", target: "none", rampMm: 0, cooling: [], heating: [] };

/** Takes a zone out; the one below takes its place, or the one above where it was the lowest. */
export function removeZone(profile: Profile, z: number): Profile {
  const { zones } = profile;
  if (zones.length < 2) return profile;
  const gone = zones[z];
  const left = zones.filter((_, i) => i !== z);
  if (z === 0) left[0] = { ...left[0], from: gone.from };
  else left[z - 1] = { ...left[z - 1], to: gone.to };
  return { ...profile, zones: left };
}

/** Gives all borders in another unit, at the same heights of the part. */
export function inUnit(profile: Profile, unit: BorderUnit, now: BorderScale, then: BorderScale): Profile {
  const moved = (border: number) => (border === 0 ? 0 : then.borderAt(now.heightOf(border)));
  return {
    ...profile,
    zones: profile.zones.map((zone, z) => ({
      ...zone,
      unit,
      from: z === 0 ? 0 : moved(zone.from),
      ...(zone.to === undefined ? {} : { to: moved(zone.to) }),
    })),
  };
}

function freeName({ zones }: Profile, name: string): string {
  const stem = name.replace(/ \d+$/, "");
  for (let n = 2; ; n++) {
    const candidate = `${stem} ${n}`;
    if (!zones.some((zone) => zone.name === candidate)) return candidate;
  }
}

/** Replaces the rule of a channel in one zone, or adds it. */
export function withRule(profile: Profile, z: number, side: "cooling" | "heating", rule: Rule): Profile {
  const rules = profile.zones[z][side];
  const has = rules.some(({ channel }) => channel === rule.channel);
  const next = has ? rules.map((each) => (each.channel === rule.channel ? rule : each)) : [...rules, rule];
  return withZone(profile, z, { [side]: next });
}

/** Lets another channel do in the whole profile what one that the machine lacks was to do. */
export function withChannel(profile: Profile, from: string, to: string): Profile {
  const renamed = <Value>({ [from]: value, ...rest }: Record<string, Value>): Record<string, Value> =>
    value === undefined ? rest : { ...rest, [to]: value };
  const rules = (list: readonly Rule[]) =>
    list.map((rule) => (rule.channel === from ? { ...rule, channel: to } : rule));
  return {
    ...profile,
    zones: profile.zones.map((zone) => ({ ...zone, cooling: rules(zone.cooling), heating: rules(zone.heating) })),
    bedLayers: { ...profile.bedLayers, duty: renamed(profile.bedLayers.duty) },
    limits: renamed(profile.limits),
    lead: renamed(profile.lead),
  };
}

/** Takes a channel into the profile, with a fixed duty of 0 in every zone, or out of it with all that is said of it. */
export function drivingChannel(profile: Profile, side: "cooling" | "heating", id: string, driven: boolean): Profile {
  if (driven) {
    return profile.zones.reduce(
      (next, zone, z) =>
        zone[side].some(({ channel }) => channel === id)
          ? next
          : withRule(next, z, side, { channel: id, rule: "fixed", duty: 0 }),
      profile,
    );
  }
  const without = <Value>({ [id]: _, ...rest }: Record<string, Value>): Record<string, Value> => rest;
  return {
    ...profile,
    zones: profile.zones.map((zone) => ({
      ...zone,
      cooling: zone.cooling.filter(({ channel }) => channel !== id),
      heating: zone.heating.filter(({ channel }) => channel !== id),
    })),
    bedLayers: { ...profile.bedLayers, duty: without(profile.bedLayers.duty) },
    limits: without(profile.limits),
    lead: without(profile.lead),
  };
}
