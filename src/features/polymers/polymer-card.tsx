import type { Polymer } from "#shared/formats/polymer.ts";
import { type FilledField, filledGroups, unverifiedCount } from "#src/features/polymers/card-fields.ts";
import { HalfTimes } from "#src/features/polymers/half-times.tsx";
import { aligned } from "#src/lib/format.ts";
import { Notice } from "#src/ui/notice.tsx";
import { Section } from "#src/ui/section.tsx";
import { type Column, Table } from "#src/ui/table.tsx";
import { Unverified } from "#src/ui/unverified.tsx";

/** A material in numbers, each with where it comes from and how far it may be trusted. */
export function PolymerCard({ polymer }: { polymer: Polymer }) {
  const { unverified, all } = unverifiedCount(polymer);
  return (
    <>
      <div className="flex flex-col gap-3 pb-5">
        <Notice kind="note">{reachText(polymer)}</Notice>
        {unverified > 0 && (
          <Notice
            kind="caution"
            title={`${unverified === all ? `None of its ${all} numbers is` : `${unverified} of its ${all} numbers are not`} verified`}
          >
            They are remembered or assumed, and marked like <Unverified word={false}>this</Unverified>. Predictions rest
            on them: measure before you rely on either.
          </Notice>
        )}
      </div>
      {filledGroups(polymer).map(({ title, note, fields }) => (
        <Section key={title} title={title} note={note}>
          <Table label={title} columns={columnsFor(fields)} rows={fields} keyOf={({ field }) => field.label} />
          {title === "Crystallinity" && polymer.crystallinity?.halfTimes && (
            <HalfTimes halfTimes={polymer.crystallinity.halfTimes} />
          )}
        </Section>
      ))}
      {polymer.crystallinity === null && (
        <Section title="Crystallinity">
          <p className="text-soft">Nothing of it crystallises: no crystallinity is predicted, and Tm plays no part.</p>
        </Section>
      )}
    </>
  );
}

function reachText({ crystallinity, amorphousReachable }: Polymer): string {
  if (crystallinity === null) return "An amorphous polymer: a profile that asks for semi-crystalline is refused.";
  return amorphousReachable
    ? "Amorphous and semi-crystalline are both within reach."
    : "Amorphous is out of reach: it crystallises too fast. A profile that asks for it is refused.";
}

function columnsFor(fields: readonly FilledField[]): Column<FilledField>[] {
  const finest = Math.max(...fields.map(({ field }) => field.decimals));
  return [
    { head: "Quantity", width: "15rem", cell: ({ field }) => field.label },
    {
      head: "Value",
      number: true,
      width: "7rem",
      cell: ({ field, sourced: { value, confidence } }) => {
        const text = aligned(value, field.decimals, finest);
        if (confidence !== "unverified") return text;
        const number = text.trimEnd();
        return (
          <>
            <Unverified word={false}>{number}</Unverified>
            {text.slice(number.length)}
          </>
        );
      },
    },
    {
      head: "Unit",
      width: "6.5rem",
      cell: ({ field: { unit } }) => <span className="font-mono text-small whitespace-nowrap text-soft">{unit}</span>,
    },
    {
      head: "Confidence",
      width: "9rem",
      cell: ({ sourced: { confidence } }) => (
        <span className={confidence === "unverified" ? "text-soft" : "font-semibold"}>{confidence}</span>
      ),
    },
    { head: "Source", cell: ({ sourced: { source } }) => <span className="text-small text-soft">{source}</span> },
  ];
}
