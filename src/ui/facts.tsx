import type { ReactNode } from "react";

export interface Fact {
  label: string;
  value: ReactNode;
  unit?: string;
}

/** The head of a strip: what was measured, side by side between hairlines. */
export function Facts({ facts }: { facts: Fact[] }) {
  return (
    <dl className="flex flex-wrap gap-y-3 border-y border-hair">
      {facts.map(({ label, value, unit }) => (
        <div
          key={label}
          className="min-w-20 border-l border-hair py-2 pr-4 pl-3 first:border-l-0 first:pl-0 lg:min-w-28 lg:pr-6"
        >
          <dt className="text-small text-soft">{label}</dt>
          <dd className="font-mono text-base whitespace-nowrap">
            {value}
            {unit && <span className="pl-1 text-soft">{unit}</span>}
          </dd>
        </div>
      ))}
    </dl>
  );
}

/** Labels and values under each other; values start in one line. */
export function FactList({ facts }: { facts: Fact[] }) {
  return (
    <dl className="grid grid-cols-[minmax(0,1fr)_fit-content(60%)] content-start gap-x-4">
      {facts.map(({ label, value, unit }) => (
        <div key={label} className="col-span-2 grid grid-cols-subgrid border-b border-hair py-1">
          <dt className="text-small text-soft">{label}</dt>
          <dd className="min-w-0 text-right font-mono text-small wrap-break-word">
            {unit ? (
              <span className="whitespace-nowrap">
                {value}
                <span className="inline-block min-w-9 pl-1.5 text-left text-soft">{unit}</span>
              </span>
            ) : (
              value
            )}
          </dd>
        </div>
      ))}
    </dl>
  );
}
