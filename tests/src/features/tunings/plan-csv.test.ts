import { expect, test } from "vitest";
import { planCsv } from "#src/features/tunings/plan-csv.ts";
import { predictionOf } from "#tests/src/features/prediction/predictions.ts";
import { layersOf } from "#tests/src/layer-log/layers.ts";

const layers = layersOf(2);
const plan = {
  layers: [1, 2].map((index) => ({
    index,
    duty: { "part-fan": 0.25, lamp: 0 },
    reason: { "part-fan": ['zone "base", lower: fixed at 0.25', "rounded"], lamp: [] },
  })),
};

/** A reader of RFC 4180, separate from what wrote it. */
function read(csv: string): string[][] {
  const rows: string[][] = [[""]];
  let quoted = false;
  for (let i = 0; i < csv.length; i++) {
    const row = rows[rows.length - 1];
    if (quoted) {
      if (csv[i] !== '"') row[row.length - 1] += csv[i];
      else if (csv[i + 1] === '"') row[row.length - 1] += csv[i++];
      else quoted = false;
    } else if (csv[i] === '"') quoted = true;
    else if (csv[i] === ",") row.push("");
    else if (csv.startsWith("\r\n", i)) {
      rows.push([""]);
      i++;
    } else row[row.length - 1] += csv[i];
  }
  return rows.slice(0, -1);
}

const rowOf = (csv: string, n: number): Record<string, string> => {
  const [head, ...rows] = read(csv);
  expect(new Set(head).size).toBe(head.length);
  expect(rows.every((row) => row.length === head.length)).toBe(true);
  return Object.fromEntries(head.map((name, i) => [name, rows[n][i]]));
};

test("a row a layer: measures, duties and reasons", () => {
  const row = rowOf(planCsv({ layers, plan }), 1);
  expect(row).toMatchObject({ index: "2", zMm: "0.4", timeS: "12", "part-fan duty": "0.25", "lamp duty": "0" });
  expect(row["part-fan reasons"]).toBe('zone "base", lower: fixed at 0.25; rounded');
  expect(row).not.toHaveProperty("interlayerC");
});

test("predicted columns carry the band, the verdicts and the calibration, and are empty where nothing is known", () => {
  const prediction = predictionOf(2, (i) => ({
    interlayerC: 121.26,
    timeToSolidS: null,
    ...(i === 1 ? { band: null, verdicts: { state: "undecided", reaches: null, solid: false, welds: true } } : {}),
  }));
  const csv = planCsv({ layers, plan, prediction });
  expect(rowOf(csv, 0)).toMatchObject({ interlayerC: "121.3", "interlayerC low": "81", state: "amorphous" });
  expect(rowOf(csv, 1)).toMatchObject({
    "interlayerC low": "",
    timeToSolidS: "",
    state: "undecided",
    "reaches target": "",
    solid: "no",
    welds: "yes",
    calibration: "uncalibrated",
  });
});

test("a text that a spreadsheet would take for a formula is one no more", () => {
  const sly = { layers: [{ ...plan.layers[0], reason: { "part-fan": ['=HYPERLINK("x")'], lamp: [] } }] };
  expect(rowOf(planCsv({ layers: layers.slice(0, 1), plan: sly }), 0)["part-fan reasons"]).toBe('\'=HYPERLINK("x")');
});
