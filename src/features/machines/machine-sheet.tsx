import type { Channel, Machine, Pause } from "#shared/formats/machine.ts";
import { actsText, driveText } from "#src/features/machines/drive-text.ts";
import { motionFacts } from "#src/features/machines/motion-facts.ts";
import { ThermalSheet } from "#src/features/machines/thermal-sheet.tsx";
import { named, wordsOf } from "#src/lib/document-words.ts";
import { fixedText } from "#src/lib/number-text.ts";
import { FactList } from "#src/ui/facts.tsx";
import { Section } from "#src/ui/section.tsx";
import { type Column, Table } from "#src/ui/table.tsx";

const CHANNELS: Column<Channel>[] = [
  { head: "Channel", cell: ({ id }) => <code className="font-mono text-small">{id}</code> },
  {
    head: "Kind",
    cell: ({ kind }) => (
      <span className={kind === "fan" ? "font-semibold text-cool-ink" : "font-semibold text-heat-ink"}>{kind}</span>
    ),
  },
  {
    head: "Command",
    cell: ({ drive }) => {
      const { command, fullPower } = driveText(drive);
      return (
        <>
          <code className="font-mono text-small wrap-anywhere">{command}</code>
          <span className="block text-small whitespace-nowrap text-soft">full power: {fullPower}</span>
        </>
      );
    },
  },
  number("minDuty", ({ minDuty }) => fixedText(minDuty, 2)),
  number("maxDuty", ({ maxDuty }) => fixedText(maxDuty, 2)),
  number("idleDuty", ({ idleDuty }) => fixedText(idleDuty, 2)),
  number("settleS", ({ settleS }) => fixedText(settleS, 1)),
  number("startBoostS", ({ startBoostS }) => fixedText(startBoostS, 1)),
  number("maxDutyPerS", ({ maxDutyPerS }) => (maxDutyPerS === undefined ? "no limit" : fixedText(maxDutyPerS, 2))),
  { head: wordsOf("channels.*.acts"), cell: ({ acts }) => actsText(acts) },
];

function number(field: keyof Channel, cell: (channel: Channel) => string): Column<Channel> {
  const { label, unit } = named(`channels.*.${field}`);
  // Duties are 0-1 on every page: under each of three heads that would only be noise.
  return { head: label, unit: unit === "0–1" ? undefined : unit, number: true, cell };
}

const PAUSES: Column<Pause>[] = [
  { head: "Command", cell: ({ command }) => <code className="font-mono text-small">{command}</code> },
  {
    head: "While it lasts",
    cell: ({ blocking }) =>
      blocking
        ? "no further line is read: the heater is idle, and restored after it"
        : "lines are read on: the heater goes to idle and stays there, and a file with it inside is refused",
  },
];

/** What a machine document says. */
export function MachineSheet({ machine }: { machine: Machine }) {
  const { motion, channels, pauses } = machine;
  return (
    <>
      <Section title="Channels" note="one for every fan and heater; duties 0–1">
        <Table label="Channels" columns={CHANNELS} rows={channels} keyOf={({ id }) => id} />
      </Section>
      <Section title="Motion" note="what layer times are computed from">
        <div className="grid gap-x-10 @3xl:grid-cols-2">
          {motionFacts(motion).map((facts) => (
            <FactList key={facts[0].label} facts={facts} />
          ))}
        </div>
      </Section>
      <Section title="Surroundings" note="what predictions are computed from">
        <ThermalSheet machine={machine} />
      </Section>
      <Section title="Pauses" note="what stops the print">
        {pauses.length > 0 ? (
          <Table label="Pauses" columns={PAUSES} rows={pauses} keyOf={({ command }) => command} />
        ) : (
          <p className="text-soft">None. A file with a pause between its first and last layer is refused.</p>
        )}
      </Section>
    </>
  );
}
