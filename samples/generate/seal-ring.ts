import { disc } from "#samples/generate/contour.ts";
import { parenthesisedStrata } from "#samples/generate/dialect.ts";
import { GcodeWriter } from "#samples/generate/gcode-writer.ts";
import { hatch } from "#samples/generate/infill.ts";
import { alternatingDeg, BEAD_MM, BEAD_SECTION_MM2, LAYER_MM, printStrokes } from "#samples/generate/layer.ts";

const CENTRE = 125;
const LAYERS = 45;
const OUTER_MM = 22;
const INNER_MM = 18;
const WALLS = 2;

/** Seal ring: every layer alike, walls as true arcs; which state a layer ends in is left to the profile alone. */
export function sealRing(): string {
  const writer = new GcodeWriter(parenthesisedStrata);
  const heat = ["M140 S150", "M104 S250", "G28", "M190 S150", "M109 S400"];
  for (const line of ["G21", "G90", "G17", "M82", ...heat, "M106 P2 S0", "M107", "G92 E0"]) writer.command(line);
  writer.toHeight(5);
  for (let layer = 1; layer <= LAYERS; layer++) {
    writer.beginLayer({ number: layer, topMm: layer * LAYER_MM, heightMm: LAYER_MM });
    if (layer === 3) writer.fan(0.3);
    if (layer === 1) {
      writer.beginFeature("skirt");
      printCircle(writer, OUTER_MM + 5, 1, 20);
    }
    printRing(writer, layer);
  }
  writer.retract();
  writer.toHeight(LAYERS * LAYER_MM + 20);
  for (const line of ["M107", "M106 P2 S0", "G0 X20 Y230 F6000", "M104 S0", "M140 S0", "M84"]) writer.command(line);
  return writer.text();
}

function printRing(writer: GcodeWriter, layer: number): void {
  const slow = layer === 1 ? 0.6 : 1;
  for (let wall = 0; wall < WALLS; wall++) {
    const depthMm = (wall + 0.5) * BEAD_MM;
    writer.beginFeature(wall === 0 ? "outer wall" : "inner wall");
    printCircle(writer, OUTER_MM - depthMm, 1, slow * (wall === 0 ? 35 : 45));
    printCircle(writer, INNER_MM + depthMm, -1, slow * (wall === 0 ? 35 : 45));
  }
  const marginMm = (WALLS + 0.25) * BEAD_MM;
  const keep = [disc(CENTRE, CENTRE, OUTER_MM - marginMm), disc(CENTRE, CENTRE, INNER_MM + marginMm)];
  printStrokes(writer, hatch(alternatingDeg(layer), BEAD_MM, { keep }), "infill", slow * 60);
}

/** A full circle as two half arcs. @param turn 1 counter-clockwise, -1 clockwise */
function printCircle(writer: GcodeWriter, radiusMm: number, turn: 1 | -1, speedMmS: number): void {
  const centre = { x: CENTRE, y: CENTRE };
  const left = { x: CENTRE - radiusMm, y: CENTRE };
  const right = { x: CENTRE + radiusMm, y: CENTRE };
  writer.travelTo(right);
  for (const target of [left, right]) writer.arcTo(target, centre, turn * Math.PI, BEAD_SECTION_MM2, speedMmS);
}
