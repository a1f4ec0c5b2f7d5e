import type { LogMark } from "#src/features/layer-log/track.ts";

/** What was found at the layer one looks at. */
export function MarkNotes({ marks, layer }: { marks: readonly LogMark[]; layer: number | undefined }) {
  const here = marks.filter((mark) => mark.layer === layer);
  if (marks.length === 0) return null;
  return (
    <ul aria-label="At this layer" className="min-h-7 border-t border-hair px-2 py-1 text-small">
      {here.length === 0 && (
        <li className="text-soft">{`${marks.length === 1 ? "1 finding or advice" : `${marks.length} findings and advice`}, marked at the layer`}</li>
      )}
      {here.map(({ message, severity }) => (
        <li key={message}>
          <span className="font-semibold">{severity === "warning" ? "Warning" : "Note"}</span> {message}
        </li>
      ))}
    </ul>
  );
}
