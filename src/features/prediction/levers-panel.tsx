import { useEffect, useMemo, useState } from "react";
import type { Margins } from "#shared/formats/profile.ts";
import type { LayerReading } from "#shared/formats/reading.ts";
import type { ForecastClient } from "#src/features/prediction/forecast-client.ts";
import { LeverPicture } from "#src/features/prediction/lever-picture.tsx";
import { LeverTable } from "#src/features/prediction/lever-table.tsx";
import { ObstacleNotice } from "#src/features/prediction/obstacle-notice.tsx";
import { useAnswer } from "#src/features/prediction/use-answer.ts";
import type { Levers, LeversAsk, Part } from "#src/features/prediction/worker/messages.ts";
import { fixedText } from "#src/lib/number-text.ts";
import { STATE_FILLS } from "#src/lib/state-fill.ts";
import { SelectField } from "#src/ui/field.tsx";
import { NumberField } from "#src/ui/number-field.tsx";

export interface LeversPanelProps {
  client: ForecastClient;
  part: Part;
  /** the pinned layer */
  layer: LayerReading | undefined;
  /** its planned duties by channel; undefined where there is no plan yet */
  duty: Record<string, number> | undefined;
  margins: Required<Margins>;
}

/** Crossings along each lever: enough for smooth lines. */
const CROSSINGS = 13;

/** What fan and lamp do to a layer like the pinned one: its interlayer temperature over both duties. */
export function LeversPanel({ client, part, layer, duty = {}, margins }: LeversPanelProps) {
  const { channels } = part.machine;
  const [fans, lamps] = [
    channels.filter(({ kind }) => kind === "fan"),
    channels.filter(({ kind }) => kind === "heater"),
  ];
  const [chosen, choose] = useState<{ fan?: string; lamp?: string }>({});
  const fan = fans.find(({ id }) => id === chosen.fan) ?? fans[0];
  const lamp = lamps.find(({ id }) => id === chosen.lamp) ?? lamps[0];
  const [timeS, setTimeS] = useLayerTime(layer);
  const others = JSON.stringify(Object.entries(duty).filter(([id]) => id !== fan?.id && id !== lamp?.id));
  const ask = useMemo((): LeversAsk | undefined => {
    if (!layer || !fan || !lamp || !(timeS !== undefined && timeS > 0)) return undefined;
    const { heightMm, areaMm2, outlineMm, nozzleC } = layer;
    if (nozzleC === null || !(nozzleC > 0)) return undefined;
    return {
      kind: "levers",
      layer: { timeS, heightMm, areaMm2, outlineMm, nozzleC },
      fan: fan.id,
      lamp: lamp.id,
      // A little fan does much, so its low end is looked at more closely.
      fanDuties: crossings(fan.maxDuty, 1.6),
      lampDuties: crossings(lamp.maxDuty, 1),
      others: Object.fromEntries(JSON.parse(others) as [string, number][]),
    };
  }, [layer, fan, lamp, timeS, others]);
  const answer = useAnswer(client, part, ask);
  if (!fan || !lamp) return <p className="text-soft">This machine has no fan and lamp to set against each other.</p>;
  if (!layer) return <p className="text-soft">Pin a layer: its size and time decide what fan and lamp can do.</p>;
  const seen = { fan: duty[fan.id] ?? layer.duty[fan.id]?.mean, lamp: duty[lamp.id] ?? layer.duty[lamp.id]?.mean };
  return (
    <section aria-label="Two levers" className="flex flex-col gap-3">
      <div className="grid grid-cols-2 gap-3 sm:grid-cols-3">
        <NumberField
          label="Layer time"
          unit="s"
          step={1}
          hint={`layer ${layer.index}: ${fixedText(layer.timeS, 1)} s`}
          value={timeS}
          problem={timeS !== undefined && timeS > 0 ? undefined : "must be above 0"}
          onChange={setTimeS}
        />
        <ChannelChoice label="Fan" channels={fans} value={fan.id} onChange={(id) => choose({ ...chosen, fan: id })} />
        <ChannelChoice
          label="Heater"
          channels={lamps}
          value={lamp.id}
          onChange={(id) => choose({ ...chosen, lamp: id })}
        />
      </div>
      {answer === undefined && (
        <p role="status" className="py-6 text-soft">
          {ask ? "Computing …" : layer.nozzleC ? "" : "The file gives no nozzle temperature to compute with."}
        </p>
      )}
      {answer && "result" in answer && (
        <LeverMap
          levers={answer.result}
          fan={fan.id}
          lamp={lamp.id}
          planned={seen.fan === undefined || seen.lamp === undefined ? undefined : [seen.fan, seen.lamp]}
          part={part}
          margins={margins}
        />
      )}
      {answer && !("result" in answer) && <ObstacleNotice obstacle={answer} />}
    </section>
  );
}

/** Duties from 0 up, closer together at the low end where the power is above 1. */
const crossings = (most: number, power: number): number[] =>
  Array.from({ length: CROSSINGS }, (_, i) => most * (i / (CROSSINGS - 1)) ** power);

/** The pinned layer's time, or one that is typed in until another layer is pinned. */
function useLayerTime(layer: LayerReading | undefined) {
  const [typed, setTyped] = useState<{ timeS: number | undefined }>();
  const index = layer?.index;
  // biome-ignore lint/correctness/useExhaustiveDependencies: what was typed was for the layer pinned then
  useEffect(() => setTyped(undefined), [index]);
  const set = (timeS: number | undefined) => setTyped({ timeS });
  return [typed ? typed.timeS : layer && Number(layer.timeS.toFixed(2)), set] as const;
}

interface ChoiceProps {
  label: string;
  channels: readonly { id: string }[];
  value: string;
  onChange(id: string): void;
}

/** No question where there is no choice. */
function ChannelChoice({ label, channels, value, onChange }: ChoiceProps) {
  if (channels.length < 2) return null;
  return (
    <SelectField label={label} value={value} onChange={({ target }) => onChange(target.value)}>
      {channels.map(({ id }) => (
        <option key={id}>{id}</option>
      ))}
    </SelectField>
  );
}

interface MapProps {
  levers: Levers;
  fan: string;
  lamp: string;
  planned: readonly [fan: number, lamp: number] | undefined;
  part: Part;
  margins: Required<Margins>;
}

function LeverMap({ levers, fan, lamp, planned, part: { polymer, machine }, margins }: MapProps) {
  const grid = { x: levers.fanDuties, y: levers.lampDuties, values: levers.interlayerC };
  const tgC = polymer.tgC.value;
  const windows = {
    amorphousBelowC: tgC - margins.belowTgC,
    crystallineAboveC: polymer.crystallinity === null ? undefined : tgC + margins.aboveTgC,
  };
  const temps = Array.from(levers.interlayerC);
  const ends = `from ${fixedText(Math.min(...temps), 0)} to ${fixedText(Math.max(...temps), 0)} °C`;
  const uncalibrated = machine.thermal?.calibration === undefined;
  return (
    <>
      <LeverPicture
        grid={grid}
        fan={fan}
        lamp={lamp}
        tgC={tgC}
        planned={planned}
        label={`Interlayer temperature over the duties of ${fan} and ${lamp}, ${ends}`}
        {...windows}
      />
      <ul aria-label="Legend of the levers" className="flex flex-wrap gap-x-5 gap-y-1 text-fine text-soft">
        <li className="flex items-center gap-1.5">
          <span className="inline-block h-3.5 w-6 border border-rule" style={STATE_FILLS.amorphous} />
          below Tg by the margin: amorphous
        </li>
        {windows.crystallineAboveC !== undefined && (
          <li className="flex items-center gap-1.5">
            <span className="inline-block h-3.5 w-6 border border-rule" style={STATE_FILLS["semi-crystalline"]} />
            above Tg by the margin: semi-crystalline, given time
          </li>
        )}
        <li>lines: °C before the next layer, once many like it are printed, far from the bed</li>
        {planned && <li>square: as planned</li>}
        {uncalibrated && (
          <li>
            <span aria-hidden className="font-mono font-bold">
              ?{" "}
            </span>
            uncalibrated: what is assumed of the machine decides
          </li>
        )}
      </ul>
      <LeverTable grid={grid} fan={fan} lamp={lamp} {...windows} />
    </>
  );
}
