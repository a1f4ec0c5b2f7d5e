/**
 * The colours of the two sheets, one table for the style sheet, the layer log and the diff. Surfaces and type are paper
 * and graphite. Colour is kept for what it says: material state (amorphous amber, semi-crystalline bone), cooling slate
 * and heating ember. `*Ink` is the shade of a colour that is dark (or light) enough for text,
 * `*Hatch` the one that shows on the state's own fill: dark on both sheets, for the fills are light on both.
 */
const light = {
  /** the page, what lies on it, and what is pressed into it */
  paper: "#f4f2ed",
  sheet: "#fbfaf7",
  well: "#e8e5dd",
  /** text, and text of second rank */
  ink: "#23262a",
  soft: "#54595f",
  /** hairlines that only divide, and lines that bound something one can operate */
  hair: "#d3cfc5",
  rule: "#85827a",
  amber: "#c98a1e",
  amberInk: "#7a4e08",
  amberHatch: "#7a4e08",
  bone: "#e2d7bd",
  boneEdge: "#8c8061",
  boneHatch: "#8c8061",
  cool: "#44698c",
  coolInk: "#37597a",
  heat: "#b9491f",
  heatInk: "#9c3b17",
};

const dark: typeof light = {
  paper: "#17191c",
  sheet: "#1f2225",
  well: "#2a2d31",
  ink: "#e7e4dc",
  soft: "#aeada6",
  hair: "#34383d",
  rule: "#7d8085",
  amber: "#d79f45",
  amberInk: "#e9bb6c",
  amberHatch: "#1f1503",
  bone: "#d6ccb3",
  boneEdge: "#a59a7c",
  boneHatch: "#544a30",
  cool: "#7ea3c6",
  coolInk: "#9bbbd8",
  heat: "#e2764a",
  heatInk: "#f39a74",
};

export const SHEETS = { light, dark };
export type Sheet = keyof typeof SHEETS;
export type SheetColour = keyof typeof light;

/** `boneEdge` -> `--bone-edge`, the custom property that holds it on the page. */
export function colourProperty(name: string): string {
  return `--${name.replace(/[A-Z]/g, (letter) => `-${letter.toLowerCase()}`)}`;
}
