import { parseMachine } from "#shared/formats/machine.ts";
import { parseProfile } from "#shared/formats/profile.ts";
import { numberedFrom } from "#tests/shared/prove/small-part.ts";

/** A stream of numbers in [0, 1) from a seed: parts and documents are the same for the same seed. */
export class Dice {
  private state: number;

  constructor(seed: number) {
    this.state = seed >>> 0;
  }

  next(): number {
    this.state = (this.state * 1664525 + 1013904223) >>> 0;
    return this.state / 2 ** 32;
  }

  chance(share: number): boolean {
    return this.next() < share;
  }

  pick<T>(...from: readonly T[]): T {
    return from[Math.floor(this.next() * from.length)];
  }

  whole(below: number): number {
    return Math.floor(this.next() * below);
  }

  duty(): number {
    return this.whole(1001) / 1000;
  }
}

/** A part of some layers with fan and lamp commands, travels, pauses and comments wherever the dice put them. */
export function randomPart(dice: Dice, pauses: readonly string[]): string {
  const lines = ["G21", "G90", "M83", "G28"];
  if (dice.chance(0.5)) lines.push(`M106 S${dice.whole(256)}`);
  if (dice.chance(0.3)) lines.push("M106 P2 S0");
  const layers = 2 + dice.whole(12);
  const marked = dice.chance(0.8);
  const feed = dice.pick(300, 1500, 6000);
  for (let layer = 1; layer <= layers; layer++) {
    if (marked) lines.push(`;LAYER:${layer - 1}`);
    if (dice.chance(0.2)) lines.push(`M106 S${dice.whole(256)}`);
    lines.push(`G0 X10 Y10 Z${(layer * 0.2).toFixed(1)} F6000`);
    const moves = dice.pick(1, 2, 5, 20);
    for (let k = 0; k < moves; k++) lines.push(...someLines(dice, feed, pauses));
  }
  if (dice.chance(0.7)) lines.push("M107", "M104 S0");
  const newline = dice.pick("\n", "\n", "\r\n", "\r");
  const written = dice.chance(0.3) ? numberedFrom(lines, dice.pick(1, 100)) : lines;
  return written.join(newline) + (dice.chance(0.7) ? newline : "");
}

function someLines(dice: Dice, feed: number, pauses: readonly string[]): string[] {
  const somewhere = (): string => `X${(dice.next() * 100).toFixed(2)} Y${(dice.next() * 100).toFixed(2)}`;
  const lines = [`G1 ${somewhere()} E1 F${feed}`];
  if (dice.chance(0.3)) lines.push(`G0 ${somewhere()}`);
  if (dice.chance(0.1)) lines.push(dice.chance(0.5) ? `M106 S${dice.whole(256)}` : "M107");
  if (dice.chance(0.03)) lines.push(`M106 P2 S${dice.whole(256)}`);
  if (pauses.length > 0 && dice.chance(0.04)) lines.push(dice.pick(...pauses), "T0");
  if (pauses.length > 0 && dice.chance(0.02)) lines.push(...pauses, ...pauses);
  if (dice.chance(0.05)) lines.push("; comment", "", "T0");
  return lines;
}

export function randomMachine(dice: Dice) {
  const fan = {
    drive: { by: "fan-index", index: 0, fullScale: dice.pick(255, 1) },
    minDuty: dice.pick(0, 0.1, 0.123),
    maxDuty: dice.pick(1, 0.9, 0.7, 0.85),
    startBoostS: dice.pick(0, 0, 0.2),
    settleS: dice.pick(0, 3),
    ...(dice.chance(0.3) ? { maxDutyPerS: 0.2 } : {}),
  };
  const lamp = {
    drive: dice.pick<object>(
      { by: "fan-index", index: 2, fullScale: 255 },
      { by: "pin", pin: 4, fullScale: 255 },
      { by: "named-pin", name: "lamp", fullScale: dice.pick(1, 255) },
    ),
    minDuty: dice.pick(0, 0, 0.1),
    maxDuty: dice.pick(1, 0.85, 0.7),
    idleDuty: dice.pick(0, 0, 0.1),
    settleS: dice.pick(0, 2, 20),
    acts: dice.pick<object | string>("queued", { immediate: 1 }),
    ...(dice.chance(0.6) ? { maxDutyPerS: dice.pick(0.003, 0.02, 0.05, 0.2) } : {}),
  };
  return parseMachine({
    format: "quenchline.machine/1",
    name: "Gannet",
    motion: {
      maxSpeedMmS: 200,
      accelMmS2: { print: 1500, travel: 1500, retract: 1500 },
      cornering: { rule: "square-corner-velocity", speedMmS: 5 },
    },
    channels: [
      { id: "part-fan", kind: "fan", ...fan },
      { id: "lamp", kind: "heater", ...lamp },
    ],
    pauses: [
      { command: "M0", blocking: true },
      { command: "M600", blocking: dice.chance(0.5) },
    ],
  });
}

export function randomProfile(dice: Dice) {
  const curve = (channel: string) => ({
    channel,
    rule: "curve",
    over: dice.pick("height", "layer-time"),
    points: [0.2, 1, 3].map((x) => [x, dice.duty()]),
  });
  const rules = () => ({ unit: "mm", target: "none", cooling: curve("part-fan"), heating: curve("lamp") });
  const some = (share: number, limit: object): object => (dice.chance(share) ? limit : {});
  return parseProfile({
    format: "quenchline.profile/1",
    name: "Random",
    polymer: "PEEK",
    bedLayers: { count: dice.whole(3), duty: { "part-fan": 0, lamp: dice.duty() } },
    zones: [
      { name: "foot", from: 0, to: 1, ...rules() },
      { name: "post", from: 1, rampMm: dice.pick(0, 0.6), ...rules() },
    ],
    limits: {
      "part-fan": { ...some(0.4, { maxDutyPerLayer: 0.15 }), ...some(0.2, { maxDuty: 0.65 }) },
      lamp: { ...some(0.4, { maxDutyPerLayer: 0.1 }), ...some(0.3, { endRampMm: 1 }), ...some(0.2, { maxDuty: 0.6 }) },
    },
    lead: {
      "part-fan": dice.pick<number | string>(0, 0, 1, "settle"),
      lamp: dice.pick<number | string>(0, "settle", 5, 0.3, 30),
    },
    withinLayer: dice.pick("replace", "keep-raises"),
  });
}
