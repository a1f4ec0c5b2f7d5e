import type { ReactNode } from "react";
import { classNames } from "#src/ui/class-names.ts";

export interface Column<Row> {
  head: string;
  /** stands beside the head, not in every cell */
  unit?: string;
  /** numbers are set in the mono face and right-aligned: with fixed decimals their points stand in line */
  number?: boolean;
  /** for tables that stand one above the other and should line up, e.g. `16rem` */
  width?: string;
  cell(row: Row): ReactNode;
}

interface Props<Row> {
  label: string;
  columns: Column<Row>[];
  rows: readonly Row[];
  keyOf(row: Row): string | number;
  /** the row that is pinned or chosen */
  current?(row: Row): boolean;
}

/** Rows under hairlines. Wider than the page, it scrolls by itself and can be scrolled from the keyboard. */
export function Table<Row>({ label, columns, rows, keyOf, current }: Props<Row>) {
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls must be reachable from the keyboard
    <section className="overflow-x-auto" aria-label={label} tabIndex={0}>
      <table className="w-full border-collapse">
        <thead>
          <tr className="border-b border-ink">
            {columns.map(({ head, unit, number, width }) => (
              <th
                key={head}
                scope="col"
                style={{ width }}
                className={classNames(
                  "py-1.5 pr-6 align-bottom text-small font-semibold last:pr-0",
                  number ? "text-right" : "text-left",
                )}
              >
                {head}
                {unit && <span className="pl-1.5 font-mono font-normal text-soft">{unit}</span>}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <tr
              key={keyOf(row)}
              aria-current={current?.(row) || undefined}
              className="border-b border-hair hover:bg-well aria-[current=true]:bg-well"
            >
              {columns.map(({ head, number, cell }) => (
                <td
                  key={head}
                  className={classNames(
                    "py-2 pr-6 align-baseline last:pr-0",
                    number ? "whitespace-nowrap text-right font-mono text-small" : "text-left",
                  )}
                >
                  {cell(row)}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}
