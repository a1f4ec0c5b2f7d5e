import { type Remark, SEVERITY_NAMES } from "#src/lib/remarks.ts";

interface Props {
  remarks: readonly Remark[];
  /** temperatures are predicted: nothing to remark then says more */
  predicted: boolean;
  onPin(layer: number): void;
}

/** Warnings about the file, and what fan and heater can't put right. */
export function RemarkList({ remarks, predicted, onPin }: Props) {
  if (remarks.length === 0) {
    return (
      <p className="text-soft">
        {predicted
          ? "None: no limit of fan or heater was met, and every layer is predicted to come out as wanted."
          : "No limit of fan or heater was met. Temperature is not predicted."}
      </p>
    );
  }
  return (
    <ul className="border-t border-ink">
      {remarks.map(({ layer, severity, message }) => (
        <li
          key={`${layer} ${message}`}
          className="grid grid-cols-[5rem_minmax(0,1fr)_auto] gap-x-3 border-b border-hair py-1.5"
        >
          <span className={severity === "warning" ? "font-semibold" : "text-soft"}>{SEVERITY_NAMES[severity]}</span>
          <span className="wrap-anywhere">{message}</span>
          {layer !== undefined && (
            <button
              type="button"
              onClick={() => onPin(layer)}
              className="min-h-6 self-start font-mono text-small whitespace-nowrap underline decoration-rule underline-offset-4 hover:decoration-ink"
            >
              layer {layer}
            </button>
          )}
        </li>
      ))}
    </ul>
  );
}
