import type { LogMark } from "#src/features/layer-log/track.ts";
import { SEVERITY_NAMES } from "#src/lib/remarks.ts";

/** What was found at the layer one looks at. */
export function MarkNotes({ marks, layer }: { marks: readonly LogMark[]; layer: number | undefined }) {
  const here = marks.filter((mark) => mark.layer === layer);
  if (marks.length === 0) return null;
  return (
    <ul aria-label="At this layer" className="min-h-7 border-t border-hair px-2 py-1 text-small">
      {here.length === 0 && (
        <li className="text-soft">Nothing at this layer; a wedge in the log marks where there is.</li>
      )}
      {here.map(({ message, severity }) => (
        <li key={message}>
          <span className="font-semibold">{SEVERITY_NAMES[severity]}</span> {message}
        </li>
      ))}
    </ul>
  );
}
