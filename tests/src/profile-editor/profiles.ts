import { type Machine, parseMachine } from "#shared/formats/machine.ts";
import { type Profile, parseProfile } from "#shared/formats/profile.ts";

/** A machine with a fan and a lamp. */
export function machineOf(): Machine {
  return parseMachine({
    format: "quenchline.machine/1",
    name: "Tern",
    motion: {
      maxSpeedMmS: 200,
      accelMmS2: { print: 1500, travel: 1500, retract: 1500 },
      cornering: { rule: "junction-deviation", deviationMm: 0.013 },
    },
    channels: [
      { id: "part-fan", kind: "fan", drive: { by: "fan-index", index: 0, fullScale: 255 }, minDuty: 0.12 },
      { id: "lamp", kind: "heater", drive: { by: "fan-index", index: 2, fullScale: 255 }, maxDuty: 0.85, settleS: 2 },
    ],
  });
}

/** Base up to 6 mm, lip above, as the seal ring has them. */
export function profileOf(changes: Record<string, unknown> = {}): Profile {
  return parseProfile({
    format: "quenchline.profile/1",
    name: "Seal ring",
    polymer: "PEEK",
    zones: [
      {
        name: "base",
        from: 0,
        to: 6,
        unit: "mm",
        target: "semi-crystalline",
        cooling: {
          channel: "part-fan",
          rule: "curve",
          over: "layer-time",
          points: [
            [3, 0.55],
            [10, 0.3],
            [40, 0.12],
          ],
        },
        heating: { channel: "lamp", rule: "fixed", duty: 0.62 },
      },
      {
        name: "lip",
        from: 6,
        unit: "mm",
        target: "amorphous",
        rampMm: 0.6,
        cooling: { channel: "part-fan", rule: "fixed", duty: 0.4 },
        heating: { channel: "lamp", rule: "fixed", duty: 0.2 },
      },
    ],
    limits: { lamp: { maxDutyPerLayer: 0.1 } },
    lead: { lamp: "settle" },
    bedLayers: { count: 2, duty: { lamp: 0.4 } },
    ...changes,
  });
}

/** 45 layers of 0.2 mm. */
export const PART = { layerTopsMm: Float64Array.from({ length: 45 }, (_, i) => Math.round((i + 1) * 200) / 1000) };
