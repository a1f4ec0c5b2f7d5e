import type { Machine } from "#shared/formats/machine.ts";
import type { Wait } from "#shared/layers/reading.ts";
import type { Material } from "#shared/polymers/material.ts";
import type { PredictionLayer } from "#shared/prediction/model.ts";
import type { Surroundings } from "#shared/thermal/surroundings.ts";

/** Layers as columns of numbers in SI units, by position in print order. */
export interface LayerTable {
  count: number;
  object: Float64Array;
  heightM: Float64Array;
  areaM2: Float64Array;
  outlineM: Float64Array;
  depositC: Float64Array;
  bedC: Float64Array;
  /** air at the layer's middle, before the lamps have warmed it */
  airC: Float64Array;
  /** own time, then waits of which pauses leave lamps at their idle duty, s */
  timeS: Float64Array;
  waitS: Float64Array;
  pauseS: Float64Array;
  /** on a clock that starts with the first layer and counts waits, s */
  beginS: Float64Array;
  /** by heater: the duty it falls back to at pauses */
  idleDuty: ReadonlyMap<string, number>;
}

/** Something that had to be assumed, and from which layer on. */
export interface Note {
  layer: number;
  code: NoteCode;
  message: string;
}

export type NoteCode =
  | "wait-estimated"
  | "nozzle-assumed"
  | "bed-assumed"
  | "area-assumed"
  | "outline-assumed"
  | "height-assumed"
  | "time-assumed";

/** Estimates for waits whose length no file tells, s. From memory of the trade, no source. Dwells are in the print time. */
const WAIT_S: Record<Wait["kind"], number> = { temperature: 60, home: 15, tool: 30, pause: 300, dwell: 0 };

/** Where no set-point is known, a nozzle this far above Tm (or above Tg, for an amorphous polymer), K. */
const NOZZLE_ABOVE_TM_C = 40;
const NOZZLE_ABOVE_TG_C = 150;

/** No bead is smaller, mm², and no wall thinner: two faces over 0.1 mm, 1/mm. What is beyond is a slip of the file. */
const LEAST_AREA_MM2 = 0.01;
const MOST_OUTLINE_PER_AREA = 20;

const FALLBACK = { heightMm: 0.2, areaMm2: 100 };

/** Takes what is missing or impossible from the layer before, or from a stated assumption, and notes it once. */
export function layerTable(
  layers: readonly PredictionLayer[],
  machine: Machine,
  material: Material,
  { roomAirC, bedAirRiseC, bedAirDecayMm }: Surroundings,
): { table: LayerTable; notes: Note[] } {
  const count = layers.length;
  const column = () => new Float64Array(count);
  const heaters = machine.channels.filter(({ kind }) => kind === "heater");
  const table: LayerTable = {
    count,
    object: column(),
    heightM: column(),
    areaM2: column(),
    outlineM: column(),
    depositC: column(),
    bedC: column(),
    airC: column(),
    timeS: column(),
    waitS: column(),
    pauseS: column(),
    beginS: column(),
    idleDuty: new Map(heaters.map(({ id, idleDuty }) => [id, idleDuty])),
  };
  const notes = new Map<NoteCode, Note>();
  const note = (code: NoteCode, layer: number, message: string) => {
    if (!notes.has(code)) notes.set(code, { layer, code, message });
  };

  const assumedNozzleC = material.tmC === null ? material.tgC + NOZZLE_ABOVE_TG_C : material.tmC + NOZZLE_ABOVE_TM_C;
  let { heightMm, areaMm2 } = FALLBACK;
  let nozzleC: number | null = null;
  let bedC: number | null = null;
  let clockS = 0;
  layers.forEach((layer, p) => {
    const { index } = layer;
    if (layer.heightMm > 0 && Number.isFinite(layer.heightMm)) heightMm = layer.heightMm;
    else note("height-assumed", index, `Layer ${index} has no height; ${heightMm} mm is taken.`);
    if (layer.areaMm2 >= LEAST_AREA_MM2 && Number.isFinite(layer.areaMm2)) areaMm2 = layer.areaMm2;
    else note("area-assumed", index, `Layer ${index} has no area of its own; ${areaMm2.toFixed(1)} mm² is taken.`);
    const hasOutline = layer.outlineMm > 0 && layer.outlineMm <= MOST_OUTLINE_PER_AREA * areaMm2;
    const outlineMm = hasOutline ? layer.outlineMm : 4 * Math.sqrt(areaMm2);
    if (!hasOutline)
      note(
        "outline-assumed",
        index,
        `Layer ${index} has no outline that goes with its area; that of a square of its area is taken.`,
      );
    // A set-point of 0 switches a heater off: the last one above it is what the material came with.
    if (layer.nozzleC !== null && layer.nozzleC > 0) nozzleC = layer.nozzleC;
    if (nozzleC === null)
      note("nozzle-assumed", index, `No nozzle temperature is known; ${assumedNozzleC} °C is taken.`);
    if (layer.bedC !== null) bedC = layer.bedC;
    if (bedC === null)
      note("bed-assumed", index, "No bed temperature is known; the bed is taken to be as warm as the room.");
    const timeKnown = layer.timeS >= 0 && Number.isFinite(layer.timeS);
    if (!timeKnown) note("time-assumed", index, `Layer ${index} has no time; 0 s is taken.`);
    const waits = waitSeconds(layer.waits);
    if (waits.estimated)
      note(
        "wait-estimated",
        index,
        `From layer ${index} on there are waits of unknown length; ${WAIT_S.pause} s are taken for a pause, ${WAIT_S.temperature} s for heating, ${WAIT_S.tool} s for a tool change, ${WAIT_S.home} s for homing.`,
      );

    table.object[p] = layer.object;
    table.heightM[p] = heightMm / 1e3;
    table.areaM2[p] = areaMm2 / 1e6;
    table.outlineM[p] = outlineMm / 1e3;
    table.depositC[p] = nozzleC ?? assumedNozzleC;
    table.bedC[p] = Math.max(bedC ?? roomAirC, roomAirC);
    const middleMm = Number.isFinite(layer.zMm) ? Math.max(0, layer.zMm - heightMm / 2) : 0;
    table.airC[p] = roomAirC + bedAirRiseC * Math.exp(-middleMm / bedAirDecayMm);
    table.timeS[p] = timeKnown ? layer.timeS : 0;
    table.waitS[p] = waits.otherS;
    table.pauseS[p] = waits.pauseS;
    table.beginS[p] = clockS;
    clockS += table.timeS[p] + waits.otherS + waits.pauseS;
  });
  return { table, notes: [...notes.values()] };
}

function waitSeconds(waits: readonly Wait[]) {
  const sums = { otherS: 0, pauseS: 0, estimated: false };
  for (const { kind, seconds } of waits) {
    if (kind === "dwell") continue;
    if (seconds === null) sums.estimated = true;
    sums[kind === "pause" ? "pauseS" : "otherS"] += Math.max(0, seconds ?? WAIT_S[kind]);
  }
  return sums;
}
