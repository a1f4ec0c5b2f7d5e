import type { Advice } from "#shared/formats/plan.ts";
import type { ReadingDocument } from "#shared/formats/reading.ts";

/** A warning is about what may go wrong, advice about what fan and heater can't put right, the rest is good to know. */
export type Severity = "warning" | "advice" | "info";

/** The same words wherever something is remarked. */
export const SEVERITY_NAMES: Record<Severity, string> = { warning: "! Warning", advice: "Advice", info: "Note" };

/** Something worth a look: a finding of the reading, or advice of plan or prediction. */
export interface Remark {
  severity: Severity;
  message: string;
  /** index of the layer; left out where it is about the file as a whole */
  layer?: number;
}

type PlacedLayer = Pick<ReadingDocument["layers"][number], "index" | "firstLine" | "lastLine">;
type Findings = ReadingDocument["findings"];

/** Advice that the file, or its outputs, may not be what they are taken for. */
const WARNINGS = new Set(["nozzle-below-melting", "nozzle-unknown", "output-shared"]);

/** All findings, each at the layer that it is about or that its line belongs to. */
export function findingRemarks(findings: Findings, layers: readonly PlacedLayer[]): Remark[] {
  return findings.map(({ layer, line, severity, message }) => {
    const at = layer ?? (line === undefined ? undefined : layerOfLine(layers, line));
    return at === undefined ? { severity, message } : { severity, message, layer: at };
  });
}

/**
 * What to know before a file is written: warnings of the reading first, then all advice from the bottom up. What both say
 * stands once.
 */
export function remarksOf(findings: Findings, advice: readonly Advice[], layers: readonly PlacedLayer[]): Remark[] {
  const warnings = findingRemarks(
    findings.filter(({ severity }) => severity === "warning"),
    layers,
  );
  const advised = advice.map(({ layer, code, message }): Remark => {
    return { layer, severity: WARNINGS.has(code) ? "warning" : "advice", message };
  });
  const known = new Set(warnings.map(({ message }) => message));
  const all = [...warnings, ...advised.filter(({ message }) => !known.has(message))];
  return all.sort((a, b) => Number(b.severity === "warning") - Number(a.severity === "warning"));
}

/** Those that have a height to stand at. */
export function placedRemarks(remarks: readonly Remark[]): (Remark & { layer: number })[] {
  return remarks.flatMap((remark) => (remark.layer === undefined ? [] : [{ ...remark, layer: remark.layer }]));
}

function layerOfLine(layers: readonly PlacedLayer[], line: number): number | undefined {
  return layers.find(({ firstLine, lastLine }) => line >= firstLine && line <= lastLine)?.index;
}
