import type { ReactNode } from "react";
import type { PlanDocument } from "#shared/formats/plan.ts";
import { LineSample } from "#src/features/layer-log/line-sample.tsx";
import type { LogChannel, LogLayer } from "#src/features/layer-log/reading-tracks.ts";
import { fixedText } from "#src/lib/number-text.ts";
import { FactList } from "#src/ui/facts.tsx";

export interface PlanInspectorProps {
  /** the pinned layer; undefined where none is */
  layer: LogLayer | undefined;
  channels: readonly LogChannel[];
  /** a finished plan, or the one just computed; undefined where there is none yet */
  plan?: Pick<PlanDocument, "layers" | "advice">;
  /** what is predicted of the layer, and why */
  children?: ReactNode;
}

/** One layer in numbers: what was measured, each channel's duty as sliced and as planned, and why. */
export function PlanInspector({ layer, channels, plan, children }: PlanInspectorProps) {
  if (!layer)
    return (
      <p className="text-small text-soft">Pin a layer to see its numbers: click on the log, or use the arrow keys.</p>
    );
  const planned = plan?.layers.find(({ index }) => index === layer.index);
  const advice = plan?.advice.filter((entry) => entry.layer === layer.index) ?? [];
  return (
    <section aria-label={`Layer ${layer.index}`} className="flex flex-col gap-4">
      <h3 className="flex items-baseline justify-between border-b border-ink pb-1 font-semibold">
        <span>
          Layer <span className="font-mono">{layer.index}</span>
        </span>
        <span className="font-mono text-small font-normal">
          {fixedText(layer.zMm, 2)} <span className="text-soft">mm</span>
        </span>
      </h3>
      <FactList facts={measures(layer)} />
      {channels.map((channel) => (
        <ChannelDuties
          key={channel.id}
          channel={channel}
          seen={layer.duty[channel.id]}
          hasPlan={planned !== undefined}
          planned={planned?.duty[channel.id]}
          reasons={planned?.reason[channel.id]}
        />
      ))}
      {children}
      {advice.length > 0 && (
        <div>
          <h4 className="text-small font-semibold">Advice</h4>
          <ul className="flex flex-col gap-1 text-small">
            {advice.map(({ code, message }) => (
              <li key={code + message} className="border-l-2 border-ink pl-2">
                {message}
              </li>
            ))}
          </ul>
        </div>
      )}
    </section>
  );
}

/** The reasons for a layer's duties as they are read out, channel by channel; nothing where there is no plan. */
export function reasonsOf(plan: Pick<PlanDocument, "layers"> | undefined, index: number | undefined): string {
  const planned = index === undefined ? undefined : plan?.layers.find((layer) => layer.index === index);
  return Object.entries(planned?.reason ?? {})
    .map(([id, reasons]) => `${id}: ${reasons.join(", ")}`)
    .join(". ");
}

/** All with two decimals, so that the points stand in line. */
function measures(layer: LogLayer) {
  const row = (label: string, value: number | null, unit: string) => ({
    label,
    value: value === null ? "–" : fixedText(value, 2),
    unit,
  });
  return [
    row("Layer time", layer.timeS, "s"),
    row("of it extruding", layer.extrudingTimeS, "s"),
    row("Deposited length", layer.depositedLengthMm, "mm"),
    row("Travel length", layer.travelLengthMm, "mm"),
    row("Layer height", layer.heightMm, "mm"),
    row("Area", layer.areaMm2, "mm²"),
    row("Nozzle", layer.nozzleC, "°C"),
    row("Bed", layer.bedC, "°C"),
  ];
}

interface ChannelProps {
  channel: LogChannel;
  seen: LogLayer["duty"][string] | undefined;
  hasPlan: boolean;
  planned: number | undefined;
  reasons: readonly string[] | undefined;
}

function ChannelDuties({ channel: { id, kind }, seen, hasPlan, planned, reasons = [] }: ChannelProps) {
  const tone = kind === "fan" ? "cool" : "heat";
  return (
    <div className="flex flex-col gap-1">
      <h4 className="flex items-baseline justify-between text-small font-semibold">
        <span>
          {kind === "fan" ? "Fan" : "Heater"} <span className="font-mono font-normal">{id}</span>
        </span>
        <span className="font-normal text-soft">duty, 0–1</span>
      </h4>
      <dl className="text-small">
        <div className="flex items-center gap-2 border-b border-hair py-1">
          <LineSample style={{ tone, line: "dashed" }} />
          <dt className="grow text-soft">as sliced</dt>
          <dd className="font-mono">
            {seen && seen.max > seen.min && (
              <>
                {fixedText(seen.min, 2)} to {fixedText(seen.max, 2)}
                <span className="px-2 font-text text-soft">mean</span>
              </>
            )}
            {seen ? fixedText(seen.mean, 3) : "–"}
          </dd>
        </div>
        {hasPlan && (
          <div className="flex items-center gap-2 border-b border-hair py-1">
            <LineSample style={{ tone, line: "solid" }} />
            <dt className="grow text-soft">as planned</dt>
            <dd className="font-mono">{planned === undefined ? "not driven" : fixedText(planned, 3)}</dd>
          </div>
        )}
      </dl>
      {reasons.length > 0 && (
        <ol
          aria-label={`Reasons for ${id}`}
          className="flex list-inside list-decimal flex-col text-small marker:font-mono marker:text-soft"
        >
          {reasons.map((reason) => (
            <li key={reason}>{reason}</li>
          ))}
        </ol>
      )}
    </div>
  );
}
