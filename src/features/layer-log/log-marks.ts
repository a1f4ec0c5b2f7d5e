import type { Advice } from "#shared/formats/plan.ts";
import type { ReadingDocument } from "#shared/formats/reading.ts";
import type { LogMark } from "#src/features/layer-log/track.ts";

type PlacedLayer = Pick<ReadingDocument["layers"][number], "index" | "firstLine" | "lastLine">;

/** The findings that are about one layer; those about the file as a whole have no height to stand at. */
export function findingMarks(findings: ReadingDocument["findings"], layers: readonly PlacedLayer[]): LogMark[] {
  return findings.flatMap(({ layer, line, severity, message }) => {
    const at = layer ?? (line === undefined ? undefined : layerOfLine(layers, line));
    return at === undefined ? [] : [{ layer: at, severity, message }];
  });
}

export function adviceMarks(advice: readonly Advice[]): LogMark[] {
  return advice.map(({ layer, message }) => ({ layer, severity: "warning" as const, message }));
}

function layerOfLine(layers: readonly PlacedLayer[], line: number): number | undefined {
  return layers.find(({ firstLine, lastLine }) => line >= firstLine && line <= lastLine)?.index;
}
