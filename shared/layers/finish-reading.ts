import type { Machine } from "#shared/formats/machine.ts";
import { fillDutySeen } from "#shared/layers/duty-seen.ts";
import type { Findings } from "#shared/layers/findings.ts";
import type { LayerBuilder } from "#shared/layers/layer-builder.ts";
import type { OutputLines } from "#shared/layers/output-lines.ts";
import type { FileFacts, Layer, Reading } from "#shared/layers/reading.ts";
import { sharedOutputText } from "#shared/layers/shared-output.ts";
import { Refusal } from "#shared/refusal.ts";

interface Read {
  machine: Machine;
  builder: LayerBuilder;
  outputs: OutputLines;
  findings: Findings;
  provenance: Reading["provenance"];
  file: FileFacts;
}

/** Puts a reading together once every move has its time. @throws Refusal when nothing is extruded */
export function finishReading({ machine, builder, outputs, findings, provenance, file }: Read): Reading {
  let { layers } = builder;
  if (layers.length === 0)
    throw new Refusal(
      "no-extrusion",
      `none of the ${file.lines} lines moves in X or Y while feeding material forward`,
      "Export the toolpath of a sliced part; check that extrusion is on E.",
    );
  if (builder.markers === 0) layers = withoutPrimeLine(layers, findings);
  for (const layer of layers) layer.outlineMm ||= boxPerimeterMm(layer);
  const window = { start: layers[0].writeAt, end: builder.lastLaid };
  placeLines(outputs, layers, window.start.offset, window.end.offset);
  fillDutySeen(layers, outputs.controls, machine);
  crossCheck(builder, layers, findings);
  noteControls(outputs, machine, layers, findings);
  noteSharedOutputs(outputs, machine, findings);
  noteForeign(outputs, machine, window.start.offset, window.end.offset, findings);
  if (builder.planner.forcedStops > 0)
    findings.add(
      "window-full",
      "info",
      `${builder.planner.forcedStops} runs of very short moves were timed with a stop in between`,
    );
  const last = layers[layers.length - 1];
  return {
    file,
    totals: totals(layers),
    layers,
    beforeFirstLayerS: layers[0].startsAtS,
    afterLastLayerS: builder.timeline.clockS - (last.startsAtS + last.timeS),
    window,
    travels: builder.timeline.travels.within(window.start.offset, window.end.offset),
    controls: outputs.controls,
    pauses: outputs.pauses,
    outputs: outputs.use,
    findings: findings.end(),
    ...(provenance ? { provenance } : {}),
  };
}

/** Where no closed run was found, the box around the layer has to do. */
const boxPerimeterMm = ({ boxMm: { min, max } }: Layer): number => 2 * (max[0] - min[0] + max[1] - min[1]);

function totals(layers: readonly Layer[]): Reading["totals"] {
  const sum = (of: (layer: Layer) => number): number => layers.reduce((total, layer) => total + of(layer), 0);
  return {
    printTimeS: sum((layer) => layer.timeS),
    layers: layers.length,
    depositedLengthMm: sum((layer) => layer.depositedLengthMm),
    travelLengthMm: sum((layer) => layer.travelLengthMm),
    filamentMm: sum((layer) => layer.filamentMm),
  };
}

/**
 * Without markers, layers at the beginning that lie apart from what follows are prime lines: nothing is built on them.
 * The rest is counted afresh.
 */
function withoutPrimeLine(layers: Layer[], findings: Findings): Layer[] {
  let first = 0;
  while (first < 2 && first + 1 < layers.length && apart(layers[first], layers[first + 1])) first++;
  if (first === 0) return layers;
  findings.add(
    "prime-line",
    "info",
    `what is laid at ${layers[0].zMm} mm lies apart from the part and is counted as the start of the print`,
    {
      line: layers[0].firstLine,
    },
  );
  const kept = layers.slice(first);
  const firstObject = kept[0].object;
  for (const [k, layer] of kept.entries()) {
    layer.index = k + 1;
    layer.object -= firstObject - 1;
  }
  if (kept[0].object === 1 && kept[0].heightMm !== kept[0].zMm) {
    kept[0].heightMm = kept[0].zMm;
    kept[0].areaMm2 = kept[0].volumeMm3 / kept[0].heightMm;
  }
  return kept;
}

function apart({ boxMm: a }: Layer, { boxMm: b }: Layer): boolean {
  return a.max[0] < b.min[0] || b.max[0] < a.min[0] || a.max[1] < b.min[1] || b.max[1] < a.min[1];
}

/** Which layer each control line and pause stands in: 0 before the first, Infinity after the last. */
function placeLines({ controls, pauses }: OutputLines, layers: readonly Layer[], start: number, end: number): void {
  for (const list of [controls, pauses]) {
    let layer = 0;
    for (const line of list) {
      while (layer < layers.length && layers[layer].firstByte <= line.offset) layer++;
      if (line.offset < start) line.layer = 0;
      else line.layer = line.offset >= end ? Number.POSITIVE_INFINITY : Math.max(layer, 1);
    }
  }
}

function crossCheck(builder: LayerBuilder, layers: readonly Layer[], findings: Findings): void {
  const { markers } = builder;
  if (markers > 0 && markers !== layers.length)
    findings.add(
      "marker-count",
      "info",
      `${markers} layer markers, ${layers.length} layers by geometry; geometry counts`,
    );
  if (builder.markerMismatch) findings.add("marker-height", "info", builder.markerMismatch);
  if (builder.spiral)
    findings.add(
      "spiral",
      "info",
      "material is laid while Z rises: such stretches are cut into layers of the nominal height",
    );
  const objects = layers[layers.length - 1].object;
  if (objects > 1) findings.add("sequential", "info", `${objects} objects are printed one after the other`);
}

function noteControls({ controls }: OutputLines, machine: Machine, layers: readonly Layer[], findings: Findings): void {
  for (const [index, channel] of machine.channels.entries()) {
    const inside = controls.filter(
      (line) => line.channel === index && line.layer >= 1 && line.layer <= layers.length && !line.ours,
    );
    if (inside.length === 0) continue;
    const { id, kind } = channel;
    const highest = inside.reduce((most, { duty }) => Math.max(most, duty || 0), 0);
    const lines = inside.length === 1 ? "1 line" : `${inside.length} lines`;
    const what = kind === "heater" ? "the heater" : "the fan";
    // A file that lights a heater by itself was made for other outputs, or by someone who does this job by hand.
    findings.add(
      "controls-inside",
      kind === "heater" && highest > 0 ? "warning" : "info",
      `${lines} between the first and the last layer already ${inside.length === 1 ? "sets" : "set"} ${id} (${what}), to ${highest.toFixed(2)} at most`,
      { line: inside[0].line },
    );
  }
}

/** Told on reading, so that it is known before anything is written. */
function noteSharedOutputs({ use }: OutputLines, machine: Machine, findings: Findings): void {
  for (const heater of machine.channels.filter(({ kind }) => kind === "heater")) {
    const message = sharedOutputText(use, heater);
    if (message !== undefined) findings.add("output-shared", "warning", message, { line: use.indexedFanLine });
  }
}

/** The command that sets an output, as files write it. */
function commandOf(output: string): string {
  const [, kind, name] = /^(fan|pin|named fan|named pin) (.*)$/.exec(output)!;
  if (kind === "named fan") return `SET_FAN_SPEED FAN=${name}`;
  if (kind === "named pin") return `SET_PIN PIN=${name}`;
  if (kind === "pin") return `M42 P${name}`;
  return name === "0" ? "M106" : `M106 P${name}`;
}

/** Commands that stay in the tuned file because the machine document knows nothing of their output. */
function noteForeign(
  { foreign, use }: OutputLines,
  machine: Machine,
  start: number,
  end: number,
  findings: Findings,
): void {
  const outputs = [...foreign].flatMap(([output, lines]) => {
    const inside = lines.filter(({ offset }) => offset >= start && offset < end);
    return inside.length === 0 ? [] : [{ command: commandOf(output), count: inside.length, line: inside[0].line }];
  });
  if (outputs.length === 0) return;
  use.foreign = outputs;
  const list = outputs.map(({ command, count }) => `${command} (${count})`).join(", ");
  findings.add(
    "no-channel",
    "warning",
    `the file sets outputs that ${machine.name} has no channel for, and such lines stay as they are: ${list}`,
    { line: outputs[0].line },
  );
}
