import { expect, test } from "vitest";
import { planDuties } from "#shared/plan/plan-duties.ts";
import { predictPlan } from "#shared/plan/predict-plan.ts";
import { Forecaster } from "#src/features/prediction/worker/forecaster.ts";
import type { Forecast, Levers, Part, Reply } from "#src/features/prediction/worker/messages.ts";
import { cardOf } from "#tests/src/features/prediction/predictions.ts";
import { layersOf } from "#tests/src/layer-log/layers.ts";
import { machineOf, profileOf } from "#tests/src/profile-editor/profiles.ts";

const part: Part = { layers: layersOf(45), machine: machineOf(), polymer: cardOf("peek") };
const resultOf = <Result>(reply: Reply): Result => {
  if (!("result" in reply)) throw new Error(JSON.stringify(reply));
  return reply.result as unknown as Result;
};

test("the worker predicts what the shared code does for the same plan", () => {
  const profile = profileOf();
  const plan = planDuties({ ...part, profile });
  const expected = predictPlan({ ...part, layers: part.layers, profile, plan, band: true });
  const { prediction, solved } = resultOf<Forecast>(
    new Forecaster().answer({ part, ask: { kind: "forecast", profile, band: true } }),
  );
  expect(prediction).toEqual(expected);
  expect(solved).toBeUndefined();
});

test("the part is remembered, and a plan that stands already is taken as it is", () => {
  const forecaster = new Forecaster();
  const profile = profileOf();
  const planned = resultOf<Forecast>(forecaster.answer({ part, ask: { kind: "forecast", profile, band: false } }));
  const hot = planDuties({ ...part, profile });
  for (const layer of hot.layers) layer.duty = { "part-fan": 0, lamp: 0.85 };
  const given = resultOf<Forecast>(forecaster.answer({ ask: { kind: "forecast", profile, plan: hot, band: false } }));
  const warmer = given.prediction.layers.map(
    ({ interlayerC }, i) => interlayerC - planned.prediction.layers[i].interlayerC,
  );
  expect(Math.min(...warmer.slice(5))).toBeGreaterThan(1);
  expect(given.prediction.layers[0].band).toBeNull();
});

test("of a profile that holds the solved plan comes back too", () => {
  const profile = profileOf();
  profile.zones[1].heating = [{ channel: "lamp", rule: "hold" }];
  const { solved, prediction } = resultOf<Forecast>(
    new Forecaster().answer({ part, ask: { kind: "forecast", profile, band: false } }),
  );
  expect(solved?.layers).toHaveLength(45);
  expect(solved?.layers[40].reason.lamp.length).toBeGreaterThan(0);
  expect(prediction.layers).toHaveLength(45);
});

test("the heat of a layer balances", () => {
  const forecaster = new Forecaster();
  forecaster.answer({ part, ask: { kind: "forecast", profile: profileOf(), band: false } });
  const heat = resultOf<Record<string, number>>(forecaster.answer({ ask: { kind: "balance", position: 20 } }));
  const comes = heat.lostJ + heat.fromLampJ + heat.fromCrystallisingJ;
  expect(comes).toBeCloseTo(heat.toAirJ + heat.radiatedJ + heat.toBelowJ, 3);
  expect(heat.timeS).toBeCloseTo(part.layers[20].timeS, 6);
});

test("more lamp warms and more fan cools, all over the map of the levers", () => {
  const { timeS, heightMm, areaMm2, outlineMm } = part.layers[20];
  const duties = [0, 0.3, 0.8];
  const { interlayerC } = resultOf<Levers>(
    new Forecaster().answer({
      part,
      ask: {
        kind: "levers",
        layer: { timeS, heightMm, areaMm2, outlineMm, nozzleC: 400 },
        fan: "part-fan",
        lamp: "lamp",
        fanDuties: duties,
        lampDuties: duties,
        others: {},
      },
    }),
  );
  for (let a = 0; a < 3; a++) {
    for (let b = 0; b < 2; b++) {
      expect(interlayerC[(b + 1) * 3 + a]).toBeGreaterThan(interlayerC[b * 3 + a]);
      expect(interlayerC[a * 3 + b]).toBeGreaterThan(interlayerC[a * 3 + b + 1]);
    }
  }
});

test("what can't be predicted is a refusal with a remedy, not a fault", () => {
  const low = profileOf({ zones: [{ ...profileOf().zones[0] }] });
  const reply = new Forecaster().answer({ part, ask: { kind: "forecast", profile: low, band: false } });
  expect(reply).toMatchObject({ refusal: { code: "zone-missing" } });
});

test("a question before there is a part is a fault of ours", () => {
  expect(new Forecaster().answer({ ask: { kind: "balance", position: 1 } })).toEqual({
    fault: "asked before there was a part",
  });
});
