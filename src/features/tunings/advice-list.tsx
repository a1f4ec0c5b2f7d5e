import type { PlanDocument } from "#shared/formats/plan.ts";

interface Props {
  advice: PlanDocument["advice"];
  onPin(layer: number): void;
}

/** What fan and heater can't put right, and what would help. */
export function AdviceList({ advice, onPin }: Props) {
  if (advice.length === 0) return <p className="text-soft">None: fan and heater can follow this plan.</p>;
  return (
    <ul className="border-t border-ink">
      {advice.map(({ layer, code, message }) => (
        <li
          key={`${layer} ${code} ${message}`}
          className="grid grid-cols-[minmax(0,1fr)_auto] gap-x-4 border-b border-hair py-1.5"
        >
          <span className="wrap-anywhere">{message}</span>
          <button
            type="button"
            onClick={() => onPin(layer)}
            className="min-h-6 font-mono text-small whitespace-nowrap underline decoration-rule underline-offset-4 hover:decoration-ink"
          >
            layer {layer}
          </button>
        </li>
      ))}
    </ul>
  );
}
