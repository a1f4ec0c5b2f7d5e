import type { Machine } from "#shared/formats/machine.ts";
import { rangeOf } from "#shared/formats/thermal.ts";
import { assumedValues } from "#shared/thermal/surroundings.ts";
import { quantityAt, type ThermalField, thermalGroups } from "#src/features/machines/thermal-fields.ts";
import { type Column, Table } from "#src/ui/table.tsx";
import { Unverified } from "#src/ui/unverified.tsx";

interface Row {
  field: ThermalField;
  /** undefined where nothing is given and nothing assumed */
  range?: { low: number; typical: number; high: number };
  /** where an assumed range comes from; undefined: the document gives it */
  assumed?: string;
}

/** What surrounds the part on this machine: what the document gives, and what is assumed where it gives nothing. */
export function ThermalSheet({ machine }: { machine: Machine }) {
  const assumed = new Map(assumedValues(machine).map((value) => [value.path, value]));
  const { calibration } = machine.thermal ?? {};
  return (
    <div className="flex flex-col gap-4">
      <p>
        {calibration ? (
          <>
            Calibrated: <span className="font-mono">{calibration}</span>.
          </>
        ) : (
          "Not calibrated: none of it was fitted to readings of this machine."
        )}{" "}
        {assumed.size > 0 && (
          <>
            Of what is marked like <Unverified word={false}>this</Unverified> nothing is known here: a stated range
            stands in for it.
          </>
        )}
      </p>
      {thermalGroups(machine).map(({ title, fields }) => {
        const rows = fields.map((field): Row => {
          const given = quantityAt(machine.thermal, field.path);
          if (given !== undefined) return { field, range: rangeOf(given) };
          const stated = assumed.get(`thermal.${field.path.join(".")}`);
          return stated ? { field, range: stated, assumed: stated.source } : { field };
        });
        return (
          <Table key={title} label={title} columns={columnsFor(title)} rows={rows} keyOf={({ field }) => field.label} />
        );
      })}
    </div>
  );
}

function columnsFor(title: string): Column<Row>[] {
  const number = (head: string, end: "low" | "typical" | "high"): Column<Row> => ({
    head,
    number: true,
    width: "6rem",
    cell: ({ range, assumed }) => {
      if (!range) return <span className="text-soft">–</span>;
      return assumed ? <Unverified word={false}>{range[end]}</Unverified> : range[end];
    },
  });
  return [
    { head: title, width: "16rem", cell: ({ field }) => field.label },
    number("Low", "low"),
    number("Typical", "typical"),
    number("High", "high"),
    {
      head: "Unit",
      width: "6.5rem",
      cell: ({ field: { unit } }) => <span className="font-mono text-small whitespace-nowrap text-soft">{unit}</span>,
    },
    {
      head: "From",
      cell: ({ field, range, assumed }) => (
        <span className="text-small text-soft">
          {!range ? (field.hint ?? "not given") : assumed ? `assumed: ${assumed}` : "this document"}
        </span>
      ),
    },
  ];
}
