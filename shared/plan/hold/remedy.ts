import type { Polymer } from "#shared/formats/polymer.ts";
import type { HoldCase } from "#shared/plan/hold/solver.ts";
import { type Steady, steadyLayer } from "#shared/plan/hold/steady.ts";
import type { HoldAdviceCode } from "#shared/plan/plan.ts";
import { dutyText, tenthsText } from "#shared/plan/quantity-text.ts";

/** Layer times are looked for from a tenth of the layer's own to thirty times as long. */
const LONGEST = 30;
const SHORTEST = 0.1;
const HALVINGS = 7;
/** What is proposed gets this far inside, since a part is never made of like layers alone. */
const SPARE_C = 2;
const SPARE = 0.1;
/** So far up a thin wall the bed's temperature is felt: the decay length of a 1.2 mm wall at 30 W/m²K (REFERENCE H19), mm. */
const BED_REACH_MM = 2.3;

/**
 * The smallest change that would do, tried out on a part made of such layers: another layer time, or duties beyond what
 * machine and profile allow.
 */
export function findRemedy(hold: HoldCase, code: HoldAdviceCode, p: number, polymer: Polymer): string {
  const { layers, machine, model, levers, zone } = hold;
  const { timeS, zMm } = layers[p];
  if (code === "hold-elsewhere" || !(timeS > 0)) return "";
  const lever = levers[zone[p]];
  const colder = NEEDS_COLD.includes(code);
  const end = colder ? 0 : lever.length;
  const reached = goalOf(hold, code, p);
  const like = { ...layers[p], ...asModelled(model, p), waits: [] };
  const tryWith = (seconds: number, duties: ReadonlyMap<string, number>): boolean =>
    reached(steadyLayer({ ...like, timeS: seconds }, duties, { machine, polymer }));
  // Crystals grow fastest somewhere between: all the heat there is may be too much for them.
  const places = code === "hold-not-crystalline" ? [end, lever.rest] : [end];
  const tryTime = (seconds: number): boolean => places.some((at) => tryWith(seconds, new Map(lever.duties(at))));
  if (tryTime(timeS))
    return zMm < BED_REACH_MM
      ? ` Further from the bed such layers get there: a ${colder ? "cooler" : "warmer"} bed would do.`
      : " A run of such layers would get there: allow larger changes from layer to layer, or begin the zone earlier.";
  const tryDuty = (id: string, duty: number): boolean => tryWith(timeS, new Map([...lever.duties(end), [id, duty]]));
  const found = [needsTime(timeS, tryTime), needsDuty(colder ? lever.fans : lever.lamps, tryDuty)];
  const said = found.filter((text) => text !== "");
  return said.length === 0 ? " No layer time and no duty alone would do." : ` ${said.join(" ")}`;
}

/** What is put right by less heat; all else by more of it. */
const NEEDS_COLD: readonly HoldAdviceCode[] = ["hold-too-warm", "hold-not-solid", "hold-crystalline"];

/** The layer with what the model assumes where the file is silent. */
const asModelled = ({ layers }: HoldCase["model"], p: number) => ({
  areaMm2: layers.areaM2[p] * 1e6,
  outlineMm: layers.outlineM[p] * 1e3,
  nozzleC: layers.depositC[p],
  bedC: layers.bedC[p],
});

function goalOf({ goals, margins, model }: HoldCase, code: HoldAdviceCode, p: number): (steady: Steady) => boolean {
  const { weldAboveC } = model.material;
  switch (code) {
    case "hold-too-warm":
      return ({ interlayerC }) => interlayerC <= goals.highC[p] - SPARE_C;
    case "hold-not-solid":
      return ({ solid }) => solid;
    case "hold-crystalline":
      return ({ crystallinity }) => crystallinity <= margins.maxCrystallinity * (1 - SPARE);
    case "hold-too-cold":
      return ({ interlayerC }) => interlayerC >= goals.lowC[p] + SPARE_C;
    case "hold-no-weld":
      return ({ interlayerC }) => (interlayerC + model.layers.depositC[p]) / 2 >= weldAboveC;
    default:
      return ({ crystallinity, solid }) => solid && crystallinity >= margins.minCrystallinity * (1 + SPARE);
  }
}

function needsTime(timeS: number, reaches: (timeS: number) => boolean): string {
  const end = [LONGEST, SHORTEST].find((multiple) => reaches(timeS * multiple));
  if (end === undefined) return "";
  const multiple = least(
    1,
    end,
    (no, yes) => Math.sqrt(no * yes),
    (middle) => reaches(timeS * middle),
  );
  const needed = tenthsText(timeS * multiple);
  const own = tenthsText(timeS);
  if (multiple < 1)
    return `A layer time of at most ${needed} s instead of ${own} s would do: print fewer parts at once, or faster.`;
  return `A layer time of at least ${needed} s instead of ${own} s would do: print ${Math.ceil(multiple)} parts at once, or slow the layer down.`;
}

/** A channel that may have less than full: how much more of it would do. */
function needsDuty(
  channels: readonly { id: string; high: number }[],
  reaches: (id: string, duty: number) => boolean,
): string {
  const limited = channels.find(({ high }) => high < 1);
  if (!limited || !reaches(limited.id, 1)) return "";
  const duty = least(
    limited.high,
    1,
    (no, yes) => (no + yes) / 2,
    (middle) => reaches(limited.id, middle),
  );
  return `${limited.id} at ${dutyText(duty)} would do, and may have at most ${dutyText(limited.high)}.`;
}

/** The value nearest to `no` that still does, between one that doesn't and one that does. */
function least(
  no: number,
  yes: number,
  middleOf: (no: number, yes: number) => number,
  does: (value: number) => boolean,
): number {
  for (let k = 0; k < HALVINGS; k++) {
    const middle = middleOf(no, yes);
    if (does(middle)) yes = middle;
    else no = middle;
  }
  return yes;
}
