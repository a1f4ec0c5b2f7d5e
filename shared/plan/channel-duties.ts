import type { Machine } from "#shared/formats/machine.ts";
import type { Profile } from "#shared/formats/profile.ts";
import { drivenChannels } from "#shared/plan/driven-channels.ts";
import { resolveLeadS } from "#shared/plan/lead.ts";
import type { Plan, PlanLayer } from "#shared/plan/plan.ts";
import type { ChannelDuties } from "#shared/thermal/forcing.ts";

/**
 * A plan as the prediction takes it: the duty of every layer by channel, each with its lead. Channels that the profile
 * doesn't drive keep what the file commands, as the mean of each layer.
 */
export function channelDuties(
  { layers: planned }: Plan,
  layers: readonly PlanLayer[],
  machine: Machine,
  profile: Profile,
): ChannelDuties[] {
  const driven = drivenChannels(machine, profile);
  return machine.channels.map((channel) => {
    const { id } = channel;
    if (driven.includes(channel))
      return { id, leadS: resolveLeadS(channel, profile), duty: Float64Array.from(planned, ({ duty }) => duty[id]) };
    return { id, leadS: 0, duty: Float64Array.from(layers, ({ duty }) => duty?.[id]?.mean ?? 0) };
  });
}
