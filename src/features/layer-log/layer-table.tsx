import { useEffect, useRef, useState } from "react";
import { type LayerStack, objectAt } from "#src/features/layer-log/layer-stack.ts";
import type { Track } from "#src/features/layer-log/track.ts";
import { fixedText } from "#src/lib/number-text.ts";

interface Props {
  stack: LayerStack;
  tracks: readonly Track[];
  /** position in print order, -1 for none */
  pinned: number;
  onPin(position: number): void;
  heightPx: number;
}

const ROW_PX = 26;
/** Rows beyond the visible ones, so that scrolling shows no gap. */
const SPARE = 12;

/** The layer log in numbers. Only the rows in sight exist: a part may have thousands of layers. */
export function LayerTable({ stack, tracks, pinned, onPin, heightPx }: Props) {
  const box = useRef<HTMLElement>(null);
  const [scrolled, setScrolled] = useState(() => Math.max(pinned - 4, 0) * ROW_PX);
  const first = Math.max(Math.floor(scrolled / ROW_PX) - SPARE, 0);
  const last = Math.min(Math.ceil((scrolled + heightPx) / ROW_PX) + SPARE, stack.count) - 1;
  const columns = tracks.flatMap(tableColumns);

  useEffect(() => {
    if (box.current && pinned >= 0) scrollIntoView(box.current, pinned);
  }, [pinned]);

  const rows = Array.from({ length: Math.max(last - first + 1, 0) }, (_, n) => first + n);
  return (
    <section
      ref={box}
      aria-label="Layers"
      // biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls must be reachable from the keyboard
      tabIndex={0}
      className="overflow-auto"
      style={{ maxHeight: heightPx }}
      onScroll={(event) => setScrolled(event.currentTarget.scrollTop)}
    >
      <table className="w-full border-collapse font-mono text-fine" aria-rowcount={stack.count + 1}>
        <thead className="sticky top-0 bg-sheet">
          <tr className="border-b border-rule" aria-rowindex={1}>
            <Head title="Layer" unit="" />
            <Head title="Height" unit="mm" />
            {columns.map(({ key, title, unit }) => (
              <Head key={key} title={title} unit={unit} />
            ))}
          </tr>
        </thead>
        <tbody>
          <Filler rows={first} />
          {rows.map((i) => (
            <tr
              key={i}
              aria-rowindex={i + 2}
              aria-current={i === pinned || undefined}
              className="border-b border-hair hover:bg-well aria-[current=true]:bg-well"
              style={{ height: ROW_PX }}
            >
              <th scope="row" className="px-3 text-right font-normal">
                <button
                  type="button"
                  className="min-w-6 underline decoration-rule underline-offset-2"
                  onClick={() => onPin(i)}
                >
                  {stack.index[i]}
                </button>
              </th>
              <td className="px-3 text-right">{fixedText(stack.topMm[i] - objectAt(stack, i).baseMm, 2)}</td>
              {columns.map(({ key, values, decimals }) => (
                <td key={key} className="px-3 text-right">
                  {fixedText(values[i], decimals)}
                </td>
              ))}
            </tr>
          ))}
          <Filler rows={stack.count - 1 - last} />
        </tbody>
      </table>
    </section>
  );
}

interface TableColumn {
  key: string;
  title: string;
  unit: string;
  values: ArrayLike<number>;
  decimals: number;
}

/** A column for every series, and two more for the ends of what is uncertain. */
function tableColumns({ id, title, unit, series, decimals = 1 }: Track): TableColumn[] {
  return series.flatMap(({ label, values, low, high, uncertain }) => {
    const name = series.length > 1 ? `${title}, ${label}` : title;
    const column = (part: string, values: ArrayLike<number>) => ({
      key: `${id} ${label} ${part}`,
      title: `${name}${part}`,
      unit,
      values,
      decimals,
    });
    if (!uncertain || !low || !high) return [column("", values)];
    return [column("", values), column(", at least", low), column(", at most", high)];
  });
}

function Head({ title, unit }: { title: string; unit: string }) {
  return (
    <th scope="col" className="px-3 py-1.5 text-right align-bottom font-text font-semibold">
      {title} <span className="font-mono font-normal text-soft">{unit}</span>
    </th>
  );
}

function Filler({ rows }: { rows: number }) {
  return rows > 0 ? <tr style={{ height: rows * ROW_PX }} /> : null;
}

/** A row that is out of sight comes to the middle. */
function scrollIntoView(box: HTMLElement, position: number): void {
  const [top, room] = [position * ROW_PX, box.clientHeight - 3 * ROW_PX];
  if (top < box.scrollTop || top > box.scrollTop + room) box.scrollTop = Math.max(top - room / 2, 0);
}
