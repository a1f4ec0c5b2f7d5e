import type { Polymer } from "#shared/formats/polymer.ts";
import { findRemedy } from "#shared/plan/hold/remedy.ts";
import type { HoldCase, Outcome } from "#shared/plan/hold/solver.ts";
import { layerPlacer, type PlacedLayer } from "#shared/plan/layer-placer.ts";
import { type LayerRun, LayerRuns, runText } from "#shared/plan/layer-runs.ts";
import type { Advice, HoldAdviceCode } from "#shared/plan/plan.ts";
import { dutyText } from "#shared/plan/quantity-text.ts";

/** A layer this far outside its window is worth a word, K. */
const OUTSIDE_C = 1;

/** Remedies take a search each; runs beyond these are told without one. */
const MOST_REMEDIES = 6;

/** A run of layers that miss the same thing, and the worst of them. */
interface Missed {
  code: HoldAdviceCode;
  run: LayerRun;
  worst: number;
}

/** Names every held layer that does not get what it should, with what binds it and what would help. */
export function holdAdvice(hold: HoldCase, outcome: Outcome, polymer: Polymer): Advice[] {
  const missed = missedRuns(hold, outcome);
  return missed.map(({ code, run, worst }, k) => {
    const found = SAYS[code](hold, outcome, worst);
    const binds = code === "hold-elsewhere" ? "" : `; ${bindingReason(hold, outcome, code, worst)}`;
    const remedy = k < MOST_REMEDIES ? findRemedy(hold, code, worst, polymer) : "";
    return {
      layer: run.first,
      code,
      message: `${runText(run)}: ${found}${binds}.${allTheSame(hold, outcome, code, worst)}${remedy}`,
    };
  });
}

function missedRuns(hold: HoldCase, { results }: Outcome): Missed[] {
  const placeAt = layerPlacer(hold.layers, hold.profile.zones);
  const runs = new Map<HoldAdviceCode, LayerRuns>();
  const worst = new Map<LayerRun, { position: number; amount: number }>();
  hold.layers.forEach((_, p) => {
    const placed = placeAt(p);
    const found = whatIsMissed(hold, results, placed);
    if (!found) return;
    let list = runs.get(found.code);
    if (!list) {
      list = new LayerRuns();
      runs.set(found.code, list);
    }
    list.note(placed, found.amount);
    const run = list.runs[list.runs.length - 1];
    const so = worst.get(run);
    if (!so || found.amount > so.amount) worst.set(run, { position: p, amount: found.amount });
  });
  const all = [...runs].flatMap(([code, list]) =>
    list.runs.map((run) => ({ code, run, worst: worst.get(run)!.position })),
  );
  return all.sort((a, b) => a.run.first - b.run.first);
}

/** The first thing that a layer misses, and by how much in its own measure. */
function whatIsMissed(
  { zone, levers, goals, targets, margins, model, profile }: HoldCase,
  results: Outcome["results"],
  { position: p, rank }: PlacedLayer,
): { code: HoldAdviceCode; amount: number } | undefined {
  const { state, share } = targets[p];
  const lever = levers[zone[p]];
  if (lever.length === 0 || Number.isNaN(share)) return undefined;
  if (rank <= profile.bedLayers.count && [...lever.fans, ...lever.lamps].some(({ id }) => id in profile.bedLayers.duty))
    return { code: "hold-elsewhere", amount: 0 };
  const tempC = results.interlayerC[p];
  const solid = !Number.isNaN(results.timeToSolidS[p]);
  const crystallinity = results.crystallinity[p];
  const { weldAboveC } = model.material;
  if (!solid) return { code: "hold-not-solid", amount: tempC };
  if (tempC < goals.lowC[p] - OUTSIDE_C) return { code: "hold-too-cold", amount: goals.lowC[p] - tempC };
  // A warm layer that keeps its shape because it has crystallised is as it should be.
  if (tempC > goals.highC[p] + OUTSIDE_C && state !== "semi-crystalline")
    return { code: "hold-too-warm", amount: tempC - goals.highC[p] };
  const isOnPart = p > 0 && model.layers.object[p - 1] === model.layers.object[p];
  if (isOnPart && results.contactC[p] < weldAboveC)
    return { code: "hold-no-weld", amount: weldAboveC - results.contactC[p] };
  if (state === "amorphous" && crystallinity > margins.maxCrystallinity)
    return { code: "hold-crystalline", amount: crystallinity };
  if (state === "semi-crystalline" && crystallinity < margins.minCrystallinity)
    return { code: "hold-not-crystalline", amount: margins.minCrystallinity - crystallinity };
  return undefined;
}

type Says = (hold: HoldCase, outcome: Outcome, p: number) => string;

const degrees = (value: number): string => `${Math.round(value)} °C`;
const percent = (share: number): string => `${(share * 100).toFixed(share < 0.1 ? 1 : 0)} %`;

const SAYS: Record<HoldAdviceCode, Says> = {
  "hold-too-warm": ({ goals }, { results }, p) =>
    `${degrees(results.interlayerC[p])} before the next layer comes, above the window up to ${degrees(goals.highC[p])}`,
  "hold-too-cold": ({ goals }, { results }, p) =>
    `${degrees(results.interlayerC[p])} before the next layer comes, below the window from ${degrees(goals.lowC[p])}`,
  "hold-not-solid": ({ model }, { results }, p) =>
    `not solid when the nozzle returns: ${degrees(results.interlayerC[p])}, and the shape holds below ${degrees(model.material.solidBelowC)}`,
  "hold-no-weld": ({ model }, { results }, p) =>
    `the contact with the layer below is at ${degrees(results.contactC[p])}, and welding takes ${degrees(model.material.weldAboveC)}`,
  "hold-crystalline": ({ margins }, { results }, p) =>
    `crystallinity ${percent(results.crystallinity[p])}, above the ${percent(margins.maxCrystallinity)} of an amorphous layer`,
  "hold-not-crystalline": ({ margins }, { results }, p) =>
    `crystallinity ${percent(results.crystallinity[p])}, below the ${percent(margins.minCrystallinity)} of a semi-crystalline layer`,
  "hold-elsewhere": () => "a bed layer with duties of its own, which are not solved from the target",
};

/** The window is where a state is worked for; what counts is the state. */
function allTheSame({ targets, margins }: HoldCase, { results }: Outcome, code: HoldAdviceCode, p: number): string {
  const { state } = targets[p];
  const reached = results.crystallinity[p];
  if (code === "hold-too-cold" && state === "semi-crystalline" && reached >= margins.minCrystallinity)
    return ` Its crystallinity is predicted at ${percent(reached)} all the same, which is enough.`;
  if (code === "hold-too-warm" && state === "amorphous" && reached <= margins.maxCrystallinity)
    return ` Its crystallinity is predicted at ${percent(reached)} all the same, which is little enough.`;
  return "";
}

const NEEDS_WARMTH: readonly HoldAdviceCode[] = ["hold-too-cold", "hold-no-weld", "hold-not-crystalline"];

/** Whether lamps fall from here on, layer by layer, down to a layer that is to be colder. */
function isSteppingAhead({ levers, zone, targets }: HoldCase, plan: Outcome["plan"], p: number): boolean {
  const { lamps } = levers[zone[p]];
  const falls = (q: number) => lamps.some(({ id }) => plan.layers[q + 1].duty[id] < plan.layers[q].duty[id]);
  let q = p;
  while (q + 1 < targets.length && targets[q + 1].share >= targets[p].share && falls(q)) q++;
  return q + 1 < targets.length && targets[q + 1].share < targets[p].share && falls(q);
}

/** Why the lever could not do more. */
function bindingReason(hold: HoldCase, { plan, wanted, results }: Outcome, code: HoldAdviceCode, p: number): string {
  const { levers, zone, goals } = hold;
  const warmer = NEEDS_WARMTH.includes(code);
  const { fans, lamps } = levers[zone[p]];
  const duty = (id: string): number => plan.layers[p].duty[id];
  const behind = [...fans, ...lamps].find(({ id }) => Math.abs(wanted.get(id)![p] - duty(id)) > 0.03);
  if (behind)
    return `its duties follow their limits or a ramp: ${behind.id} is at ${dutyText(duty(behind.id))} instead of ${dutyText(wanted.get(behind.id)![p])}`;
  if (warmer && isSteppingAhead(hold, plan, p)) return "its duties step down ahead of a colder state above it";
  const ends = [
    ...lamps.map(({ id, low, high }) => ({ id, end: warmer ? high : low, word: warmer ? "highest" : "lowest" })),
    ...fans.map(({ id, low, high }) => ({ id, end: warmer ? low : high, word: warmer ? "lowest" : "highest" })),
  ];
  if (ends.every(({ id, end }) => Math.abs(duty(id) - end) < 0.02))
    return ends.map(({ id, end, word }) => `${id} is at its ${word}, ${dutyText(end)}`).join(", ");
  const inWindow =
    results.interlayerC[p] >= goals.lowC[p] - OUTSIDE_C && results.interlayerC[p] <= goals.highC[p] + OUTSIDE_C;
  if (inWindow) return "the layers around it keep it there, or its time in the window is too short";
  return warmer ? "the layers below take the heat" : "the layers below still give heat";
}
