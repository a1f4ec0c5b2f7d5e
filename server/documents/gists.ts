import type { MachineGist, PolymerGist, ProfileGist } from "#shared/contract/gists.ts";
import type { Machine } from "#shared/formats/machine.ts";
import type { Polymer } from "#shared/formats/polymer.ts";
import type { Profile } from "#shared/formats/profile.ts";

/** What lists show of a document without fetching it. */

export const machineGist = ({ channels }: Machine): MachineGist => ({
  channels: channels.map(({ id, kind }) => ({ id, kind })),
});

export function profileGist({ polymer, zones }: Profile): ProfileGist {
  const drives = new Map<string, ProfileGist["drives"][number]>();
  for (const { cooling, heating } of zones) {
    for (const { channel } of cooling) drives.set(`fan ${channel}`, { id: channel, kind: "fan" });
    for (const { channel } of heating) drives.set(`heater ${channel}`, { id: channel, kind: "heater" });
  }
  return {
    polymer,
    zones: zones.map(({ name, target, pattern }) => ({ name, target: pattern?.kind ?? target })),
    drives: [...drives.values()],
  };
}

export const polymerGist = ({ tgC, tmC, amorphousReachable }: Polymer): PolymerGist => ({
  tgC: tgC.value,
  ...(tmC && { tmC: tmC.value }),
  amorphousReachable,
});
