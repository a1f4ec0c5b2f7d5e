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

interface Props {
  original: DiffSide;
  tuned: DiffSide;
  machine: Machine;
  handle: RefObject<DiffHandle | null>;
  /** how many places differ; undefined while they are being looked for */
  onChanges(count: number | undefined): void;
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
      models?.original.dispose();
      models?.modified.dispose();
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
    shown.getOriginalEditor().updateOptions(numbered(original, "Original file"));
    shown.getModifiedEditor().updateOptions(numbered(tuned, "Tuned file"));
    shown.setModel(next);
    before?.original.dispose();
    before?.modified.dispose();
    const marks = markByChannel(shown, machine);
    const updated = shown.onDidUpdateDiff(() => {
      const changes = shown.getLineChanges() ?? [];
      marks.show(changes);
      report.current(changes.length);
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

  return <div ref={box} className="h-[28rem] overflow-hidden border border-rule" />;
}

const numbered = ({ lineNumbers }: DiffSide, ariaLabel: string): editor.IEditorOptions => ({
  lineNumbers: (line) => lineNumbers[line - 1] ?? "",
  ariaLabel,
});

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
  hideUnchangedRegions: { enabled: true, contextLineCount: 4, minimumLineCount: 6 },
  minimap: { enabled: false },
  scrollBeyondLastLine: false,
  fontFamily: '"JetBrains Mono", ui-monospace, monospace',
  fontLigatures: false,
  fontSize: 13,
  lineHeight: 20,
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
