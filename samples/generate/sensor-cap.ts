import { disc, inset, outline } from "#samples/generate/contour.ts";
import { changedLayers } from "#samples/generate/dialect.ts";
import { GcodeWriter } from "#samples/generate/gcode-writer.ts";
import { alternatingDeg, LAYER_MM, printLoop, printRegion, type Region } from "#samples/generate/layer.ts";

const CENTRE = 125;
const FLANGE_LAYERS = 6;
const FLANGE_MM = FLANGE_LAYERS * LAYER_MM;
const FLANGE: Region = {
  outer: disc(CENTRE, CENTRE, 36),
  holes: [
    disc(CENTRE, CENTRE, 22),
    ...[0, 1, 2, 3, 4, 5].map((sixth) => {
      const angle = ((sixth + 0.5) * Math.PI) / 3;
      return disc(CENTRE + 33 * Math.cos(angle), CENTRE + 33 * Math.sin(angle), 1.7);
    }),
  ],
};

/** The dome is a quarter ellipse turned about the axis, cut off where it leaves a port for the cable. */
const DOME = { baseRadiusMm: 28, apexMm: 50, portRadiusMm: 9 };
const DOME_BEAD_MM = 0.6;
const DOME_CHORD_MM = 1;
const DOME_MM_S = 35;

const SPEEDS = { outerMmS: 30, innerMmS: 40, infillMmS: 55 };
const FIRST_SPEEDS = { outerMmS: 20, innerMmS: 20, infillMmS: 25 };

/** Sensor cap: a solid flange, then a dome wound in one rising bead, each turn a little shorter than the one before. */
export function sensorCap(): string {
  const writer = new GcodeWriter(changedLayers);
  const heat = ["M140 S130", "M104 S200", "G28", "M190 S130", "M109 S350"];
  const start = [
    "SET_PIN PIN=halogen VALUE=0",
    "SET_FAN_SPEED FAN=part_cooling SPEED=0",
    "SET_VELOCITY_LIMIT ACCEL=1200",
  ];
  for (const line of ["G90", "M83", ...heat, ...start]) writer.command(line);
  writer.toHeight(5);
  for (let layer = 1; layer <= FLANGE_LAYERS; layer++) printFlangeLayer(writer, layer);
  const topMm = windDome(writer);
  writer.retract();
  writer.toHeight(topMm + 20);
  const stop = ["SET_FAN_SPEED FAN=part_cooling SPEED=0", "SET_PIN PIN=halogen VALUE=0"];
  for (const line of [...stop, "G1 X20 Y230 F6000", "M104 S0", "M140 S0", "M84"]) writer.command(line);
  return writer.text();
}

function printFlangeLayer(writer: GcodeWriter, layer: number): void {
  writer.beginLayer({ number: layer, topMm: layer * LAYER_MM, heightMm: LAYER_MM });
  if (layer === 1) {
    writer.beginFeature("skirt");
    printLoop(writer, outline(inset(FLANGE.outer, -4)), 30);
  }
  if (layer === 3) writer.fan(0.25);
  printRegion(writer, FLANGE, {
    walls: 2,
    order: "outer first",
    speeds: layer === 1 ? FIRST_SPEEDS : SPEEDS,
    infillDeg: alternatingDeg(layer),
  });
}

/**
 * Winds the dome wall. Z rises evenly along each turn; the first turn starts on the flange with no thickness and
 * grows to a full bead, so the volume laid is that of the wall.
 *
 * @returns height of the top, mm
 */
function windDome(writer: GcodeWriter): number {
  const pose = (turn: number) => {
    const zMm = FLANGE_MM + turn * LAYER_MM;
    const radiusMm = DOME.baseRadiusMm * Math.sqrt(1 - ((turn * LAYER_MM) / DOME.apexMm) ** 2);
    const angle = 2 * Math.PI * turn;
    return { zMm, radiusMm, x: CENTRE + radiusMm * Math.cos(angle), y: CENTRE + radiusMm * Math.sin(angle) };
  };
  const turns = Math.floor((DOME.apexMm / LAYER_MM) * Math.sqrt(1 - (DOME.portRadiusMm / DOME.baseRadiusMm) ** 2));
  for (let turn = 0; turn < turns; turn++) {
    const { radiusMm, zMm } = pose(turn);
    writer.mark({ number: FLANGE_LAYERS + turn + 1, topMm: zMm + LAYER_MM, heightMm: LAYER_MM });
    if (turn % FAN_STEP_TURNS === 0) writer.fan(Math.min(0.8, 0.3 + (0.1 * turn) / FAN_STEP_TURNS));
    if (turn === 0) {
      writer.travelTo(pose(0));
      writer.beginFeature("outer wall");
    }
    const chords = Math.ceil((2 * Math.PI * radiusMm) / DOME_CHORD_MM);
    for (let chord = 1; chord <= chords; chord++) {
      const full = turn === 0 ? (chord - 0.5) / chords : 1;
      const next = pose(turn + chord / chords);
      writer.beadTo(next, full * DOME_BEAD_MM * LAYER_MM, DOME_MM_S, next.zMm);
    }
  }
  return FLANGE_MM + turns * LAYER_MM;
}

/** The fan is turned up by a tenth at every so many turns. */
const FAN_STEP_TURNS = 40;
