import { block, disc, inset, outline } from "#samples/generate/contour.ts";
import { numberedObjectLayers } from "#samples/generate/dialect.ts";
import { GcodeWriter } from "#samples/generate/gcode-writer.ts";
import { alternatingDeg, LAYER_MM, printLoop, printRegion, type Region } from "#samples/generate/layer.ts";

const CENTRE = 125;
const LAYERS = 16;
const MIRRORED = [-1, 1];

/** A plate with a port in the middle, four smaller ports around it, two slots and six bolt holes. */
const PLATE: Region = {
  outer: block(CENTRE, CENTRE, 120, 84, 9),
  holes: [
    disc(CENTRE, CENTRE, 13),
    ...MIRRORED.flatMap((sx) => MIRRORED.map((sy) => disc(CENTRE + sx * 30, CENTRE + sy * 17, 7))),
    ...MIRRORED.map((sx) => block(CENTRE + sx * 44, CENTRE, 7, 24, 3.5)),
    ...MIRRORED.flatMap((sy) => [-50, 0, 50].map((dx) => disc(CENTRE + dx, CENTRE + sy * 33, 3.3))),
  ],
};

const SPEEDS = { outerMmS: 35, innerMmS: 50, infillMmS: 70 };
const FIRST_SPEEDS = { outerMmS: 20, innerMmS: 25, infillMmS: 30 };

/** Valve plate: few layers, all of them large and flat. */
export function valvePlate(): string {
  const writer = new GcodeWriter(numberedObjectLayers);
  const heat = ["M140 S110", "M104 S200", "G28", "M190 S110", "M109 S325"];
  for (const line of ["G21", "G90", "M83", ...heat, "M107 P0"]) writer.command(line);
  writer.toHeight(5);
  for (let layer = 1; layer <= LAYERS; layer++) {
    writer.beginLayer({ number: layer, topMm: layer * LAYER_MM, heightMm: LAYER_MM });
    if (layer === 3) writer.fan(0.2);
    if (layer === 1) printLoop(writer, outline(inset(PLATE.outer, -5)), 30);
    printRegion(writer, PLATE, {
      walls: 3,
      order: "inner first",
      speeds: layer === 1 ? FIRST_SPEEDS : SPEEDS,
      infillDeg: alternatingDeg(layer),
    });
  }
  writer.retract();
  writer.toHeight(LAYERS * LAYER_MM + 20);
  for (const line of ["M107 P0", "G1 X20 Y230 F6000", "M104 S0", "M140 S0", "M84"]) writer.command(line);
  return writer.text();
}
