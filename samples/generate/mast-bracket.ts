import { block, type Contour, disc, inset, outline } from "#samples/generate/contour.ts";
import { countedLayers } from "#samples/generate/dialect.ts";
import { GcodeWriter } from "#samples/generate/gcode-writer.ts";
import { hatch } from "#samples/generate/infill.ts";
import {
  alternatingDeg,
  BEAD_MM,
  BEAD_SECTION_MM2,
  LAYER_MM,
  printLoop,
  printRegion,
  printStrokes,
  type Region,
  withRaisedFan,
} from "#samples/generate/layer.ts";

/*
 * From the bed up (tops, mm): foot with four bolt holes to 6, a cable channel through it from 2 to 4; a fillet to 18;
 * the post to 48, with a window from 26 to 32; a flare at 45 degrees to 51; a collar to 53; a spigot to 61.
 */
const CENTRE = 125;
const HEIGHT_MM = 61;
const FOOT = block(CENTRE, CENTRE, 84, 56, 5);
const BOLT_HOLES = [-1, 1].flatMap((sx) => [-1, 1].map((sy) => disc(CENTRE + sx * 34, CENTRE + sy * 20, 3.3)));
const CHANNEL_MM = 6;
const POST_MM = 11;
const WINDOW_MM = 4;
const COLLAR_MM = 17;
const SPIGOT_MM = 7;

const SPEEDS = { outerMmS: 30, innerMmS: 40, infillMmS: 50 };
const FIRST_SPEEDS = { outerMmS: 20, innerMmS: 20, infillMmS: 25 };
const BRIDGE_MM_S = 25;
const RAISED_FAN = 0.9;

interface Section {
  regions: Region[];
  /** laid over a gap in the layer below */
  bridge?: Contour;
  overhang?: boolean;
  fan: number;
}

const square = (sideMm: number): Region => ({ outer: block(CENTRE, CENTRE, sideMm, sideMm, sideMm / 5) });

/** Two halves of a block with a gap along y between them. */
function halves({ widthMm, depthMm, cornerMm }: Contour, gapMm: number, holes: readonly Contour[]): Region[] {
  const halfMm = (widthMm - gapMm) / 2;
  return [-1, 1].map((side) => ({
    outer: block(CENTRE + (side * (gapMm + halfMm)) / 2, CENTRE, halfMm, depthMm, Math.min(cornerMm, halfMm / 4)),
    holes: holes.filter((hole) => Math.sign(hole.x - CENTRE) === side),
  }));
}

/** What the layer with this top looks like. Borders are compared in whole micrometres, so that no rounding moves them. */
function sectionAt(topMm: number): Section {
  const at = (mm: number) => Math.round(topMm * 1000) <= mm * 1000;
  const bridgeOver = (gapMm: number, under: Contour) => ({
    ...inset(under, 2.25 * BEAD_MM),
    widthMm: gapMm + 1.2,
    cornerMm: 0,
  });
  const foot: Region = { outer: FOOT, holes: BOLT_HOLES };
  const post = square(POST_MM);
  if (at(2)) return { regions: [foot], fan: topMm < 0.5 ? 0 : 0.25 };
  if (at(4)) return { regions: halves(FOOT, CHANNEL_MM, BOLT_HOLES), fan: 0.25 };
  if (at(4.2)) return { regions: [foot], bridge: bridgeOver(CHANNEL_MM, FOOT), fan: 0.25 };
  if (at(6)) return { regions: [foot], fan: 0.25 };
  if (at(18)) {
    const rest = ((18 - topMm) / 12) ** 2;
    const fillet = block(CENTRE, CENTRE, POST_MM + 29 * rest, POST_MM + 19 * rest, 2.2 + 3 * rest);
    return { regions: [{ outer: fillet }], fan: 0.35 };
  }
  if (at(26)) return { regions: [post], fan: 0.5 };
  if (at(32)) return { regions: halves(post.outer, WINDOW_MM, []), fan: 0.5 };
  if (at(32.2)) return { regions: [post], bridge: bridgeOver(WINDOW_MM, post.outer), fan: 0.5 };
  if (at(48)) return { regions: [post], fan: 0.5 };
  if (at(51)) return { regions: [square(POST_MM + 2 * (topMm - 48))], overhang: true, fan: 0.5 };
  if (at(53)) return { regions: [square(COLLAR_MM)], fan: 0.4 };
  return { regions: [square(SPIGOT_MM)], fan: 0.6 };
}

/** Mast bracket: long layers in the wide foot, then short ones in the thin post. */
export function mastBracket(): string {
  const writer = new GcodeWriter(countedLayers);
  start(writer);
  let fan = 0;
  for (let layer = 1; layer <= Math.round(HEIGHT_MM / LAYER_MM); layer++) {
    const topMm = layer * LAYER_MM;
    const section = sectionAt(topMm);
    writer.beginLayer({ number: layer, topMm, heightMm: LAYER_MM });
    if (section.fan !== fan) writer.fan(section.fan);
    fan = section.fan;
    if (layer === 1) printSkirt(writer);
    printLayer(writer, section, layer);
  }
  end(writer);
  return writer.text();
}

function printLayer(writer: GcodeWriter, { regions, bridge, overhang, fan }: Section, layer: number): void {
  const raise = { duty: RAISED_FAN, backTo: fan };
  for (const region of regions) {
    printRegion(writer, region, {
      walls: 2,
      order: "inner first",
      speeds: layer === 1 ? FIRST_SPEEDS : SPEEDS,
      infillDeg: alternatingDeg(layer),
      ...(overhang && { outerFeature: "overhang wall", outerRaise: raise }),
      ...(bridge && { without: [bridge] }),
    });
  }
  if (!bridge) return;
  const strokes = hatch(0, BEAD_MM, { keep: [bridge] });
  withRaisedFan(writer, raise, () => printStrokes(writer, strokes, "bridge", BRIDGE_MM_S));
}

function printSkirt(writer: GcodeWriter): void {
  writer.beginFeature("skirt");
  printLoop(writer, outline(inset(FOOT, -4)), 30);
}

/** Heats up, then primes the nozzle along the front of the bed, higher than the first layer. */
function start(writer: GcodeWriter): void {
  const heat = ["M140 S150", "M104 S250", "G28", "M190 S150", "M109 S405"];
  for (const line of ["G21", "G90", "M82", ...heat, "M106 P1 S255", "M107", "G92 E0"]) writer.command(line);
  writer.toHeight(0.3);
  writer.travelTo({ x: 25, y: 12 });
  writer.beadTo({ x: 145, y: 12 }, 3 * BEAD_SECTION_MM2, 20);
}

function end(writer: GcodeWriter): void {
  writer.retract();
  writer.toHeight(HEIGHT_MM + 20);
  for (const line of ["M107", "G0 F6000 X20 Y230", "M104 S0", "M140 S0", "M84"]) writer.command(line);
}
