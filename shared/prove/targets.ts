import type { Channel, Machine } from "#shared/formats/machine.ts";
import type { Profile } from "#shared/formats/profile.ts";
import type { Reading } from "#shared/layers/reading.ts";
import type { Plan } from "#shared/plan/plan.ts";
import type { Instants } from "#shared/prove/instants.ts";
import { firstFrom } from "#shared/prove/known-times.ts";
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

function aroundPauses(targets: readonly Target[], input: TargetInput): Target[] {
  const left: Target[] = [];
  let next = 0;
  for (const { from, until } of idleTimes(input)) {
    for (; next < targets.length && targets[next].offset < from; next++) left.push(targets[next]);
    while (next < targets.length && targets[next].offset <= until) next++;
    if (next > 0 && until < input.reading.window.end.offset) left.push({ ...targets[next - 1], offset: until });
  }
  return [...left, ...targets.slice(next)];
}

/** From a pause on to where the heater may be wanted again, both as bytes of the original; ascending, apart. */
function idleTimes({ reading, machine, instants }: TargetInput): { from: number; until: number }[] {
  const forms = pauseForms(machine);
  const { layers, window, pauses } = reading;
  const times: { from: number; until: number }[] = [];
  for (const { offset, length, command } of pauses) {
    if (offset < window.start.offset || offset >= window.end.offset) continue;
    const nextLayer =
      layers[firstFrom(layers.length, (k) => layers[k].writeAt.offset, offset + 1)]?.writeAt ?? window.end;
    const blocks = forms.get(command.toUpperCase()) === "blocking";
    const until = instants.place(blocks ? offset + length : nextLayer.offset);
    const last = times[times.length - 1];
    if (last && offset <= last.until) last.until = Math.max(last.until, until);
    else times.push({ from: offset, until });
  }
  return times;
}
