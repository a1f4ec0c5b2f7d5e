import type { Channel, Machine, Pause } from "#shared/formats/machine.ts";
import { actsText, corneringText, driveText } from "#src/features/machines/drive-text.ts";
import { ThermalSheet } from "#src/features/machines/thermal-sheet.tsx";
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
    cell: ({ drive }) => <code className="font-mono text-small whitespace-nowrap">{driveText(drive)}</code>,
  },
  { head: "Least", number: true, cell: ({ minDuty }) => fixedText(minDuty, 2) },
  { head: "Most", number: true, cell: ({ maxDuty }) => fixedText(maxDuty, 2) },
  { head: "Idle", number: true, cell: ({ idleDuty }) => fixedText(idleDuty, 2) },
  { head: "Settles", unit: "s", number: true, cell: ({ settleS }) => fixedText(settleS, 1) },
  { head: "Boost", unit: "s", number: true, cell: ({ startBoostS }) => fixedText(startBoostS, 1) },
  {
    head: "Change",
    unit: "/s",
    number: true,
    cell: ({ maxDutyPerS }) => (maxDutyPerS === undefined ? "no limit" : fixedText(maxDutyPerS, 2)),
  },
  { head: "Acts", cell: ({ acts }) => actsText(acts) },
];

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
  const axes = Object.entries(motion.axes).map(([axis, limits]) => ({
    label: `Axis ${axis.toUpperCase()}`,
    value: `${limits?.maxSpeedMmS ?? "no limit"} mm/s, ${limits?.maxAccelMmS2 ?? "no limit"} mm/s²`,
  }));
  return (
    <>
      <Section title="Channels" note="one for every fan and heater">
        <Table label="Channels" columns={CHANNELS} rows={channels} keyOf={({ id }) => id} />
      </Section>
      <Section title="Motion" note="what layer times are computed with">
        <div className="grid gap-x-10 md:grid-cols-2">
          <FactList
            facts={[
              { label: "Top speed", value: `${motion.maxSpeedMmS} mm/s` },
              { label: "Acceleration, printing", value: `${motion.accelMmS2.print} mm/s²` },
              { label: "travelling", value: `${motion.accelMmS2.travel} mm/s²` },
              { label: "retracting", value: `${motion.accelMmS2.retract} mm/s²` },
              ...axes,
              { label: "Corners", value: corneringText(motion.cornering) },
            ]}
          />
          <FactList
            facts={[
              { label: "Look-ahead", value: motion.lookAhead === "full" ? "whole file" : `${motion.lookAhead} blocks` },
              {
                label: "Extruder limits hold for",
                value: motion.extruderLimits === "every-move" ? "every move" : "extrude-only moves",
              },
              { label: "Stops at extrude-only moves", value: motion.stopAtExtrudeOnly ? "yes" : "no" },
              { label: "Obeys limits in the file", value: motion.honourFileLimits ? "yes" : "no" },
              { label: "Dwell P counts", value: motion.dwellP === "ms" ? "milliseconds" : "seconds" },
              { label: "Arc chords", value: `${motion.arcSegmentMm} mm` },
              {
                label: "Firmware retraction",
                value: `${motion.firmwareRetract.lengthMm} mm at ${motion.firmwareRetract.speedMmS} mm/s`,
              },
              { label: "Filament", value: `${fixedText(motion.filamentDiameterMm, 2)} mm` },
            ]}
          />
        </div>
      </Section>
      <Section title="Surroundings" note="what predictions are computed with">
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
