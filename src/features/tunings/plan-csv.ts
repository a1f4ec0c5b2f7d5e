import type { PlanDocument } from "#shared/formats/plan.ts";
import type { PredictionDocument } from "#shared/formats/prediction.ts";
import type { LayerReading } from "#shared/formats/reading.ts";
import { saveFile } from "#src/lib/save-file.ts";

export interface PlanCsvInput {
  layers: readonly Pick<LayerReading, "index" | "object" | "zMm" | "heightMm" | "timeS" | "depositedLengthMm">[];
  /** one layer for every layer of the reading */
  plan: Pick<PlanDocument, "layers">;
  /** likewise; left out: no predicted columns */
  prediction?: PredictionDocument;
}

/** Hands the table to the browser as a file. */
export function savePlanCsv(fileName: string, input: PlanCsvInput): void {
  saveFile(fileName, planCsv(input), "text/csv;charset=utf-8");
}

type Cell = string | number | null | undefined;
type Layer = PlanCsvInput["layers"][number];

const MEASURES: (keyof Layer & string)[] = ["index", "object", "zMm", "heightMm", "timeS", "depositedLengthMm"];

const PREDICTED = [
  "interlayerC",
  "interlayerC low",
  "interlayerC high",
  "contactC",
  "timeAboveTgS",
  "timeToSolidS",
  "highestReheatC",
  "crystallinity",
  "crystallinity low",
  "crystallinity high",
  "state",
  "reaches target",
  "solid",
  "welds",
  "calibration",
];

/**
 * The plan as a table, a row a layer: RFC 4180, a header line, decimal points. Duties are 0-1; what is not predicted is
 * empty, and every row says what calibration its prediction rests on.
 */
export function planCsv({ layers, plan, prediction }: PlanCsvInput): string {
  const channels = Object.keys(plan.layers[0]?.duty ?? {});
  const head = [
    ...MEASURES,
    ...channels.map((id) => `${id} duty`),
    ...channels.map((id) => `${id} reasons`),
    ...(prediction ? PREDICTED : []),
  ];
  const rows = layers.map((layer, i) => {
    const { duty, reason } = plan.layers[i];
    return [
      ...MEASURES.map((name) => layer[name]),
      ...channels.map((id) => duty[id]),
      ...channels.map((id) => (reason[id] ?? []).join("; ")),
      ...(prediction ? predictedCells(prediction, i) : []),
    ];
  });
  return [head, ...rows].map((cells) => `${cells.map(cellText).join(",")}\r\n`).join("");
}

function predictedCells({ layers, calibration }: PredictionDocument, i: number): Cell[] {
  const { interlayerC, contactC, timeAboveTgS, timeToSolidS, highestReheatC, crystallinity, band, verdicts } =
    layers[i];
  return [
    rounded(interlayerC, 1),
    rounded(band?.interlayerC[0], 1),
    rounded(band?.interlayerC[1], 1),
    rounded(contactC, 1),
    rounded(timeAboveTgS, 1),
    rounded(timeToSolidS, 2),
    rounded(highestReheatC, 1),
    rounded(crystallinity, 4),
    rounded(band?.crystallinity[0], 4),
    rounded(band?.crystallinity[1], 4),
    verdicts.state,
    verdicts.reaches,
    verdicts.solid ? "yes" : "no",
    verdicts.welds ? "yes" : "no",
    calibration,
  ];
}

/** An estimate with more digits would only look better. */
const rounded = (value: number | null | undefined, decimals: number): number | undefined =>
  value === null || value === undefined ? undefined : Number(value.toFixed(decimals));

/** A spreadsheet takes a text that begins like a formula for one. */
const FORMULA = /^[=+\-@\t\r]/;

function cellText(cell: Cell): string {
  if (cell === null || cell === undefined) return "";
  if (typeof cell === "number") return String(cell);
  const text = FORMULA.test(cell) ? `'${cell}` : cell;
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}
