import { CurvePair } from "#src/features/documents/curve-pair.tsx";
import { type Difference, differences, type Leaf } from "#src/features/documents/differences.ts";
import { asPoints, decimalsOf, leafText } from "#src/features/documents/leaf-text.ts";
import { grouped, placeUnit } from "#src/lib/place.ts";

interface Side {
  name: string;
  document: unknown;
}

interface Row extends Difference {
  words: string;
  unit: string | undefined;
  decimals: number;
}

interface Props {
  before: Side;
  after: Side;
  /** what places outside any part of the document belong to, e.g. `The whole profile` */
  whole: string;
}

const CELL = "py-1.5 pr-6 align-baseline last:pr-0";

/** Two documents, place by place, in the parts their pages have. Signs say what came and went, as in a toolpath's diff. */
export function DifferenceTable({ before, after, whole }: Props) {
  const found = differences(before.document, after.document);
  if (found.length === 0) return <p className="text-soft">They say the same.</p>;
  const groups = groupsOf(found, whole);
  const upTo = Math.max(...groups.flatMap(({ rows }) => rows.map(({ decimals }) => decimals)));
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls must be reachable from the keyboard
    <section className="overflow-x-auto" aria-label={`${before.name} and ${after.name}`} tabIndex={0}>
      <table className="w-full max-w-5xl border-collapse">
        <thead>
          <tr className="border-b border-ink text-left text-small">
            {["Place", before.name, after.name, "Unit"].map((head) => (
              <th key={head} scope="col" className={CELL}>
                {head}
              </th>
            ))}
          </tr>
        </thead>
        {groups.map(({ title, rows }) => (
          <tbody key={title}>
            <tr className="border-b border-rule">
              <th scope="rowgroup" colSpan={4} className="pt-4 pb-1 text-left font-semibold">
                {title}
              </th>
            </tr>
            {rows.map((row) => (
              <DifferenceRow key={JSON.stringify(row.place)} row={row} upTo={upTo} />
            ))}
          </tbody>
        ))}
      </table>
    </section>
  );
}

function DifferenceRow({ row: { words, unit, decimals, before, after }, upTo }: { row: Row; upTo: number }) {
  const [was, is] = [asPoints(before), asPoints(after)];
  return (
    <>
      <tr className="border-b border-hair">
        <td className={CELL}>{words}</td>
        <td className={CELL}>
          <Value sign="−" leaf={before} decimals={decimals} upTo={upTo} />
        </td>
        <td className={CELL}>
          <Value sign="+" leaf={after} decimals={decimals} upTo={upTo} />
        </td>
        <td className={`${CELL} font-mono text-small text-soft`}>{unit ?? ""}</td>
      </tr>
      {was && is && (
        <tr className="border-b border-hair">
          <td />
          <td colSpan={3} className="py-2">
            <CurvePair before={was} after={is} />
          </td>
        </tr>
      )}
    </>
  );
}

interface ValueProps {
  sign: string;
  leaf: Leaf | undefined;
  decimals: number;
  upTo: number;
}

function Value({ sign, leaf, decimals, upTo }: ValueProps) {
  if (leaf === undefined) return <span className="text-small text-soft">not there</span>;
  const text = leafText(leaf, decimals, upTo);
  return (
    <span className="flex gap-3 font-mono text-small">
      <span aria-hidden className="text-soft">
        {sign}
      </span>
      <span className={typeof leaf === "number" ? "min-w-20 text-right whitespace-pre" : "wrap-anywhere"}>{text}</span>
    </span>
  );
}

function groupsOf(found: readonly Difference[], whole: string): { title: string; rows: Row[] }[] {
  const groups = new Map<string, Row[]>();
  for (const difference of found) {
    const { place, before, after } = difference;
    const { group = whole, words } = grouped(place);
    const isNumber = typeof before === "number" || typeof after === "number";
    const unit = isNumber ? placeUnit(place) : undefined;
    const row = { ...difference, words, unit, decimals: Math.max(decimalsOf(before), decimalsOf(after)) };
    groups.set(group, [...(groups.get(group) ?? []), row]);
  }
  return [...groups].map(([title, rows]) => ({ title, rows }));
}
