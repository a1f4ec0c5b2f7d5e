import type { Assumed } from "#shared/formats/prediction.ts";
import { grouped, placeOf, placeUnit } from "#src/lib/place.ts";

/** What it is called, without what all of them have in common. */
const nameOf = (path: string): string => {
  const place = placeOf(path);
  const unit = placeUnit(place);
  return `${grouped(place).words}${unit ? `, ${unit}` : ""}`;
};

/** What stands in for what the machine document leaves out. */
export function AssumedTable({ assumed }: { assumed: readonly Assumed[] }) {
  if (assumed.length === 0) return null;
  return (
    <details className="mt-1 text-small">
      <summary className="font-semibold">
        {assumed.length === 1 ? "1 value is assumed" : `${assumed.length} values are assumed`}
      </summary>
      {/* biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls must be reachable from the keyboard */}
      <section className="overflow-x-auto" aria-label="Assumed values" tabIndex={0}>
        <table className="mt-1 w-full border-collapse text-fine">
          <thead>
            <tr className="border-b border-rule text-left">
              <th scope="col" className="pr-3 font-semibold">
                Value
              </th>
              {["Low", "Typical", "High"].map((head) => (
                <th key={head} scope="col" className="pr-3 text-right font-semibold whitespace-nowrap">
                  {head}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {assumed.map(({ path, low, typical, high, source }) => (
              <tr key={path} className="border-b border-hair align-baseline">
                <th scope="row" className="py-1 pr-3 text-left font-normal">
                  {nameOf(path)}
                  <span className="block text-soft">{source}</span>
                </th>
                {[low, typical, high].map((value, i) => (
                  // biome-ignore lint/suspicious/noArrayIndexKey: low, typical, high
                  <td key={i} className="py-1 pr-3 text-right font-mono whitespace-nowrap">
                    {value}
                  </td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      </section>
    </details>
  );
}
