import fc from "fast-check";
import { expect, test } from "vitest";
import { stackLayers } from "#src/features/layer-log/layer-stack.ts";
import { eachRun, shownPositions, traceRows, traceSeries, traceSteps } from "#src/features/layer-log/trace.ts";
import { layersOf } from "#tests/src/layer-log/layers.ts";

const viewOf = (fromMm: number, toMm: number, rows = 100) => ({ fromMm, toMm, topPx: 10, bottomPx: 10 + rows });

test("with room enough a series is a staircase: each value from its layer's bottom to its top", () => {
  const stack = stackLayers(layersOf(2));
  const trace = traceSeries([3, 5], stack, viewOf(0, 0.4));
  expect(trace).toEqual({ kind: "steps", pairs: Float64Array.of(3, 110, 3, 60, 5, 60, 5, 10) });
});

test("a layer without a value ends the stroke", () => {
  const stack = stackLayers(layersOf(3));
  const pairs = traceSteps([3, Number.NaN, 5], stack, viewOf(0, 0.6));
  expect([...pairs.subarray(4, 8)]).toEqual([Number.NaN, Number.NaN, Number.NaN, Number.NaN]);
});

test("layers beyond the view are left out, and those on its edge cut off", () => {
  const stack = stackLayers(layersOf(10));
  const view = viewOf(0.5, 0.9);
  expect(shownPositions(stack, view)).toEqual([2, 4]);
  const pairs = traceSteps([0, 1, 2, 3, 4, 5, 6, 7, 8, 9], stack, view);
  expect([pairs[1], pairs[pairs.length - 1]]).toEqual([110, 10]);
});

test("a view that begins at a border does not show the layer below", () => {
  expect(shownPositions(stackLayers(layersOf(10)), viewOf(0.4, 0.8))).toEqual([2, 3]);
});

test("5,000 layers become no more rows than there are pixels, and no row is missing", () => {
  const stack = stackLayers(layersOf(5000));
  const trace = traceSeries(
    Float64Array.from({ length: 5000 }, (_, i) => i % 7),
    stack,
    viewOf(0, 1000, 600),
  );
  expect(trace.kind).toBe("rows");
  expect(trace.kind === "rows" && trace.triples.length).toBe(3 * 600);
});

test("no peak is lost: a single layer among thousands still reaches its value", () => {
  const stack = stackLayers(layersOf(5000));
  const values = new Float64Array(5000).fill(1);
  values[3210] = 9;
  const triples = traceRows(values, stack, viewOf(0, 1000, 600), 1);
  const peaks = [...Array(triples.length / 3).keys()].filter((row) => triples[3 * row + 2] === 9);
  expect(peaks.length).toBeGreaterThanOrEqual(1);
  expect(peaks.length).toBeLessThanOrEqual(2);
  const y = triples[3 * peaks[0]];
  expect(Math.abs(y - (610 - (3210.5 / 5000) * 600))).toBeLessThanOrEqual(1.5);
});

test("rows cover exactly the values of the layers they cross, joined to the row below", () =>
  fc.assert(
    fc.property(
      fc.array(fc.integer({ min: 0, max: 50 }), { minLength: 40, maxLength: 200 }),
      fc.integer({ min: 20, max: 90 }),
      (values, rows) => {
        const stack = stackLayers(layersOf(values.length));
        const triples = traceRows(values, stack, viewOf(0, stack.totalMm, rows), 1);
        expect(triples.length).toBe(3 * rows);
        let least = Number.POSITIVE_INFINITY;
        let most = Number.NEGATIVE_INFINITY;
        for (let n = 0; n < triples.length; n += 3) {
          least = Math.min(least, triples[n + 1]);
          most = Math.max(most, triples[n + 2]);
          // Neighbouring rows overlap, so what is drawn is one line.
          if (n > 0) {
            expect(triples[n + 1]).toBeLessThanOrEqual(triples[n - 1]);
            expect(triples[n + 2]).toBeGreaterThanOrEqual(triples[n - 2]);
          }
        }
        expect([least, most]).toEqual([Math.min(...values), Math.max(...values)]);
      },
    ),
  ));

test("rows whose layers have no value are left out", () => {
  const stack = stackLayers(layersOf(400));
  const values = Float64Array.from({ length: 400 }, (_, i) => (i < 200 ? Number.NaN : 2));
  const triples = traceRows(values, stack, viewOf(0, 80), 1);
  expect(triples.length / 3).toBe(50);
});

test("rows that show the same are one rectangle", () => {
  const runs: number[][] = [];
  eachRun({ rowPx: 1, triples: Float64Array.of(9, 1, 1, 8, 1, 1, 7, 1, 4, 3, 1, 4) }, (...run) => runs.push(run));
  expect(runs).toEqual([
    [8, 2, 1, 1],
    [7, 1, 1, 4],
    [3, 1, 1, 4],
  ]);
});
