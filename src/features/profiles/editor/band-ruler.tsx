import type { BandAxis, BorderUnit } from "#src/features/profiles/editor/band-axis.ts";
import { marksOf } from "#src/lib/scale.ts";

const HEADS: Record<BorderUnit, string> = { mm: "mm", layer: "layer", fraction: "0–1" };

/** The height axis beside bands that stand alone. */
export function BandRuler({ axis, unit }: { axis: BandAxis; unit: BorderUnit }) {
  const { fromMm, toMm, topPx, bottomPx } = axis;
  const yOf = (mm: number) => bottomPx - ((mm - fromMm) / (toMm - fromMm)) * (bottomPx - topPx);
  return (
    <svg
      aria-hidden="true"
      width="52"
      height={bottomPx + 8}
      className="shrink-0 font-mono text-[11px]"
      fill="var(--soft)"
    >
      <text x="0" y={topPx + 4}>
        {HEADS[unit]}
      </text>
      <line x1="51.5" x2="51.5" y1={topPx} y2={bottomPx} stroke="var(--rule)" />
      {marksOf({ kind: "linear", from: fromMm, to: toMm }, 12).map(({ value, text }) => (
        <g key={value}>
          <line x1="46" x2="52" y1={yOf(value)} y2={yOf(value)} stroke="var(--rule)" />
          <text x="43" y={yOf(value) + 4} textAnchor="end">
            {text}
          </text>
        </g>
      ))}
    </svg>
  );
}
