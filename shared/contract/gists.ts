import { z } from "zod";

const ChannelKind = z.enum(["fan", "heater"]);

/** What lists show of a machine: its outputs. */
export const MachineGist = z.object({ channels: z.array(z.object({ id: z.string(), kind: ChannelKind })) });
export type MachineGist = z.infer<typeof MachineGist>;

/** What lists show of a profile: what it is for, what it wants, what it drives. */
export const ProfileGist = z.object({
  polymer: z.string(),
  /** from the bottom up */
  zones: z.array(
    z.object({ name: z.string(), target: z.enum(["amorphous", "semi-crystalline", "alternating", "graded", "none"]) }),
  ),
  /** channels that some zone has a rule for, with the kind of output it is written for */
  drives: z.array(z.object({ id: z.string(), kind: ChannelKind })),
});
export type ProfileGist = z.infer<typeof ProfileGist>;

/** What lists show of a polymer card. Temperatures in °C. */
export const PolymerGist = z.object({
  tgC: z.number(),
  /** left out where nothing of it crystallises */
  tmC: z.number().optional(),
  amorphousReachable: z.boolean(),
});
export type PolymerGist = z.infer<typeof PolymerGist>;

/** Channels that the profile drives and the machine lacks, by name and kind; none: the machine can follow the profile. */
export function lackingChannels(profile: ProfileGist, machine: MachineGist): ProfileGist["drives"] {
  return profile.drives.filter(
    ({ id, kind }) => !machine.channels.some((channel) => channel.id === id && channel.kind === kind),
  );
}
