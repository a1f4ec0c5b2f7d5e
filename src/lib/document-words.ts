/**
 * What the places of our documents are called on screen, with their units: one word for one thing, whether a page shows
 * it, an editor asks for it or two versions differ in it. `*` stands for a name or a position, `{}` for that name in the
 * words. Places without words of their own are left out of a longer place.
 */
const WORDS: Record<string, string | readonly [words: string, unit: string]> = {
  name: "Name",
  polymer: "Polymer",
  variant: "Variant",

  // machines
  "channels.*": "Channel {}",
  "channels.*.id": "Id",
  "channels.*.kind": "Kind",
  "channels.*.drive": "Command",
  "channels.*.drive.by": "by",
  "channels.*.drive.index": "index",
  "channels.*.drive.pin": "pin",
  "channels.*.drive.name": "name in the firmware",
  "channels.*.drive.fullScale": "full power",
  "channels.*.minDuty": ["Least duty", "0–1"],
  "channels.*.maxDuty": ["Most duty", "0–1"],
  "channels.*.idleDuty": ["Idle duty", "0–1"],
  "channels.*.startBoostS": ["Start boost", "s"],
  "channels.*.settleS": ["Settle time", "s"],
  "channels.*.maxDutyPerS": ["Change", "a second"],
  "channels.*.acts": "Takes effect",
  "channels.*.acts.immediate": ["ahead of the motion by up to", "s"],
  motion: "Motion",
  "motion.maxSpeedMmS": ["Top speed", "mm/s"],
  "motion.accelMmS2.print": ["Acceleration, printing", "mm/s²"],
  "motion.accelMmS2.travel": ["Acceleration, travelling", "mm/s²"],
  "motion.accelMmS2.retract": ["Acceleration, retracting", "mm/s²"],
  "motion.axes.x.maxSpeedMmS": ["X, top speed", "mm/s"],
  "motion.axes.x.maxAccelMmS2": ["X, acceleration", "mm/s²"],
  "motion.axes.y.maxSpeedMmS": ["Y, top speed", "mm/s"],
  "motion.axes.y.maxAccelMmS2": ["Y, acceleration", "mm/s²"],
  "motion.axes.z.maxSpeedMmS": ["Z, top speed", "mm/s"],
  "motion.axes.z.maxAccelMmS2": ["Z, acceleration", "mm/s²"],
  "motion.axes.e.maxSpeedMmS": ["E, top speed", "mm/s"],
  "motion.axes.e.maxAccelMmS2": ["E, acceleration", "mm/s²"],
  "motion.extruderLimits": "Limits of E hold for",
  "motion.cornering.rule": "Corners by",
  "motion.cornering.speedMmS": ["Speed through a right angle", "mm/s"],
  "motion.cornering.cruiseRatio": ["Least cruised share of a move", "0–1"],
  "motion.cornering.extruderStepMmS": ["Largest jump of E", "mm/s"],
  "motion.cornering.deviationMm": ["Deviation at a corner", "mm"],
  "motion.cornering.jerkMmS.x": ["Largest jump of X", "mm/s"],
  "motion.cornering.jerkMmS.y": ["Largest jump of Y", "mm/s"],
  "motion.cornering.jerkMmS.z": ["Largest jump of Z", "mm/s"],
  "motion.cornering.jerkMmS.e": ["Largest jump of E", "mm/s"],
  "motion.stopAtExtrudeOnly": "A move of E alone is a full stop",
  "motion.arcSegmentMm": ["Chord of arcs", "mm"],
  "motion.firmwareRetract.lengthMm": ["Firmware retraction, length", "mm"],
  "motion.firmwareRetract.speedMmS": ["Firmware retraction, speed", "mm/s"],
  "motion.initialSpeedMmS": ["Speed before the first F", "mm/s"],
  "motion.lookAhead": "Look-ahead",
  "motion.honourFileLimits": "Limits set in the file hold, never above these",
  "motion.dwellP": "P of a dwell is in",
  "motion.axisModeSetsExtruder": "G90 and G91 set the mode of E too",
  "motion.filamentDiameterMm": ["Filament diameter", "mm"],
  "pauses.*": "Pause {}",
  "pauses.*.command": "Command",
  "pauses.*.blocking": "No further line is read until the print goes on",
  thermal: "Surroundings",
  "thermal.calibration": "Calibration",
  "thermal.roomAirC": ["Air", "°C"],
  "thermal.wallsC": ["Walls", "°C"],
  "thermal.bedAir.riseC": ["Air above the bed, warmer by", "K"],
  "thermal.bedAir.decayMm": ["Its excess fades over", "mm"],
  "thermal.convection.h0WM2K": ["Convection, fans off", "W/(m²·K)"],
  "thermal.bedContactM2KW": ["Contact of bed and part", "m²·K/W"],
  "thermal.convection.fans.*": "fan {}",
  "thermal.convection.fans.*.h1WM2K": ["Convection added at full duty", "W/(m²·K)"],
  "thermal.convection.fans.*.exponent": "Convection goes with duty to the power",
  "thermal.lamps.*": "heater {}",
  "thermal.lamps.*.fluxAtFullWM2": ["Irradiance of the top at full duty", "W/m²"],
  "thermal.lamps.*.sideShare": ["Share of it on the sides", "0–1"],
  "thermal.lamps.*.exponent": "Irradiance goes with duty to the power",
  "thermal.lamps.*.lagS": ["Lag of the filament", "s"],
  "thermal.surroundings.riseAtFullLampC": ["Air warms with the lamps by", "K"],
  "thermal.surroundings.lagS": ["Lag of the air", "s"],

  // profiles
  "zones.*": "Zone {}",
  "zones.*.name": "Name",
  "zones.*.from": "Above",
  "zones.*.to": "Up to",
  "zones.*.unit": "Borders in",
  "zones.*.target": "Target",
  "zones.*.pattern": "Target",
  "zones.*.pattern.kind": "changes",
  "zones.*.pattern.amorphousLayers": "amorphous layers in turn",
  "zones.*.pattern.semiCrystallineLayers": "semi-crystalline layers in turn",
  "zones.*.pattern.first": "first in turn",
  "zones.*.pattern.from": "at the bottom",
  "zones.*.pattern.to": "at the top",
  "zones.*.rampMm": ["Ramp", "mm"],
  "zones.*.cooling": "Cooling",
  "zones.*.heating": "Heating",
  "zones.*.cooling.*": "Cooling {}",
  "zones.*.heating.*": "Heating {}",
  ...rule("zones.*.cooling.*"),
  ...rule("zones.*.heating.*"),
  // The only rule of a side may stand without a list.
  ...rule("zones.*.cooling"),
  ...rule("zones.*.heating"),
  "bedLayers.count": "Bed layers",
  "bedLayers.duty.*": ["Bed layers, {}", "0–1"],
  "limits.*": "Limits of {}",
  "limits.*.minDuty": ["least duty", "0–1"],
  "limits.*.maxDuty": ["most duty", "0–1"],
  "limits.*.maxDutyPerLayer": ["change", "a layer"],
  "limits.*.maxDutyPerS": ["change", "a second"],
  "limits.*.endRampMm": ["stepped down over the last", "mm"],
  "lead.*": ["Ahead, {}", "s"],
  withinLayer: "Fan commands inside a layer",
  margins: "Margins",

  // polymers
  tgC: ["Glass transition, Tg", "°C"],
  tmC: ["Melting, Tm", "°C"],
  solidBelowC: ["Keeps its shape below", "°C"],
  solidAtRelativeCrystallinity: ["Keeps its shape from relative crystallinity", "0–1"],
  weldAboveC: ["Layers weld above", "°C"],
  amorphousReachable: "Amorphous is within reach when it is printed",
  "margins.belowTgC": ["Amorphous: below Tg by", "K"],
  "margins.aboveTgC": ["Semi-crystalline: above Tg by", "K"],
  "margins.maxCrystallinity": ["Amorphous: crystallinity at most", "0–1"],
  "margins.minCrystallinity": ["Semi-crystalline: crystallinity at least", "0–1"],
  densityKgM3: ["Density", "kg/m³"],
  conductivityWMK: ["Conductivity", "W/(m·K)"],
  heatCapacityJKgK: ["Heat capacity", "J/(kg·K)"],
  emissivity: ["Emissivity", "0–1"],
  "lampAbsorptivity.low": ["Absorbs of the lamp, at the least", "0–1"],
  "lampAbsorptivity.typical": ["Absorbs of the lamp, typically", "0–1"],
  "lampAbsorptivity.high": ["Absorbs of the lamp, at the most", "0–1"],
  crystallinity: "Crystallinity",
  "crystallinity.heatOfFusionJG": ["Heat of fusion of the crystal", "J/g"],
  "crystallinity.attainable": ["Attainable crystallinity", "0–1"],
  "crystallinity.avramiN": "Avrami exponent",
  "crystallinity.fastestPerS": ["Fastest rate", "1/s"],
  "crystallinity.fastestAtC": ["Fastest at", "°C"],
  "crystallinity.halfWidthC": ["Half-width of the rate at half its height", "K"],
  "crystallinity.halfTimes": "Half-times",
};

function rule(path: string): typeof WORDS {
  return {
    [`${path}.channel`]: "channel",
    [`${path}.rule`]: "rule",
    [`${path}.duty`]: ["duty", "0–1"],
    [`${path}.over`]: "read over",
    [`${path}.points`]: "curve",
    [`${path}.points.*`]: "point {} of the curve",
    [`${path}.baseDuty`]: ["base duty", "0–1"],
  };
}

export const hasWords = (pattern: string): boolean => Object.hasOwn(WORDS, pattern);

/** @param pattern e.g. `channels.*.minDuty` */
export function wordsOf(pattern: string): string {
  const entry = WORDS[pattern];
  if (entry === undefined) throw new Error(`There are no words for ${pattern}.`);
  return typeof entry === "string" ? entry : entry[0];
}

export function unitOf(pattern: string): string | undefined {
  const entry = WORDS[pattern];
  return entry === undefined || typeof entry === "string" ? undefined : entry[1];
}

/** A field's label and unit. */
export const named = (pattern: string) => ({ label: wordsOf(pattern), unit: unitOf(pattern) });

/** What chosen words of a document are called; a word that is not here stands for itself. */
const CHOICES: Record<string, string> = {
  none: "no target",
  fraction: "fractions of the height",
  layer: "layer numbers",
  heater: "radiant heater",
  fan: "part-cooling fan",
  "keep-raises": "raises above the plan are kept",
  replace: "replaced by the plan",
  settle: "half the settle time",
  full: "the whole file",
  queued: "in step with motion",
  "extrude-only": "moves of E alone",
  "every-move": "every move",
  "square-corner-velocity": "speed through a right angle",
  "junction-deviation": "deviation at a corner",
  "axis-jerk": "jump of each axis",
  "fan-index": "fan index, M106",
  pin: "pin, M42",
  "named-fan": "name, SET_FAN_SPEED",
  "named-pin": "name, SET_PIN",
  "layer-time": "layer time",
  "deposited-length": "deposited length",
  fixed: "one duty throughout",
  curve: "a curve",
  hold: "solved from the target",
  alternating: "by turns",
  graded: "from one to the other",
};

export const choiceText = (word: string): string => CHOICES[word] ?? word;
