import { type Machine, parseMachine } from "#shared/formats/machine.ts";
import { type Polymer, parsePolymer } from "#shared/formats/polymer.ts";
import type { PredictionLayer } from "#shared/prediction/model.ts";
import type { ChannelDuties } from "#shared/thermal/forcing.ts";
import { card, tern } from "#tests/shared/formats/documents.ts";

/** Fan and lamp without lags, and surroundings without ranges, unless given. */
export function machineWith(thermal: object = {}, channels: { fan?: object; lamp?: object } = {}): Machine {
  const [fan, lamp] = tern().channels;
  return parseMachine({
    ...tern(),
    channels: [
      { ...fan, minDuty: 0, settleS: 0, ...channels.fan },
      { ...lamp, maxDuty: 1, settleS: 0, ...channels.lamp },
    ],
    thermal: {
      roomAirC: 40,
      bedAir: { riseC: 0, decayMm: 40 },
      convection: { h0WM2K: 15, fans: { "part-fan": { h1WM2K: 65, exponent: 1 } } },
      lamps: { lamp: { fluxAtFullWM2: 6_000, sideShare: 0.5, exponent: 1, lagS: 0 } },
      surroundings: { riseAtFullLampC: 0, lagS: 0 },
      bedContactM2KW: 0.001,
      ...thermal,
    },
  });
}

const set = (value: number) => ({ value, source: "invented for tests", confidence: "unverified" });

/** The polymer of the independent trial, with other numbers where given. */
export function polymerWith(numbers: Record<string, number> = {}, crystallinity: Record<string, number> = {}): Polymer {
  const plain = card();
  const base = { emissivity: 0.9, ...numbers };
  const kinetics = { fastestPerS: Math.LN2 ** 0.4 / 3.5, fastestAtC: 240, halfWidthC: 35, ...crystallinity };
  const one = { low: set(1), typical: set(1), high: set(1) };
  return parsePolymer({
    ...plain,
    lampAbsorptivity: one,
    ...Object.fromEntries(Object.entries(base).map(([name, value]) => [name, set(value)])),
    crystallinity: {
      ...plain.crystallinity,
      ...Object.fromEntries(Object.entries(kinetics).map(([name, value]) => [name, set(value)])),
    },
  });
}

/** Layers of one object, 0.2 mm high, 100 mm² with an outline of 100 mm, 20 s each, or as given for each. */
export function layersOf(count: number, each: (i: number) => Partial<PredictionLayer> = () => ({})): PredictionLayer[] {
  let topMm = 0;
  return Array.from({ length: count }, (_, i) => {
    const layer = {
      index: i + 1,
      object: 1,
      zMm: 0,
      heightMm: 0.2,
      timeS: 20,
      areaMm2: 100,
      outlineMm: 100,
      nozzleC: 390,
      bedC: 140,
      waits: [],
      ...each(i),
    };
    topMm += layer.heightMm;
    return { ...layer, zMm: layer.zMm || topMm };
  });
}

/** The same duty on every layer, or a duty by layer. */
export function duties(
  count: number,
  fan: number | ((i: number) => number),
  lamp: number | ((i: number) => number),
): ChannelDuties[] {
  const all = (duty: number | ((i: number) => number)) =>
    Float64Array.from({ length: count }, (_, i) => (typeof duty === "number" ? duty : duty(i)));
  return [
    { id: "part-fan", leadS: 0, duty: all(fan) },
    { id: "lamp", leadS: 0, duty: all(lamp) },
  ];
}
