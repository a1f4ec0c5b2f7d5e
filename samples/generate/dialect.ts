export type Feature = "skirt" | "outer wall" | "inner wall" | "overhang wall" | "infill" | "bridge";

/** Where a layer stands; `number` counts from 1. */
export interface LayerPlace {
  number: number;
  topMm: number;
  heightMm: number;
}

/** How one kind of sliced file writes things down: everything about a file that is not geometry. */
export interface Dialect {
  newline: "\n" | "\r\n";
  lowerCase: boolean;
  /** N numbers and checksums on command lines */
  numbered: boolean;
  extrusion: "absolute" | "relative";
  travelWord: "G0" | "G1";
  /** F stands before the axis words; otherwise at the end of the line */
  feedFirst: boolean;
  /** the next layer's Z stands on the travel to it; otherwise on a line of its own */
  zRides: boolean;
  retraction: { by: "moves"; lengthMm: number; speedMmS: number } | { by: "firmware" };
  /** 0: none */
  zHopMm: number;
  marker(layer: LayerPlace): string[];
  /** comment before a feature, or null */
  feature(feature: Feature): string | null;
  fan(duty: number): string;
}

const indexedFan = (duty: number, output = "") => `M106${output} S${Math.round(duty * 255)}`;

/** A counting marker from 0, feature comments, absolute E that starts again at every layer. */
export const countedLayers: Dialect = {
  newline: "\n",
  lowerCase: false,
  numbered: false,
  extrusion: "absolute",
  travelWord: "G0",
  feedFirst: true,
  zRides: true,
  retraction: { by: "moves", lengthMm: 1.2, speedMmS: 35 },
  zHopMm: 0,
  marker: ({ number }) => [`;LAYER:${number - 1}`],
  feature: (feature) => `;TYPE:${feature}`,
  fan: (duty) => (duty === 0 ? "M107" : indexedFan(duty)),
};

/** A marker that names the height of the object's layer; N numbers with checksums, firmware retraction and a lift. */
export const numberedObjectLayers: Dialect = {
  newline: "\n",
  lowerCase: false,
  numbered: true,
  extrusion: "relative",
  travelWord: "G1",
  feedFirst: false,
  zRides: false,
  retraction: { by: "firmware" },
  zHopMm: 0.4,
  marker: ({ topMm }) => [`; BEGIN_LAYER_OBJECT z=${topMm.toFixed(2)}`],
  feature: () => null,
  fan: (duty) => (duty === 0 ? "M107 P0" : indexedFan(duty, " P0")),
};

/** Remarks in parentheses in words of its own, lower case, carriage returns. */
export const parenthesisedStrata: Dialect = {
  newline: "\r\n",
  lowerCase: true,
  numbered: false,
  extrusion: "absolute",
  travelWord: "G0",
  feedFirst: false,
  zRides: false,
  retraction: { by: "moves", lengthMm: 1, speedMmS: 35 },
  zHopMm: 0,
  marker: ({ number, topMm }) => [`(stratum ${number} top ${topMm.toFixed(3)})`],
  feature: (feature) => `(course ${STRATUM_WORDS[feature]})`,
  fan: (duty) => (duty === 0 ? "M107" : indexedFan(duty)),
};

const STRATUM_WORDS: Record<Feature, string> = {
  skirt: "kerb",
  "outer wall": "rim",
  "inner wall": "lining",
  "overhang wall": "eaves",
  infill: "core",
  bridge: "lintel",
};

/** A change marker followed by height and thickness; relative E; a fan that is called by its name. */
export const changedLayers: Dialect = {
  newline: "\n",
  lowerCase: false,
  numbered: false,
  extrusion: "relative",
  travelWord: "G1",
  feedFirst: true,
  zRides: false,
  retraction: { by: "moves", lengthMm: 0.8, speedMmS: 30 },
  zHopMm: 0,
  marker: ({ topMm, heightMm }) => [
    ";LAYER_CHANGE",
    `;Z:${Number(topMm.toFixed(3))}`,
    `;HEIGHT:${Number(heightMm.toFixed(3))}`,
  ],
  feature: (feature) => `;TYPE:${feature}`,
  fan: (duty) => `SET_FAN_SPEED FAN=part_cooling SPEED=${duty.toFixed(2)}`,
};
