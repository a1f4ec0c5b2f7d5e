import type { Polymer } from "#shared/formats/polymer.ts";
import type { HoldCase } from "#shared/plan/hold/solver.ts";
import { type Steady, steadyLayer } from "#shared/plan/hold/steady.ts";
import type { HoldAdviceCode, PlanLayer } from "#shared/plan/plan.ts";
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
 * machine and profile allow. Empty where neither helps alone.
 */
export function findRemedy(hold: HoldCase, code: HoldAdviceCode, p: number, polymer: Polymer): string {
  if (code === "hold-elsewhere") return "";
  const { layers, machine, model, levers, zone } = hold;
  const layer = layers[p];
  if (!(layer.timeS > 0)) return "";
  const lever = levers[zone[p]];
  const reached = goalOf(hold, code, p);
  const subject = { ...layer, areaMm2: model.layers.areaM2[p] * 1e6, outlineMm: model.layers.outlineM[p] * 1e3 };
  const like = { ...subject, nozzleC: model.layers.depositC[p], bedC: model.layers.bedC[p], waits: [] };
  const place = [...EXTREME[code]].map((end) => (end === "cold" ? 0 : end === "warm" ? lever.length : lever.rest));
  const tryTime = (timeS: number): boolean =>
    place.some((at) => reached(steadyLayer({ ...like, timeS }, new Map(lever.duties(at)), { machine, polymer })));
  if (tryTime(layer.timeS))
    return layer.zMm < BED_REACH_MM
      ? ` Further from the bed such layers get there: a ${EXTREME[code][0] === "cold" ? "cooler" : "warmer"} bed would do.`
      : " A run of such layers would get there: allow larger changes from layer to layer, or begin the zone earlier.";
  const found = [needsTime(layer, tryTime), needsDuty()].filter((text) => text !== "");
  return found.length === 0 ? " No layer time and no duty alone would do." : ` ${found.join(" ")}`;

  function needsDuty(): string {
    const beyond = beyondLimits(hold, p, EXTREME[code][0] === "cold");
    if (!beyond) return "";
    const duties = new Map([...lever.duties(place[0]), [beyond.id, beyond.limit]]);
    if (!reached(steadyLayer(like, duties, { machine, polymer }))) return "";
    let [no, yes] = [beyond.now, beyond.limit];
    for (let k = 0; k < HALVINGS; k++) {
      const middle = (no + yes) / 2;
      duties.set(beyond.id, middle);
      if (reached(steadyLayer(like, duties, { machine, polymer }))) yes = middle;
      else no = middle;
    }
    return `${beyond.id} at ${dutyText(yes)} would do, and may have at most ${dutyText(beyond.now)}.`;
  }
}

/** Ends of the lever at which a remedy is looked for. */
const EXTREME: Record<Exclude<HoldAdviceCode, "hold-elsewhere">, readonly ("cold" | "warm" | "rest")[]> &
  Record<"hold-elsewhere", readonly "rest"[]> = {
  "hold-too-warm": ["cold"],
  "hold-not-solid": ["cold"],
  "hold-crystalline": ["cold"],
  "hold-too-cold": ["warm"],
  "hold-no-weld": ["warm"],
  "hold-not-crystalline": ["warm", "rest"],
  "hold-elsewhere": ["rest"],
};

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

function needsTime({ timeS }: PlanLayer, reaches: (timeS: number) => boolean): string {
  const end = [LONGEST, SHORTEST].find((multiple) => reaches(timeS * multiple));
  if (end === undefined) return "";
  let [no, yes] = [1, end];
  for (let k = 0; k < HALVINGS; k++) {
    const middle = Math.sqrt(no * yes);
    if (reaches(timeS * middle)) yes = middle;
    else no = middle;
  }
  const needed = tenthsText(timeS * yes);
  const own = tenthsText(timeS);
  if (yes < 1)
    return `A layer time of at most ${needed} s instead of ${own} s would do: print fewer parts at once, or faster.`;
  return `A layer time of at least ${needed} s instead of ${own} s would do: print ${Math.ceil(yes)} parts at once, or slow the layer down.`;
}

/** A channel whose limit lies within what an output can do: up to full for a fan that cools or a lamp that heats. */
function beyondLimits({ levers, zone }: HoldCase, p: number, colder: boolean) {
  const { fans, lamps } = levers[zone[p]];
  const channel = (colder ? fans : lamps).find(({ high }) => high < 1);
  return channel && { id: channel.id, now: channel.high, limit: 1 };
}
