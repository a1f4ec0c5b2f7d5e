import type { CurvePoint } from "#shared/formats/profile.ts";
import { type CurveGrid, pointAfter, pointRemoved } from "#src/features/profiles/editor/curve-edits.ts";
import type { DocumentProblems } from "#src/lib/document-problems.ts";
import { Button } from "#src/ui/button.tsx";
import { NumberCell, problemText } from "#src/ui/number-field.tsx";

export interface CurveTableProps {
  points: readonly CurvePoint[];
  grid: CurveGrid;
  quantity: { name: string; unit: string };
  problems: DocumentProblems;
  /** of the rule, e.g. `zones[0].cooling[0]` */
  path: string;
  onChange(points: CurvePoint[], gesture?: string): void;
}

/** The curve's points in numbers. What is typed stands even where it can't be: the problem is shown at its point. */
export function CurveTable({ points, grid, quantity, problems, path, onChange }: CurveTableProps) {
  const set = (i: number, k: 0 | 1, value: number | undefined) => {
    // A field that is empty for the moment leaves a hole, which the schema then asks to be filled.
    const next = points.map((point, n) => (n === i ? point.map((old, m) => (m === k ? value : old)) : point));
    onChange(next as CurvePoint[], `point ${i} ${k} typed`);
  };
  return (
    <table className="border-collapse text-small">
      <thead>
        <tr className="border-b border-rule text-left align-bottom">
          <th scope="col" className="pr-3 pb-1 font-semibold first-letter:uppercase">
            {quantity.name} <span className="font-mono font-normal text-soft">{quantity.unit}</span>
          </th>
          <th scope="col" className="pr-3 pb-1 font-semibold">
            Duty <span className="font-mono font-normal text-soft">0–1</span>
          </th>
          <td />
        </tr>
      </thead>
      <tbody>
        {points.map(([x, duty], i) => {
          const at = `${path}.points[${i}]`;
          const wrong = [
            problemText(`Point ${i + 1}`, problems.at(at)),
            problemText(`Point ${i + 1}: ${quantity.name}`, problems.at(`${at}[0]`)),
            problemText(`Point ${i + 1}: duty`, problems.at(`${at}[1]`)),
          ].filter((text) => text !== undefined);
          return [
            // biome-ignore lint/suspicious/noArrayIndexKey: a point is its place in the curve
            <tr key={i}>
              <td className="py-1 pr-3">
                <NumberCell
                  label={`Point ${i + 1}, ${quantity.name} in ${quantity.unit}`}
                  value={x}
                  step={grid.x}
                  decimals={grid.x < 1 ? 1 : 0}
                  problem={problems.at(`${at}[0]`)}
                  onChange={(value) => set(i, 0, value)}
                />
              </td>
              <td className="py-1 pr-3">
                <NumberCell
                  label={`Point ${i + 1}, duty`}
                  value={duty}
                  step={grid.duty}
                  decimals={2}
                  share
                  problem={problems.at(`${at}[1]`)}
                  onChange={(value) => set(i, 1, value)}
                />
              </td>
              <td className="whitespace-nowrap">
                <Button
                  weight="quiet"
                  className="text-small"
                  aria-label={`Add a point after point ${i + 1}`}
                  onClick={() => onChange(pointAfter(points, i, grid))}
                >
                  Add
                </Button>
                <Button
                  weight="quiet"
                  className="ml-2 text-small"
                  aria-label={`Remove point ${i + 1}`}
                  disabled={points.length < 2}
                  onClick={() => onChange(pointRemoved(points, i))}
                >
                  Remove
                </Button>
              </td>
            </tr>,
            ...wrong.map((text) => (
              <tr key={text}>
                <td colSpan={3} className="pb-1">
                  <p className="border-l-2 border-ink pl-2 font-semibold">{text}</p>
                </td>
              </tr>
            )),
          ];
        })}
      </tbody>
    </table>
  );
}
