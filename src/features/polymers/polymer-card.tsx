import type { Polymer } from "#shared/formats/polymer.ts";
import { CARD_GROUPS, type CardField, sourcedAt } from "#src/features/polymers/card-fields.ts";
import { aligned } from "#src/lib/format.ts";
import { Notice } from "#src/ui/notice.tsx";
import { Section } from "#src/ui/section.tsx";
import { type Column, Table } from "#src/ui/table.tsx";

/** A material in numbers, each with where it comes from and how far it may be trusted. */
export function PolymerCard({ polymer }: { polymer: Polymer }) {
  return (
    <>
      <div className="pb-5">
        <Notice kind="note">
          {polymer.amorphousReachable
            ? "Amorphous and semi-crystalline are both within reach."
            : "Amorphous is out of reach: it crystallises too fast. A profile that asks for it is refused."}{" "}
          Numbers marked unverified are remembered or assumed: measure before you rely on them.
        </Notice>
      </div>
      {CARD_GROUPS.map(({ title, note, fields }) => (
        <Section key={title} title={title} note={note}>
          <Table label={title} columns={columnsFor(polymer, fields)} rows={fields} keyOf={({ label }) => label} />
        </Section>
      ))}
    </>
  );
}

function columnsFor(polymer: Polymer, fields: CardField[]): Column<CardField>[] {
  const finest = Math.max(...fields.map(({ decimals }) => decimals));
  return [
    { head: "Quantity", width: "15rem", cell: ({ label }) => label },
    {
      head: "Value",
      number: true,
      width: "7rem",
      cell: ({ path, decimals }) => aligned(sourcedAt(polymer, path).value, decimals, finest),
    },
    {
      head: "Unit",
      width: "6.5rem",
      cell: ({ unit }) => <span className="font-mono text-small whitespace-nowrap text-soft">{unit}</span>,
    },
    {
      head: "Confidence",
      width: "9rem",
      cell: ({ path }) => {
        const { confidence } = sourcedAt(polymer, path);
        return <span className={confidence === "unverified" ? "font-semibold" : ""}>{confidence}</span>;
      },
    },
    {
      head: "Source",
      cell: ({ path }) => <span className="text-small text-soft">{sourcedAt(polymer, path).source}</span>,
    },
  ];
}
