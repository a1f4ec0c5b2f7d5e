import { colourProperty, SHEETS, type SheetColour } from "#src/ui/sheet-colours.ts";

/** The sheet's colours as they hold for an element now: a canvas can't use custom properties. */
export type Palette = Record<SheetColour, string>;

export function readPalette(element: Element): Palette {
  const style = getComputedStyle(element);
  return Object.fromEntries(
    Object.entries(SHEETS.light).map(([name, fallback]) => [
      name,
      style.getPropertyValue(colourProperty(name)).trim() || fallback,
    ]),
  ) as Palette;
}
