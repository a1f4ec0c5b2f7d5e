import { expect, test } from "vitest";
import { heatBalance } from "#shared/prediction/heat-balance.ts";
import { RESULT_NAMES } from "#shared/prediction/layer-results.ts";
import { startMarch } from "#shared/prediction/march.ts";
import { makeModel } from "#shared/prediction/model.ts";
import { duties, layersOf, machineWith, polymerWith } from "#tests/shared/prediction/parts.ts";

const COUNT = 90;
const model = makeModel({
  layers: layersOf(COUNT, (i) => ({ timeS: 8 + (i % 5) })),
  machine: machineWith({}, { fan: { settleS: 2 }, lamp: { settleS: 3 } }),
  polymer: polymerWith(),
});

test("a march goes on from a saved one as if nothing had been tried in between", () => {
  const given = duties(COUNT, 0.2, 0.5);
  const straight = startMarch(model, given).run();
  const march = startMarch(model, given);
  const lamp = given[1].duty;
  let saved = march.save();
  while (march.next < COUNT) {
    saved = march.save(saved);
    const at = march.next;
    const kept = lamp[at];
    lamp[at] = 1;
    for (let ahead = 0; ahead < 4 && march.next < COUNT; ahead++) march.layer();
    lamp[at] = kept;
    march.restore(saved);
    march.layer();
  }
  march.finish();
  for (const name of RESULT_NAMES) expect([...march.results[name]]).toEqual([...straight[name]]);
});

test("relative crystallinity of a layer can be asked for at any time", () => {
  const march = startMarch(model, duties(COUNT, 0, 1));
  for (let k = 0; k < 60; k++) march.layer();
  const now = [5, 30, 58].map((p) => march.relative(p));
  march.layer();
  expect(march.relative(5)).toBeGreaterThanOrEqual(now[0]);
  expect(now[0]).toBeGreaterThan(0.9);
  expect(now[2]).toBeGreaterThan(0);
});

test("duties are commanded earlier by their lead, over several layers if need be", () => {
  const stepAt = (leadS: number) => {
    const given = duties(COUNT, 0, (i) => (i >= 50 ? 1 : 0));
    given[1].leadS = leadS;
    return startMarch(model, given).run().interlayerC;
  };
  const [plain, early, muchEarlier] = [stepAt(0), stepAt(9), stepAt(40)];
  expect(early[47]).toBe(plain[47]);
  expect(early[49]).toBeGreaterThan(plain[49] + 5);
  expect(muchEarlier[46]).toBeGreaterThan(plain[46] + 5);
  expect(muchEarlier[44]).toBe(plain[44]);
});

test("the heat of one layer adds up, to a millionth of what it lost", () => {
  for (const at of [0, 1, 40]) {
    const { lostJ, fromLampJ, fromCrystallisingJ, toAirJ, radiatedJ, toBelowJ, timeS } = heatBalance(
      model,
      duties(COUNT, 0.3, 0.6),
      at,
    );
    expect(timeS).toBeCloseTo(8 + (at % 5), 9);
    for (const part of [lostJ, fromLampJ, toAirJ, radiatedJ]) expect(part).toBeGreaterThan(0);
    expect(Math.abs(lostJ + fromLampJ + fromCrystallisingJ - toAirJ - radiatedJ - toBelowJ)).toBeLessThan(2e-6 * lostJ);
  }
});

test("a finished object cools by itself, and the next one begins on the bed", () => {
  const layers = layersOf(40, (i) => ({ object: i < 20 ? 1 : 2, zMm: 0.2 * (1 + (i % 20)) }));
  const results = startMarch(
    makeModel({ layers, machine: machineWith(), polymer: polymerWith() }),
    duties(40, 0, 0.3),
  ).run();
  for (let p = 0; p < 20; p++) {
    expect(results.interlayerC[p + 20]).toBeCloseTo(results.interlayerC[p], 6);
    expect(results.contactC[p + 20]).toBeCloseTo(results.contactC[p], 6);
  }
  expect(results.highestReheatC[19]).toBeNaN();
  expect(results.highestReheatC[39]).toBeNaN();
  expect(results.highestReheatC[18]).toBeGreaterThan(150);
  // Without lamp light it cools faster than the lower half of a part of 40 layers.
  expect(results.crystallinity[10]).toBeGreaterThan(0);
});
