import type { ReactNode } from "react";
import type { Problem } from "#src/lib/problem.ts";
import { classNames } from "#src/ui/class-names.ts";

export type NoticeKind = "note" | "caution" | "fault" | "done";

const MARKS: Record<NoticeKind, { sign: string; word: string; edge: string }> = {
  note: { sign: "i", word: "Note", edge: "border-rule" },
  caution: { sign: "!", word: "Caution", edge: "border-ink border-l-4" },
  fault: { sign: "×", word: "Fault", edge: "border-ink border-l-4" },
  done: { sign: "✓", word: "Done", edge: "border-rule" },
};

interface Props {
  kind: NoticeKind;
  title?: ReactNode;
  children?: ReactNode;
  actions?: ReactNode;
}

/** Something said in place. Faults are announced at once; weight and sign tell them apart, not colour. */
export function Notice({ kind, title, children, actions }: Props) {
  const { sign, word, edge } = MARKS[kind];
  return (
    <div
      role={kind === "fault" ? "alert" : "status"}
      className={classNames("flex gap-3 border bg-sheet px-4 py-3", edge)}
    >
      <span aria-hidden className="w-4 shrink-0 text-center font-mono font-bold">
        {sign}
      </span>
      <div className="min-w-0 grow">
        <span className="sr-only">{word}: </span>
        {title && <p className="font-semibold">{title}</p>}
        {children && <div className="whitespace-pre-line wrap-anywhere">{children}</div>}
        {actions && <div className="mt-2 flex flex-wrap gap-3">{actions}</div>}
      </div>
    </div>
  );
}

/** Messages of the engine go after a file's name and begin small. */
const sentence = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);

/** What went wrong, where, and what to do about it. */
export function ProblemNotice({ problem, actions }: { problem: Problem; actions?: ReactNode }) {
  const { title, detail, remedy, errors, place } = problem;
  return (
    <Notice kind="fault" title={title} actions={actions}>
      <p>{sentence(detail)}</p>
      {errors && errors.length > 0 && (
        <ul className="mt-1 list-inside list-['–_']">
          {errors.map(({ path, message }) => (
            <li key={path + message}>
              <code className="font-mono text-small">{path}</code> {message}
            </li>
          ))}
        </ul>
      )}
      {place?.line !== undefined && <p className="font-mono text-small">line {place.line}</p>}
      {remedy && <p className="mt-1">{remedy}</p>}
    </Notice>
  );
}
