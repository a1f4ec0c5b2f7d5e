import { type Grid, valueWithin } from "#src/features/prediction/contour.ts";
import { fixedText } from "#src/lib/number-text.ts";

interface Props {
  grid: Grid;
  fan: string;
  lamp: string;
  amorphousBelowC: number;
  crystallineAboveC?: number;
}

const SHARES = [0, 0.25, 0.5, 0.75, 1];

/** The picture in numbers: a row for each lamp duty, the strongest on top as in the picture. */
export function LeverTable({ grid, fan, lamp, amorphousBelowC, crystallineAboveC }: Props) {
  const along = (axis: readonly number[]) => SHARES.map((share) => axis[0] + (axis[axis.length - 1] - axis[0]) * share);
  const [fans, lamps] = [along(grid.x), along(grid.y).reverse()];
  const stateAt = (tempC: number): string =>
    tempC <= amorphousBelowC
      ? "amorphous"
      : crystallineAboveC !== undefined && tempC >= crystallineAboveC
        ? "semi-crystalline"
        : "neither";
  return (
    <details className="text-small">
      <summary className="font-semibold">In numbers</summary>
      {/* biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls must be reachable from the keyboard */}
      <section className="overflow-x-auto" aria-label="Interlayer temperature by duty" tabIndex={0}>
        <table className="mt-1 border-collapse text-right font-mono text-fine">
          <caption className="pb-1 text-left font-text text-soft">
            Interlayer temperature, °C, and which window it lies in. Columns: duty of {fan}. Rows: duty of {lamp}.
          </caption>
          <thead>
            <tr className="border-b border-rule">
              <th scope="col" className="pr-4 text-left font-normal text-soft">
                {lamp} \ {fan}
              </th>
              {fans.map((duty) => (
                <th key={duty} scope="col" className="pl-4">
                  {fixedText(duty, 2)}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {lamps.map((lampDuty) => (
              <tr key={lampDuty} className="border-b border-hair">
                <th scope="row" className="pr-4 text-left">
                  {fixedText(lampDuty, 2)}
                </th>
                {fans.map((fanDuty) => {
                  const tempC = valueWithin(grid, [fanDuty, lampDuty]);
                  return (
                    <td key={fanDuty} className="py-1 pl-4">
                      {fixedText(tempC, 0)}
                      <span className="block font-text text-soft">{stateAt(tempC)}</span>
                    </td>
                  );
                })}
              </tr>
            ))}
          </tbody>
        </table>
      </section>
    </details>
  );
}
