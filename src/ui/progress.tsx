import type { ReactNode } from "react";
import { fixedText } from "#src/lib/number-text.ts";
import { Button } from "#src/ui/button.tsx";

interface Props {
  label: string;
  /** 0-1; undefined while nothing is known yet */
  share?: number;
  detail?: ReactNode;
  onCancel?(): void;
}

const TICKS = Array.from({ length: 11 }, (_, tick) => tick);

/** A scale with a mark that moves along it. */
export function Progress({ label, share, detail, onCancel }: Props) {
  const percent = share === undefined ? undefined : Math.min(100, Math.max(0, share * 100));
  return (
    <div className="flex flex-wrap items-center gap-x-4 gap-y-2">
      <div className="min-w-48 grow">
        <div className="flex justify-between gap-4 text-small">
          <span>{label}</span>
          <span className="font-mono">{percent === undefined ? "" : `${fixedText(percent, 0)} %`}</span>
        </div>
        <div
          role="progressbar"
          aria-label={label}
          aria-valuemin={0}
          aria-valuemax={100}
          aria-valuenow={percent === undefined ? undefined : Math.round(percent)}
          className="relative mt-1 h-3 border-b border-ink"
        >
          <svg
            aria-hidden
            className="absolute inset-0 size-full text-rule"
            preserveAspectRatio="none"
            viewBox="0 0 100 10"
          >
            {TICKS.map((tick) => (
              <line
                key={tick}
                x1={tick * 10}
                x2={tick * 10}
                y1={tick % 5 === 0 ? 0 : 5}
                y2={10}
                stroke="currentColor"
                vectorEffect="non-scaling-stroke"
              />
            ))}
          </svg>
          <div className="absolute bottom-0 left-0 h-1.5 bg-ink" style={{ width: `${percent ?? 0}%` }} />
        </div>
        {detail && <div className="mt-1 font-mono text-small text-soft">{detail}</div>}
      </div>
      {onCancel && <Button onClick={onCancel}>Cancel</Button>}
    </div>
  );
}
