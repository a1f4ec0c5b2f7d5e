import type { Channel, Machine } from "#shared/formats/machine.ts";
import type { Profile } from "#shared/formats/profile.ts";

/** A channel as the editor shows it: one of the machine, or one that only the profile names. */
export interface EditedChannel {
  id: string;
  side: "cooling" | "heating";
  driven: boolean;
  /** undefined where the machine has no such channel, or no machine is chosen */
  channel?: Channel;
}

/** The machine's channels in its order, then those that only the profile names. */
export function editedChannels(profile: Profile, machine: Machine | undefined): EditedChannel[] {
  const named = new Map<string, "cooling" | "heating">();
  for (const zone of profile.zones) {
    for (const side of ["cooling", "heating"] as const) {
      for (const { channel } of zone[side]) if (!named.has(channel)) named.set(channel, side);
    }
  }
  const own = (machine?.channels ?? []).map((channel) => ({
    id: channel.id,
    side: named.get(channel.id) ?? (channel.kind === "fan" ? ("cooling" as const) : ("heating" as const)),
    driven: named.has(channel.id),
    channel,
  }));
  const strangers = [...named].filter(([id]) => !own.some((each) => each.id === id));
  return [...own, ...strangers.map(([id, side]) => ({ id, side, driven: true }))];
}
