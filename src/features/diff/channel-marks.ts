import type { editor } from "monaco-editor/editor";
import type { Machine } from "#shared/formats/machine.ts";
import { ALIKE } from "#src/features/diff/join-hunks.ts";
import { lineChannels } from "#src/features/diff/line-channel.ts";

/** Lays slate over changed lines that drive a fan, ember over those that drive a heater, grey over any other. */
export function markByChannel(diff: editor.IStandaloneDiffEditor, machine: Machine) {
  const channelOf = lineChannels(machine);
  const sides = [
    { shown: diff.getOriginalEditor(), marks: diff.getOriginalEditor().createDecorationsCollection() },
    { shown: diff.getModifiedEditor(), marks: diff.getModifiedEditor().createDecorationsCollection() },
  ];

  const decorate = (side: (typeof sides)[number], ranges: [from: number, to: number][]) => {
    const model = side.shown.getModel();
    if (!model) return;
    const decorations: editor.IModelDeltaDecoration[] = [];
    for (const [from, to] of ranges) {
      // A range that ends before it begins stands between two lines: nothing of this side.
      for (let line = from; line <= to; line++) {
        const kind = channelOf(model.getLineContent(line))?.kind ?? "other";
        decorations.push({
          range: { startLineNumber: line, startColumn: 1, endLineNumber: line, endColumn: 1 },
          options: { isWholeLine: true, className: `diff-${kind}`, marginClassName: `diff-${kind} diff-edge` },
        });
      }
    }
    for (let line = 1; line <= model.getLineCount(); line++) {
      if (!ALIKE.test(model.getLineContent(line))) continue;
      decorations.push({
        range: { startLineNumber: line, startColumn: 1, endLineNumber: line, endColumn: 1 },
        options: { isWholeLine: true, className: "diff-alike", marginClassName: "diff-alike" },
      });
    }
    side.marks.set(decorations);
  };

  return {
    show(changes: readonly editor.ILineChange[]) {
      decorate(
        sides[0],
        changes
          .filter((change) => change.originalEndLineNumber > 0)
          .map((change) => [change.originalStartLineNumber, change.originalEndLineNumber]),
      );
      decorate(
        sides[1],
        changes
          .filter((change) => change.modifiedEndLineNumber > 0)
          .map((change) => [change.modifiedStartLineNumber, change.modifiedEndLineNumber]),
      );
    },
    clear() {
      for (const { marks } of sides) marks.clear();
    },
  };
}
