import "#src/features/diff/monaco-environment.ts";
import { editor } from "monaco-editor/editor";
import { type RefObject, useEffect, useImperativeHandle, useRef } from "react";
import type { Machine } from "#shared/formats/machine.ts";
import { markByChannel } from "#src/features/diff/channel-marks.ts";
import { GCODE, registerGcode, themeOf } from "#src/features/diff/gcode-language.ts";
import type { DiffSide } from "#src/features/diff/join-hunks.ts";
import { useShownSheet } from "#src/lib/sheet.ts";

export interface DiffHandle {
  toChange(direction: "next" | "previous"): void;
}

export interface DiffChanges {
  /** how many places differ */
  places: number;
  /** lines of the original that are gone, and lines that the tuned file has in addition */
  out: number;
  in: number;
}

interface Props {
  original: DiffSide;
  tuned: DiffSide;
  machine: Machine;
  handle: RefObject<DiffHandle | null>;
  /** undefined while they are being looked for */
  onChanges(changes: DiffChanges | undefined): void;
}

/** Both files side by side, with their own line numbers. */
export function MonacoDiff({ original, tuned, machine, handle, onChanges }: Props) {
  const box = useRef<HTMLDivElement>(null);
  const diff = useRef<editor.IStandaloneDiffEditor>(undefined);
  const sheet = useShownSheet();
  const report = useRef(onChanges);
  report.current = onChanges;

  useEffect(() => {
    if (!box.current) return;
    registerGcode();
    const made = editor.createDiffEditor(box.current, OPTIONS);
    diff.current = made;
    return () => {
      // The editor goes before its models, or it complains of being left without them.
      const models = made.getModel();
      made.dispose();
      disposeLater(models);
      diff.current = undefined;
    };
  }, []);

  useEffect(() => {
    registerGcode();
    editor.setTheme(themeOf(sheet));
  }, [sheet]);

  useEffect(() => {
    const shown = diff.current;
    if (!shown) return;
    report.current(undefined);
    const before = shown.getModel();
    const next = {
      original: editor.createModel(original.text, GCODE),
      modified: editor.createModel(tuned.text, GCODE),
    };
    shown.getOriginalEditor().updateOptions(numbered(original));
    shown.getModifiedEditor().updateOptions(numbered(tuned));
    shown.setModel(next);
    disposeLater(before);
    nameSide(shown.getOriginalEditor(), "Original file");
    nameSide(shown.getModifiedEditor(), "Tuned file");
    const marks = markByChannel(shown, machine);
    const updated = shown.onDidUpdateDiff(() => {
      const changes = shown.getLineChanges() ?? [];
      marks.show(changes);
      report.current(changesOf(changes));
      if (changes.length > 0) shown.revealFirstDiff();
    });
    return () => {
      updated.dispose();
      marks.clear();
    };
  }, [original, tuned, machine]);

  useImperativeHandle(handle, () => ({
    toChange: (direction) => {
      diff.current?.goToDiff(direction);
      diff.current?.getModifiedEditor().focus();
    },
  }));

  return (
    <div
      ref={box}
      className="max-h-[28rem] min-h-32 overflow-hidden border border-rule"
      style={{ height: Math.max(linesIn(original), linesIn(tuned)) * LINE_PX + SPARE_PX }}
    />
  );
}

/** A comparison that is under way asks its worker for both texts, and complains where they are gone: they go behind it. */
function disposeLater(models: editor.IDiffEditorModel | null): void {
  setTimeout(() => {
    models?.original.dispose();
    models?.modified.dispose();
  }, COMPARED_MS);
}

/** Longer than comparing the lines of a layer ever takes. */
const COMPARED_MS = 10_000;

/** The editor names its own text box only while it takes a screen reader to be there. */
function nameSide(side: editor.ICodeEditor, name: string): void {
  side.updateOptions({ ariaLabel: name });
  side.getDomNode()?.querySelector("[role=textbox], textarea")?.setAttribute("aria-label", name);
}

const LINE_PX = 20;
/** A wrapped line or two, and the editor's own edges. */
const SPARE_PX = 64;

const linesIn = ({ lineNumbers }: DiffSide): number => lineNumbers.length;

const numbered = ({ lineNumbers }: DiffSide): editor.IEditorOptions => ({
  lineNumbers: (line) => lineNumbers[line - 1] ?? "",
});

function changesOf(changes: readonly editor.ILineChange[]): DiffChanges {
  const length = (from: number, to: number) => (to === 0 ? 0 : to - from + 1);
  return {
    places: changes.length,
    out: changes.reduce((sum, each) => sum + length(each.originalStartLineNumber, each.originalEndLineNumber), 0),
    in: changes.reduce((sum, each) => sum + length(each.modifiedStartLineNumber, each.modifiedEndLineNumber), 0),
  };
}

const OPTIONS: editor.IStandaloneDiffEditorConstructionOptions = {
  automaticLayout: true,
  readOnly: true,
  originalEditable: false,
  domReadOnly: true,
  renderSideBySide: true,
  useInlineViewWhenSpaceIsLimited: true,
  renderSideBySideInlineBreakpoint: 700,
  renderGutterMenu: false,
  renderIndicators: true,
  renderOverviewRuler: false,
  ignoreTrimWhitespace: false,
  diffWordWrap: "on",
  renderLineHighlight: "none",
  minimap: { enabled: false },
  scrollBeyondLastLine: false,
  fontFamily: '"JetBrains Mono", ui-monospace, monospace',
  fontLigatures: false,
  fontSize: 13,
  lineHeight: LINE_PX,
  lineNumbersMinChars: 7,
  // Room for the plus or minus between number and text.
  lineDecorationsWidth: 26,
  glyphMargin: false,
  folding: false,
  contextmenu: false,
  links: false,
  occurrencesHighlight: "off",
  selectionHighlight: false,
  unicodeHighlight: { ambiguousCharacters: false, invisibleCharacters: false },
  accessibilitySupport: "auto",
};
