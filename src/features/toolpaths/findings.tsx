import { type Finding, findingGroups } from "#src/features/toolpaths/finding-groups.ts";
import { counted } from "#src/lib/format.ts";

interface Props {
  findings: readonly Finding[];
  onPin(layer: number): void;
  /** shows a line of the file; left out where lines can't be shown */
  onLine?(line: number): void;
  /** whether a line belongs to a layer, so that it can be shown */
  hasLine?(line: number): boolean;
}

const LINK = "min-h-6 underline decoration-rule underline-offset-4 hover:decoration-ink";

/** What looks wrong in the file, or is good to know, by what it concerns. */
export function Findings({ findings, onPin, onLine, hasLine }: Props) {
  if (findings.length === 0) return <p className="text-soft">Nothing in this file looks wrong.</p>;
  return (
    <div className="flex flex-col gap-4">
      {findingGroups(findings).map(({ title, findings: some }) => (
        <section key={title} aria-label={title}>
          <h3 className="border-b border-ink pb-1 text-small font-semibold">{title}</h3>
          <ul>
            {some.map(({ severity, line, layer, message }, position) => (
              <li
                // biome-ignore lint/suspicious/noArrayIndexKey: the list of a finished reading never changes
                key={position}
                className="grid grid-cols-[5rem_minmax(0,1fr)_auto] gap-x-3 border-b border-hair py-1.5"
              >
                <span className={severity === "warning" ? "font-semibold" : "text-soft"}>
                  {severity === "warning" ? "! Warning" : "Note"}
                </span>
                <span className="wrap-anywhere">{message}</span>
                <span className="flex flex-wrap justify-end gap-x-3 font-mono text-small whitespace-nowrap text-soft">
                  {line !== undefined &&
                    (onLine && hasLine?.(line) ? (
                      <button type="button" onClick={() => onLine(line)} className={LINK}>
                        line {counted(line)}
                      </button>
                    ) : (
                      `line ${counted(line)}`
                    ))}
                  {layer !== undefined && (
                    <button type="button" onClick={() => onPin(layer)} className={LINK}>
                      layer {layer}
                    </button>
                  )}
                </span>
              </li>
            ))}
          </ul>
        </section>
      ))}
    </div>
  );
}
