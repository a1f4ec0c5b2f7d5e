import { describe, expect, test } from "vitest";
import { startMarch } from "#shared/prediction/march.ts";
import { makeModel } from "#shared/prediction/model.ts";
import { duties, layersOf, machineWith, polymerWith } from "#tests/shared/prediction/parts.ts";

const COUNT = 300;
const machine = machineWith();

function both(timeS: number, areaMm2: number, lamp: (i: number) => number) {
  const layers = layersOf(COUNT, (i) => ({
    timeS,
    areaMm2: areaMm2 * (1 + 0.4 * Math.sin(i / 30)),
    outlineMm: 3 * Math.sqrt(areaMm2),
  }));
  return [true, false].map((coarsen) => {
    const march = startMarch(makeModel({ layers, machine, polymer: polymerWith(), coarsen }), duties(COUNT, 0.1, lamp));
    let nodes = 0;
    while (march.next < COUNT) {
      march.layer();
      nodes = Math.max(nodes, march.column.count);
    }
    march.finish();
    return { results: march.results, nodes };
  });
}

describe("blocks deep inside the part change nothing that shows", () => {
  test.each([
    [2, 100],
    [20, 100],
    [20, 2_000],
    [100, 2_000],
  ])(
    "layers of %d s and about %d mm², the lamp changing slowly: to 0.1 K and 0.025 of crystallinity",
    (timeS, area) => {
      const [blocks, nodes] = both(timeS, area, (i) => 0.3 + 0.2 * Math.sin(i / 60));
      expect(blocks.nodes).toBeLessThan(90);
      expect(nodes.nodes).toBe(COUNT);
      for (let p = 0; p < COUNT; p++) {
        expect(Math.abs(blocks.results.interlayerC[p] - nodes.results.interlayerC[p])).toBeLessThan(0.1);
        expect(Math.abs(blocks.results.crystallinity[p] - nodes.results.crystallinity[p])).toBeLessThan(0.025);
      }
    },
  );

  test("where the lamp jumps every 50 layers: the same", () => {
    const [blocks, nodes] = both(20, 2_000, (i) => (i % 100 < 50 ? 0.7 : 0.1));
    for (let p = 0; p < COUNT; p++) {
      expect(Math.abs(blocks.results.interlayerC[p] - nodes.results.interlayerC[p])).toBeLessThan(0.1);
      expect(Math.abs(blocks.results.crystallinity[p] - nodes.results.crystallinity[p])).toBeLessThan(0.025);
    }
  });
});
