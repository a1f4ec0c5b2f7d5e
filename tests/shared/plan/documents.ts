import { parseMachine } from "#shared/formats/machine.ts";
import { parseProfile } from "#shared/formats/profile.ts";
import type { PlanLayer } from "#shared/plan/plan.ts";

/** What a test changes of a channel: anything but what it is. */
interface Channels {
  fan?: object;
  lamp?: object;
  more?: object[];
}

/** A machine with a part-cooling fan and a lamp, 255 steps each, without limits unless given. */
export function machineWith({ fan = {}, lamp = {}, more = [] }: Channels = {}) {
  return parseMachine({
    format: "quenchline.machine/1",
    name: "Tern",
    motion: {
      maxSpeedMmS: 200,
      accelMmS2: { print: 1500, travel: 1500, retract: 1500 },
      cornering: { rule: "square-corner-velocity", speedMmS: 5 },
    },
    channels: [
      { id: "part-fan", kind: "fan", drive: { by: "fan-index", index: 0, fullScale: 255 }, ...fan },
      { id: "lamp", kind: "heater", drive: { by: "fan-index", index: 2, fullScale: 255 }, ...lamp },
      ...more,
    ],
  });
}

export function profileWith(zones: object[], rest: object = {}) {
  return parseProfile({
    format: "quenchline.profile/1",
    name: "Seal ring",
    polymer: "PEEK",
    zones: zones.map((zone) => ({ unit: "mm", target: "none", ...zone })),
    ...rest,
  });
}

export const fixed = (channel: string, duty: number) => ({ channel, rule: "fixed", duty });

export const curve = (channel: string, over: string, points: [number, number][]) => ({
  channel,
  rule: "curve",
  over,
  points,
});

/** One zone over the whole part with these rules. */
export const everywhere = (cooling: object | object[], heating: object | object[] = []) => [
  { name: "all", from: 0, cooling, heating },
];

/** Layers of one object, 0.2 mm high, 10 s and 500 mm each, or as given for each. */
export function layersOf(count: number, each: (i: number) => Partial<PlanLayer> = () => ({})): PlanLayer[] {
  return Array.from({ length: count }, (_, i) => ({
    index: i + 1,
    object: 1,
    zMm: (i + 1) * 0.2,
    heightMm: 0.2,
    timeS: 10,
    depositedLengthMm: 500,
    ...each(i),
  }));
}
