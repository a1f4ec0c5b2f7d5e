import { editor, languages } from "monaco-editor/editor";
import { SHEETS, type Sheet } from "#src/ui/sheet-colours.ts";

export const GCODE = "gcode";
export const themeOf = (sheet: Sheet): string => `sheet-${sheet}`;

let ready = false;

/** G-code as the diff shows it: commands, words and comments told apart by weight and slant rather than by colour. */
export function registerGcode(): void {
  if (ready) return;
  ready = true;
  languages.register({ id: GCODE });
  languages.setMonarchTokensProvider(GCODE, {
    ignoreCase: true,
    tokenizer: {
      root: [
        [/^….*$/, "comment"],
        [/;ql[+=]?\s*$/, "tag"],
        [/;.*$/, "comment"],
        [/\([^)]*\)?/, "comment"],
        [/^\s*N\d+/, "number.line"],
        [/\*\d+/, "number.line"],
        [/[A-Z_]{2,}[A-Z0-9_]*/, "command"],
        [/[GMT]\d+(\.\d+)?/, "command"],
        [/[A-Z](?=\s*[-+.\d=])/, "word"],
        [/[-+]?(\d+\.?\d*|\.\d+)/, "number"],
      ],
    },
  });
  for (const sheet of ["light", "dark"] as const) editor.defineTheme(themeOf(sheet), theme(sheet));
}

function theme(sheet: Sheet): editor.IStandaloneThemeData {
  const { paper, sheet: surface, well, ink, soft, hair, rule } = SHEETS[sheet];
  const token = (name: string, colour: string, fontStyle = "") => ({
    token: name,
    foreground: colour.slice(1),
    fontStyle,
  });
  return {
    base: sheet === "light" ? "vs" : "vs-dark",
    inherit: false,
    rules: [
      token("", ink),
      token("command", ink, "bold"),
      token("word", ink),
      token("number", ink),
      token("number.line", soft),
      token("comment", soft, "italic"),
      token("tag", soft, "italic"),
    ],
    colors: {
      "editor.background": surface,
      "editor.foreground": ink,
      "editorLineNumber.foreground": soft,
      "editorLineNumber.activeForeground": ink,
      "editorCursor.foreground": ink,
      "editor.selectionBackground": `${rule}66`,
      "editor.inactiveSelectionBackground": `${rule}44`,
      "editor.lineHighlightBorder": hair,
      "editor.lineHighlightBackground": surface,
      "editorGutter.background": surface,
      "editorWidget.background": paper,
      "editorWidget.border": rule,
      "input.background": surface,
      "input.foreground": ink,
      "input.border": rule,
      focusBorder: ink,
      "editor.findMatchBackground": well,
      "editor.findMatchBorder": ink,
      "editor.findMatchHighlightBackground": well,
      // What was inserted and removed is said by signs; its colour by the channel it drives (see MonacoDiff).
      "diffEditor.insertedLineBackground": "#00000000",
      "diffEditor.removedLineBackground": "#00000000",
      "diffEditor.insertedTextBackground": "#00000000",
      "diffEditor.removedTextBackground": "#00000000",
      "diffEditorGutter.insertedLineBackground": "#00000000",
      "diffEditorGutter.removedLineBackground": "#00000000",
      "diffEditor.diagonalFill": hair,
      "diffEditor.border": rule,
      "diffEditor.unchangedRegionBackground": paper,
      "diffEditor.unchangedRegionForeground": soft,
      "diffEditor.unchangedCodeBackground": "#00000000",
      "scrollbarSlider.background": `${rule}55`,
      "scrollbarSlider.hoverBackground": `${rule}88`,
      "scrollbarSlider.activeBackground": rule,
      "scrollbar.shadow": "#00000000",
      "widget.shadow": "#00000000",
    },
  };
}
