import { type Contour, holdsBead, inset, outline, type Point } from "#samples/generate/contour.ts";
import type { Feature } from "#samples/generate/dialect.ts";
import type { GcodeWriter } from "#samples/generate/gcode-writer.ts";
import { hatch, nearestFirst, type Stroke } from "#samples/generate/infill.ts";

export const LAYER_MM = 0.2;
export const BEAD_MM = 0.45;
export const BEAD_SECTION_MM2 = LAYER_MM * BEAD_MM;
/** Infill ends this many bead widths inside the innermost wall's edge: a little less than half a bead, so that it bonds. */
const INFILL_GAP_BEADS = 0.25;

/** One island of a layer. */
export interface Region {
  outer: Contour;
  holes?: readonly Contour[];
}

export interface Speeds {
  outerMmS: number;
  innerMmS: number;
  infillMmS: number;
}

/** A fan command before a feature and one after it, inside the layer. */
export interface FanRaise {
  duty: number;
  backTo: number;
}

export interface Style {
  walls: number;
  /** which wall of a contour is laid first */
  order: "outer first" | "inner first";
  speeds: Speeds;
  infillDeg: number;
  /** what the outer wall hangs over */
  outerFeature?: Feature;
  /** the fan is raised for the outer wall only, as where it hangs over */
  outerRaise?: FanRaise;
  /** an area that another feature fills */
  without?: readonly Contour[];
}

/** Direction of the infill of a layer, turned by a right angle from one layer to the next. */
export const alternatingDeg = (layer: number) => (layer % 2 === 1 ? 45 : 135);

/** Lays the walls of an island, then its infill. */
export function printRegion(writer: GcodeWriter, region: Region, style: Style): void {
  const holes = region.holes ?? [];
  printWalls(writer, region.outer, 1, style);
  for (const hole of holes) printWalls(writer, hole, -1, style);
  printStrokes(writer, infillStrokes(region, style), "infill", style.speeds.infillMmS);
}

/** @param inwards 1 for an outer contour, -1 for a hole, whose walls grow outwards */
function printWalls(writer: GcodeWriter, contour: Contour, inwards: 1 | -1, style: Style): void {
  const rings = Array.from({ length: style.walls }, (_, ring) => ({
    path: inset(contour, inwards * (ring + 0.5) * BEAD_MM),
    outermost: ring === 0,
  })).filter(({ path }) => holdsBead(path, BEAD_MM));
  if (style.order === "inner first") rings.reverse();
  for (const { path, outermost } of rings) {
    const points = outline(path);
    const speedMmS = outermost ? style.speeds.outerMmS : style.speeds.innerMmS;
    writer.beginFeature(outermost ? (style.outerFeature ?? "outer wall") : "inner wall");
    const lay = () => printLoop(writer, inwards === 1 ? points : points.reverse(), speedMmS);
    if (outermost && style.outerRaise) withRaisedFan(writer, style.outerRaise, lay);
    else lay();
  }
}

export function withRaisedFan(writer: GcodeWriter, { duty, backTo }: FanRaise, lay: () => void): void {
  writer.fan(duty);
  lay();
  writer.fan(backTo);
}

export function printLoop(writer: GcodeWriter, points: readonly Point[], speedMmS: number): void {
  writer.travelTo(points[0]);
  for (const point of points.slice(1)) writer.beadTo(point, BEAD_SECTION_MM2, speedMmS);
  writer.beadTo(points[0], BEAD_SECTION_MM2, speedMmS);
}

function infillStrokes({ outer, holes = [] }: Region, { walls, infillDeg, without }: Style): Stroke[] {
  const marginMm = (walls + INFILL_GAP_BEADS) * BEAD_MM;
  const area = inset(outer, marginMm);
  if (!holdsBead(area, 0)) return [];
  return hatch(infillDeg, BEAD_MM, { keep: [area, ...holes.map((hole) => inset(hole, -marginMm))], without });
}

export function printStrokes(
  writer: GcodeWriter,
  strokes: readonly Stroke[],
  feature: Feature,
  speedMmS: number,
): void {
  if (strokes.length === 0) return;
  writer.beginFeature(feature);
  for (const { from, to } of nearestFirst(strokes, writer.place)) {
    writer.travelTo(from);
    writer.beadTo(to, BEAD_SECTION_MM2, speedMmS);
  }
}
