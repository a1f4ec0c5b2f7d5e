import type { Machine } from "#shared/formats/machine.ts";
import type { Margins, Profile } from "#shared/formats/profile.ts";
import { channelDuties } from "#shared/plan/channel-duties.ts";
import type { Goals } from "#shared/plan/hold/goals.ts";
import type { Lever } from "#shared/plan/hold/lever.ts";
import { layDuties } from "#shared/plan/lay-duties.ts";
import type { LayerTarget } from "#shared/plan/layer-targets.ts";
import { effectiveLimits } from "#shared/plan/limits.ts";
import type { Plan, PlanLayer } from "#shared/plan/plan.ts";
import type { Held, HeldRule } from "#shared/plan/rules.ts";
import type { LayerResults } from "#shared/prediction/layer-results.ts";
import { startMarch } from "#shared/prediction/march.ts";
import type { Model } from "#shared/prediction/model.ts";

/** All that is known before duties are solved. Lists go by position in print order. */
export interface HoldCase {
  layers: readonly PlanLayer[];
  machine: Machine;
  profile: Profile;
  model: Model;
  margins: Required<Margins>;
  targets: readonly LayerTarget[];
  /** index into the profile's zones */
  zone: readonly number[];
  /** by zone; of no length where the zone holds nothing */
  levers: readonly Lever[];
  goals: Goals;
}

/** A plan and what it is expected to do. */
export interface Outcome {
  plan: Plan;
  results: LayerResults;
  /** by channel id: the duty asked for before limits, by position */
  wanted: ReadonlyMap<string, Float64Array>;
}

const MOST_ROUNDS = 18;
/** Closer to the aim than this is close enough, K. */
const CLOSE_C = 0.75;
/** The lever is moved by at most this in one round. */
const MOST_STEP = 0.8;
/** A slope below this says that the lever hardly matters here, K for the lever's unit. */
const LEAST_SLOPE_C = 4;
/** The aim moves by this when the crystallinity is not what it should be, K; not before the temperatures have settled. */
const AIM_STEP_C = 5;
const AIM_FROM_ROUND = 3;
/** Crystallinity is brought this much past its limit, as a share of the limit. */
const SPARE = 0.1;

/**
 * Finds the lever of every layer: plan with all limits, march through the model, move each lever by what its layer is
 * away from its aim, and again. The slope is that of moving all levers together to begin with, which is more than a single
 * layer's, so that rounds close in without overshooting; then what the rounds themselves show.
 *
 * Deterministic: no clock and no chance has a say.
 */
export function solveLevers(hold: HoldCase): Outcome {
  const { targets, zone, levers, goals } = hold;
  const count = targets.length;
  const isHeld = (p: number) => levers[zone[p]].length > 0 && !Number.isNaN(goals.aimC[p]);
  const at = Float64Array.from(targets, ({ share }, p) => {
    const { rest, length } = levers[zone[p]];
    return Math.min(rest + (share > 0 ? 0.5 * share : 0), length);
  });
  let outcome = tryOut(hold, at);
  const slope = firstSlope(hold, at, outcome);
  for (let round = 0; round < MOST_ROUNDS; round++) {
    if (round >= AIM_FROM_ROUND) moveAims(hold, outcome);
    const before = { at: at.slice(), tempC: outcome.results.interlayerC.slice() };
    let moved = false;
    for (let p = 0; p < count; p++) {
      if (!isHeld(p)) continue;
      const offC = goals.aimC[p] - before.tempC[p];
      if (Math.abs(offC) < CLOSE_C || isBehind(hold, outcome, p, offC)) continue;
      const step = Math.min(Math.max(offC / slope[p], -MOST_STEP), MOST_STEP);
      const next = Math.min(Math.max(at[p] + step, 0), levers[zone[p]].length);
      moved ||= Math.abs(next - at[p]) > 1e-4;
      at[p] = next;
    }
    if (!moved && round > AIM_FROM_ROUND) break;
    outcome = tryOut(hold, at);
    learnSlope(slope, before, at, outcome.results.interlayerC);
  }
  return outcome;
}

/** What a uniform move of all levers changes, K for the lever's unit. */
function firstSlope(hold: HoldCase, at: Float64Array, { results }: Outcome): Float64Array {
  const nudged = at.map((value, p) => {
    const { length } = hold.levers[hold.zone[p]];
    return value + 0.25 <= length ? value + 0.25 : Math.max(value - 0.25, 0);
  });
  const other = tryOut(hold, nudged).results.interlayerC;
  return other.map((tempC, p) => {
    const slope = (tempC - results.interlayerC[p]) / (nudged[p] - at[p]);
    return slope > LEAST_SLOPE_C ? slope : LEAST_SLOPE_C;
  });
}

function learnSlope(
  slope: Float64Array,
  before: { at: Float64Array; tempC: Float64Array },
  at: Float64Array,
  tempC: Float64Array,
): void {
  for (let p = 0; p < slope.length; p++) {
    const moved = at[p] - before.at[p];
    if (Math.abs(moved) < 0.01) continue;
    const shown = (tempC[p] - before.tempC[p]) / moved;
    const trusted = Math.min(Math.max(shown, slope[p] / 2), slope[p] * 2);
    if (Number.isFinite(trusted)) slope[p] = Math.max((slope[p] + trusted) / 2, LEAST_SLOPE_C);
  }
}

/** The plan's limits keep the duties behind what the lever asks for already; asking for more in that direction is idle. */
function isBehind({ zone, levers }: HoldCase, { plan, wanted }: Outcome, p: number, offC: number): boolean {
  const { fans, lamps } = levers[zone[p]];
  const lag = (id: string) => wanted.get(id)![p] - plan.layers[p].duty[id];
  const limited = [...lamps.map(({ id }) => lag(id)), ...fans.map(({ id }) => -lag(id))];
  return limited.some((warmer) => Math.abs(warmer) > 0.03 && Math.sign(warmer) === Math.sign(offC));
}

/** Temperature alone decides nothing: where the crystals are not what they should be, the aim moves within what is sound. */
function moveAims({ targets, goals, margins, model }: HoldCase, { results }: Outcome): void {
  const { kinetics } = model.material;
  targets.forEach(({ state }, p) => {
    const reached = results.crystallinity[p];
    if (state === "amorphous" && reached > margins.maxCrystallinity * (1 - SPARE))
      goals.aimC[p] = Math.max(goals.aimC[p] - AIM_STEP_C, goals.lowC[p]);
    if (state !== "semi-crystalline" || kinetics === null) return;
    const solid = !Number.isNaN(results.timeToSolidS[p]);
    if (!solid) goals.aimC[p] = Math.max(goals.aimC[p] - AIM_STEP_C, goals.lowC[p]);
    else if (reached < margins.minCrystallinity * (1 + SPARE))
      goals.aimC[p] = Math.min(goals.aimC[p] + AIM_STEP_C, Math.max(kinetics.fastestAtC, goals.highC[p]));
  });
}

/** The plan with the levers at these places, and what comes of it. */
function tryOut(hold: HoldCase, at: Float64Array): Outcome {
  const { layers, machine, profile, model } = hold;
  const wanted = askedDuties(hold, at);
  const plan = layDuties(layers, machine, profile, heldRules(hold, wanted));
  const results = startMarch(model, channelDuties(plan, layers, machine, profile)).run();
  return { plan, results, wanted };
}

function askedDuties(hold: HoldCase, at: Float64Array): Map<string, Float64Array> {
  const { machine, profile, targets, zone, levers } = hold;
  const wanted = new Map<string, Float64Array>();
  for (const { id } of levers.flatMap(({ fans, lamps }) => [...fans, ...lamps]))
    wanted.set(id, new Float64Array(targets.length));
  for (let p = 0; p < at.length; p++) for (const [id, duty] of levers[zone[p]].duties(at[p])) wanted.get(id)![p] = duty;
  for (const channel of machine.channels) {
    const duty = wanted.get(channel.id);
    const { maxDutyPerLayer } = effectiveLimits(channel, profile);
    if (duty && maxDutyPerLayer < 1) stepAhead(hold, duty, channel.kind === "fan" ? -maxDutyPerLayer : maxDutyPerLayer);
  }
  return wanted;
}

/**
 * An amorphous layer that gets too warm stays spoiled, while a warm one has all the layers above it to catch up. So where a
 * cold layer follows warm ones and duties may only change so much a layer, they change before it.
 *
 * @param change largest change from layer to layer towards warm: of lamps above 0, of fans below 0
 */
function stepAhead({ targets, layers }: HoldCase, duty: Float64Array, change: number): void {
  let ahead = false;
  for (let p = duty.length - 2; p >= 0; p--) {
    const sameObject = layers[p].object === layers[p + 1].object;
    ahead = sameObject && (ahead || targets[p + 1].share < targets[p].share);
    if (!ahead) continue;
    const bound = duty[p + 1] + change;
    if (change > 0 ? duty[p] > bound : duty[p] < bound) duty[p] = bound;
    else ahead = false;
  }
}

/** The rules that the plan asks for; above its zone a rule goes on as in the zone's highest layer, for ramps. */
function heldRules({ zone, goals, targets, profile }: HoldCase, wanted: ReadonlyMap<string, Float64Array>): Held {
  const made = new Map<string, HeldRule>();
  return (channel, z) => {
    const key = `${z} ${channel}`;
    let rule = made.get(key);
    if (!rule) {
      const name = profile.zones[z].name;
      const reason = (p: number) => {
        const { state } = targets[p];
        const wish = state === "between" ? "between the two states" : state;
        return `zone ${name}: held ${wish}, aimed at ${Math.round(goals.aimC[p])} °C`;
      };
      rule = { kind: "held", duty: goOn(wanted.get(channel)!, zone, z), reason };
      made.set(key, rule);
    }
    return rule;
  };
}

function goOn(duty: Float64Array, zone: readonly number[], z: number): Float64Array {
  let last = duty[zone.indexOf(z)] ?? 0;
  return duty.map((own, p) => {
    if (zone[p] === z) last = own;
    return last;
  });
}
