import type { Channel, Machine } from "#shared/formats/machine.ts";
import type { Profile } from "#shared/formats/profile.ts";

/** The machine's channels that the profile drives, in the machine's order: those that a zone has a rule for. */
export function drivenChannels(machine: Machine, profile: Profile): Channel[] {
  const driven = new Set(
    profile.zones.flatMap((zone) => [...zone.cooling, ...zone.heating]).map((rule) => rule.channel),
  );
  return machine.channels.filter(({ id }) => driven.has(id));
}
