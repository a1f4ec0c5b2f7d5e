import type { Config } from "tailwindcss";
import plugin from "tailwindcss/plugin";
import { colourProperty, SHEETS, type SheetColour } from "./src/ui/sheet-colours.ts";

const properties = (colours: Record<string, string>) =>
  Object.fromEntries(Object.entries(colours).map(([name, value]) => [colourProperty(name), value]));

const TEXT_FACE = ['"Source Sans 3"', "Calibri", "Carlito", '"Noto Sans"', "system-ui", "sans-serif"];

const names = Object.keys(SHEETS.light) as SheetColour[];

export default {
  theme: {
    // Only the colours of the sheets: a class for any other does not exist.
    colors: {
      transparent: "transparent",
      current: "currentColor",
      ...Object.fromEntries(names.map((name) => [colourProperty(name).slice(2), `var(${colourProperty(name)})`])),
    },
    fontFamily: {
      text: TEXT_FACE,
      mono: ['"JetBrains Mono"', "ui-monospace", "monospace"],
    },
    fontSize: {
      fine: ["0.75rem", "1rem"],
      small: ["0.8125rem", "1.125rem"],
      base: ["0.9375rem", "1.375rem"],
      lead: ["1.125rem", "1.5rem"],
      title: ["1.5rem", "1.875rem"],
    },
    borderRadius: { none: "0", DEFAULT: "1px" },
  },
  plugins: [
    // The system's choice holds until a person makes one of their own (data-sheet on the root element).
    plugin(({ addBase }) =>
      addBase({
        ":root": { ...properties(SHEETS.light), colorScheme: "light", "--text-face": TEXT_FACE.join(", ") },
        "@media (prefers-color-scheme: dark)": {
          ":root:not([data-sheet=light])": { ...properties(SHEETS.dark), colorScheme: "dark" },
        },
        ":root[data-sheet=dark]": { ...properties(SHEETS.dark), colorScheme: "dark" },
      }),
    ),
  ],
} satisfies Config;
