import type { ReadingDocument } from "#shared/formats/reading.ts";

type Finding = ReadingDocument["findings"][number];

interface Props {
  findings: readonly Finding[];
  onPin(layer: number): void;
}

/** What looks wrong in the file, or is good to know; warnings first. */
export function Findings({ findings, onPin }: Props) {
  if (findings.length === 0) return <p className="text-soft">Nothing in this file looks wrong.</p>;
  const sorted = [...findings].sort((a, b) => Number(b.severity === "warning") - Number(a.severity === "warning"));
  return (
    <ul className="border-t border-ink">
      {sorted.map(({ code, severity, line, layer, message }, position) => (
        // biome-ignore lint/suspicious/noArrayIndexKey: the list of a finished reading never changes
        <li key={position} className="grid grid-cols-[1.25rem_minmax(0,1fr)_auto] gap-x-3 border-b border-hair py-1.5">
          <span aria-hidden className="text-center font-mono font-bold">
            {severity === "warning" ? "!" : "·"}
          </span>
          <span className="wrap-anywhere">
            <span className="sr-only">{severity}: </span>
            {message} <code className="font-mono text-fine text-soft">{code}</code>
          </span>
          <span className="text-right font-mono text-small whitespace-nowrap text-soft">
            {line !== undefined && `line ${line}`}
            {layer !== undefined && (
              <button
                type="button"
                onClick={() => onPin(layer)}
                className="ml-3 min-h-6 underline decoration-rule underline-offset-4 hover:decoration-ink"
              >
                layer {layer}
              </button>
            )}
          </span>
        </li>
      ))}
    </ul>
  );
}
