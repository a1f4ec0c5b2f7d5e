import { type Column, columnText } from "#server/cli/table.ts";
import { counted, sizeText } from "#server/cli/terminal.ts";
import type { Machine } from "#shared/formats/machine.ts";
import type { Finding, Layer, Reading, Wait } from "#shared/layers/reading.ts";
import { durationText } from "#shared/units/words.ts";

/** Widest line of the table, in characters. */
const WIDTH = 120;
const WAITS_WIDTH = 18;

/** What `read` shows people: facts about the file, a row for each layer, totals, findings. */
export function layerTable(name: string, reading: Reading, machine: Machine): string {
  const { file, layers, totals, findings } = reading;
  const { shown, left } = channelColumns(layers, machine);
  const columns = [...measures(layers), ...shown, waitsColumn(layers)];
  const lines = [
    `${name === "-" ? "standard input" : name}: ${sizeText(file.bytes)}, ${counted(file.lines, "line")}`,
    `SHA-256 ${file.sha256}`,
    "",
    ...columnText(columns, layers.length),
    "",
    `${counted(totals.layers, "layer")}, print time ${durationText(totals.printTimeS)}, filament ${totals.filamentMm.toFixed(1)} mm`,
    "Times leave waits out. Duties are 0–1, means over the layer; ~ marks those that change within it.",
    ...(left.length === 0 ? [] : [`No room for ${left.join(", ")}: --json has every channel.`]),
    ...(findings.length === 0 ? [] : ["", "Findings", ...findings.map(findingText)]),
  ];
  return `${lines.join("\n")}\n`;
}

function measures(layers: readonly Layer[]): Column[] {
  const number = (head: string, unit: string, decimals: number, of: (layer: Layer) => number): Column => ({
    head: [head, unit],
    align: "right",
    cell: (row) => of(layers[row]).toFixed(decimals),
  });
  const summed: typeof number = (head, unit, decimals, of) => ({
    ...number(head, unit, decimals, of),
    foot: layers.reduce((sum, layer) => sum + of(layer), 0).toFixed(decimals),
  });
  const several = layers[layers.length - 1].object > 1;
  return [
    { ...number("layer", "", 0, (layer) => layer.index), foot: "total" },
    ...(several ? [number("object", "", 0, (layer) => layer.object)] : []),
    number("z", "mm", 3, (layer) => layer.zMm),
    number("height", "mm", 3, (layer) => layer.heightMm),
    summed("time", "s", 2, (layer) => layer.timeS),
    summed("extruding", "s", 2, (layer) => layer.extrudingTimeS),
    summed("deposited", "mm", 1, (layer) => layer.depositedLengthMm),
    summed("travel", "mm", 1, (layer) => layer.travelLengthMm),
    summed("volume", "mm³", 2, (layer) => layer.volumeMm3),
  ];
}

/** As many channels as there is room for, and the names of the others. */
function channelColumns(layers: readonly Layer[], machine: Machine): { shown: Column[]; left: string[] } {
  const width = (columns: Column[]) => columnText(columns, layers.length)[0].length;
  let room = WIDTH - width(measures(layers)) - WAITS_WIDTH - 2;
  const shown: Column[] = [];
  const left: string[] = [];
  for (const { id } of machine.channels) {
    const column = dutyColumn(id, layers);
    room -= width([column]) + 2;
    if (room >= 0) shown.push(column);
    else left.push(id);
  }
  return { shown, left };
}

function dutyColumn(id: string, layers: readonly Layer[]): Column {
  const cell = (row: number) => {
    const { mean, min, max } = layers[row].duty[id];
    return `${mean.toFixed(2)}${min === max ? " " : "~"}`;
  };
  return { head: [`${id} `, ""], align: "right", cell };
}

function waitsColumn(layers: readonly Layer[]): Column {
  return { head: ["waits", ""], align: "left", cell: (row) => waitsText(layers[row].waits) };
}

/** `dwell 1.5 s, home`; only their number where that is too long. */
function waitsText(waits: readonly Wait[]): string {
  const kinds = [...new Set(waits.map(({ kind }) => kind))].map((kind) => {
    const alike = waits.filter((wait) => wait.kind === kind);
    const seconds = alike.reduce((sum, wait) => sum + (wait.seconds ?? 0), 0);
    return `${alike.length > 1 ? `${alike.length} ` : ""}${kind}${seconds > 0 ? ` ${seconds.toFixed(1)} s` : ""}`;
  });
  const text = kinds.join(", ");
  return text.length <= WAITS_WIDTH ? text : counted(waits.length, "wait");
}

function findingText({ severity, line, layer, message }: Finding): string {
  const place = [...(line === undefined ? [] : [`line ${line}`]), ...(layer === undefined ? [] : [`layer ${layer}`])];
  return `  ${severity.padEnd(7)}  ${place.length === 0 ? "" : `${place.join(", ")}: `}${message}`;
}
