import type { Channel, Machine } from "#shared/formats/machine.ts";
import type { Profile } from "#shared/formats/profile.ts";
import type { Reading } from "#shared/layers/reading.ts";
import type { Plan } from "#shared/plan/plan.ts";
import type { Instants } from "#shared/prove/instants.ts";
import { pauseForms } from "#shared/prove/pause-line.ts";

/** A duty that has to be in force from a line boundary on. */
export interface Target {
  /** byte of the original */
  offset: number;
  duty: number;
  /** layer that wants it */
  layer: number;
}

export interface TargetInput {
  reading: Reading;
  machine: Machine;
  profile: Profile;
  plan: Plan;
  instants: Instants;
}

/**
 * Where the duties of a plan have to be in force, ascending: each layer's at its instant, of several at one boundary the
 * last. A heater that is idle at a pause is wanted again behind it where the pause blocks, else from the next layer on.
 */
export function targetsOf(channel: Channel, input: TargetInput): Target[] {
  const { reading, profile, plan, instants } = input;
  const targets: Target[] = [];
  for (const [k, layer] of reading.layers.entries())
    put(targets, {
      offset: instants.ofLayer(layer, channel, profile),
      duty: plan.layers[k].duty[channel.id],
      layer: layer.index,
    });
  return channel.kind === "heater" ? aroundPauses(targets, input) : targets;
}

function put(targets: Target[], target: Target): void {
  const last = targets[targets.length - 1];
  if (last?.offset === target.offset) targets.pop();
  targets.push(target);
}

function aroundPauses(targets: readonly Target[], { reading, machine, instants }: TargetInput): Target[] {
  const forms = pauseForms(machine);
  const { layers, window } = reading;
  let left = [...targets];
  let idleUntil = 0;
  for (const { offset, length, command } of reading.pauses) {
    if (offset < window.start.offset || offset >= window.end.offset) continue;
    const blocks = forms.get(command.toUpperCase()) === "blocking";
    const nextLayer = layers.find(({ writeAt }) => writeAt.offset > offset)?.writeAt ?? window.end;
    idleUntil = Math.max(idleUntil, instants.place(blocks ? offset + length : nextLayer.offset));
    const later = left.filter((target) => target.offset > idleUntil);
    const wanted = left[left.length - later.length - 1];
    left = left.filter((target) => target.offset < offset);
    if (wanted && idleUntil < window.end.offset) left.push({ ...wanted, offset: idleUntil });
    left.push(...later);
  }
  return left;
}
