import type { Polymer, Sourced } from "#shared/formats/polymer.ts";
import type { Margins } from "#shared/formats/profile.ts";
import { fixedText } from "#src/lib/number-text.ts";
import { Unverified } from "#src/ui/unverified.tsx";

interface Row {
  label: string;
  value: number;
  unit: string;
  decimals: number;
  /** undefined where it is the profile's own number */
  sourced?: Sourced;
}

/** What the layer is measured against, from the polymer's card or the profile. */
export function CardLimits({ polymer, margins }: { polymer: Polymer; margins: Required<Margins> }) {
  const card = (label: string, sourced: Sourced): Row => ({
    label,
    value: sourced.value,
    unit: "°C",
    decimals: 0,
    sourced,
  });
  const margin = (label: string, field: keyof Margins, unit: string, decimals: number): Row => {
    const sourced = polymer.margins[field];
    const value = margins[field];
    return { label, value, unit, decimals, sourced: value === sourced.value ? sourced : undefined };
  };
  const rows = [
    card("Tg", polymer.tgC),
    card("Solid below", polymer.solidBelowC),
    card("Welds above", polymer.weldAboveC),
    margin("Amorphous: below Tg by", "belowTgC", "K", 0),
    margin("Semi-crystalline: above Tg by", "aboveTgC", "K", 0),
    ...(polymer.crystallinity === null
      ? []
      : [
          margin("Amorphous: crystallinity at most", "maxCrystallinity", "", 2),
          margin("Semi-crystalline: at least", "minCrystallinity", "", 2),
        ]),
  ];
  return (
    <details className="text-small">
      <summary className="font-semibold">Measured against</summary>
      <dl className="mt-1 grid grid-cols-[minmax(0,1fr)_auto_auto] gap-x-2">
        {rows.map(({ label, value, unit, decimals, sourced }) => (
          <div key={label} className="col-span-3 grid grid-cols-subgrid items-baseline border-b border-hair py-1">
            <dt className="text-soft">
              {label}
              {!sourced && <span className="block text-fine">the profile's own</span>}
            </dt>
            <dd className="text-right font-mono">
              {sourced?.confidence === "unverified" ? (
                <Unverified>{fixedText(value, decimals)}</Unverified>
              ) : (
                fixedText(value, decimals)
              )}
            </dd>
            <dd className="min-w-5 font-mono text-soft">{unit}</dd>
          </div>
        ))}
      </dl>
    </details>
  );
}
