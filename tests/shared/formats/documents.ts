import { Refusal } from "#shared/refusal.ts";

/**
 * Documents as a person would write them: plain JSON that a test may spoil. Typed loosely on purpose, since the schemas
 * are what is under test.
 */
// biome-ignore lint/suspicious/noExplicitAny: tests put wrong things into every place of these documents
export type Json = any;

/** The machine example of the formats' description. */
export const tern = (): Json => ({
  format: "quenchline.machine/1",
  name: "Tern",
  motion: {
    maxSpeedMmS: 200,
    accelMmS2: { print: 1500, travel: 1500, retract: 1500 },
    axes: { z: { maxSpeedMmS: 10, maxAccelMmS2: 100 }, e: { maxSpeedMmS: 60, maxAccelMmS2: 1500 } },
    extruderLimits: "extrude-only",
    cornering: { rule: "square-corner-velocity", speedMmS: 5, cruiseRatio: 0.5, extruderStepMmS: 1 },
    stopAtExtrudeOnly: true,
    arcSegmentMm: 1,
    firmwareRetract: { lengthMm: 1, speedMmS: 35 },
    initialSpeedMmS: 25,
    lookAhead: "full",
    honourFileLimits: false,
    dwellP: "ms",
  },
  channels: [
    {
      id: "part-fan",
      kind: "fan",
      drive: { by: "fan-index", index: 0, fullScale: 255 },
      minDuty: 0.12,
      maxDuty: 1,
      startBoostS: 0.2,
      settleS: 1.5,
      acts: "queued",
    },
    {
      id: "lamp",
      kind: "heater",
      drive: { by: "fan-index", index: 2, fullScale: 255 },
      minDuty: 0,
      maxDuty: 0.85,
      idleDuty: 0,
      settleS: 2,
      maxDutyPerS: 0.05,
      acts: "queued",
    },
  ],
  pauses: [
    { command: "M0", blocking: true },
    { command: "M600", blocking: true },
  ],
});

/** The profile example of the formats' description. */
export const sealRing = (): Json => ({
  format: "quenchline.profile/1",
  name: "Seal ring, stiff base and tough lip",
  polymer: "PEEK",
  bedLayers: { count: 2, duty: { "part-fan": 0, lamp: 0.4 } },
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
      cooling: {
        channel: "part-fan",
        rule: "curve",
        over: "deposited-length",
        points: [
          [100, 0.8],
          [600, 0.45],
          [3000, 0.2],
        ],
      },
      heating: {
        channel: "lamp",
        rule: "curve",
        over: "height",
        points: [
          [6, 0.2],
          [30, 0.28],
        ],
      },
    },
  ],
  limits: { "part-fan": { maxDutyPerLayer: 0.15 }, lamp: { maxDutyPerLayer: 0.1, endRampMm: 2 } },
  lead: { "part-fan": 0, lamp: "settle" },
  withinLayer: "replace",
});

/** A heating rule that any machine with a lamp carries out. */
export const fixedLamp = { channel: "lamp", rule: "fixed", duty: 0.5 };
export type Border = [from: number, to?: number];

/** A profile whose zones are named a, b, c … and have these borders. */
export const banded = (unit: string, ...borders: Border[]): Json => ({
  format: "quenchline.profile/1",
  name: "Bands",
  polymer: "PPS",
  zones: borders.map(([from, to], i) => ({
    name: "abcdefg"[i],
    from,
    ...(to === undefined ? {} : { to }),
    unit,
    target: "none",
    heating: fixedLamp,
  })),
});

const number = (value: number): Json => ({ value, source: "invented for tests", confidence: "unverified" });

/** A card with invented numbers of the right size. */
export const card = (): Json => ({
  format: "quenchline.polymer/1",
  name: "PEEK",
  variant: "neat",
  tgC: number(143),
  tmC: number(343),
  solidBelowC: number(200),
  solidAtRelativeCrystallinity: number(0.3),
  weldAboveC: number(180),
  amorphousReachable: true,
  margins: {
    belowTgC: number(10),
    aboveTgC: number(20),
    maxCrystallinity: number(0.05),
    minCrystallinity: number(0.2),
  },
  densityKgM3: number(1280),
  conductivityWMK: number(0.25),
  heatCapacityJKgK: number(1700),
  emissivity: number(0.9),
  lampAbsorptivity: { low: number(0.5), typical: number(0.7), high: number(0.9) },
  crystallinity: {
    heatOfFusionJG: number(130),
    attainable: number(0.35),
    avramiN: number(2.5),
    fastestPerS: number(0.2),
    fastestAtC: number(240),
    halfWidthC: number(35),
  },
});

/** What a call refuses; a test fails where it does not refuse. */
export function refusal(call: () => unknown): Refusal {
  try {
    call();
  } catch (error) {
    if (error instanceof Refusal) return error;
    throw error;
  }
  throw new Error("nothing was refused");
}

/** The lines of a refusal that name places, without its headline. */
export function problemsOf(call: () => unknown): string[] {
  return refusal(call).message.split("\n").slice(1);
}
