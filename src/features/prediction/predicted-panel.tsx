import type { ReactNode } from "react";
import type { Polymer } from "#shared/formats/polymer.ts";
import type { PredictedLayer, PredictionDocument } from "#shared/formats/prediction.ts";
import type { Margins } from "#shared/formats/profile.ts";
import type { LayerTarget } from "#shared/plan/layer-targets.ts";
import { AssumedTable } from "#src/features/prediction/assumed-table.tsx";
import { CardLimits } from "#src/features/prediction/card-limits.tsx";
import { type Verdict, verdictsOf } from "#src/features/prediction/verdict-text.ts";
import { fixedText } from "#src/lib/number-text.ts";
import { Notice } from "#src/ui/notice.tsx";
import { Unverified } from "#src/ui/unverified.tsx";

export interface PredictedPanelProps {
  prediction: PredictionDocument;
  /** position of the pinned layer in print order */
  position: number;
  target: LayerTarget | undefined;
  polymer: Polymer;
  /** of the card, with the profile's laid over them */
  margins: Required<Margins>;
  /** it belongs to an older draft */
  pale: boolean;
  /** where the heat of the layer goes */
  balance: ReactNode;
}

/** What is expected of the pinned layer, in words and numbers, and what that rests on. */
export function PredictedPanel(props: PredictedPanelProps) {
  const { prediction, position, target, polymer, margins, pale, balance } = props;
  const layer = prediction.layers[position];
  if (!layer) return null;
  const crystallises = polymer.crystallinity !== null;
  const uncalibrated = prediction.calibration === "uncalibrated";
  return (
    <div className="flex flex-col gap-4">
      <section aria-label="Predicted" className="flex flex-col gap-2" aria-busy={pale}>
        <h4 className="flex items-baseline justify-between border-b border-ink pb-1 text-small font-semibold">
          <span>Predicted</span>
          <span className="font-normal text-soft">{pale ? "being computed anew" : prediction.calibration}</span>
        </h4>
        <ul className="flex flex-col gap-1 text-small">
          {verdictsOf({ layer, target, margins, crystallises }).map((verdict) => (
            <VerdictRow key={verdict.text} verdict={verdict} />
          ))}
        </ul>
        <PredictedNumbers layer={layer} crystallises={crystallises} unverified={uncalibrated} />
      </section>
      {balance}
      <CardLimits polymer={polymer} margins={margins} />
      {uncalibrated && (
        <Notice kind="note" title="Not calibrated">
          <p className="text-small">
            Nothing of this was fitted to readings of this machine. The range shown is the worst case of all that is
            assumed, not an error bar. Confirm it by a trial.
          </p>
          <AssumedTable assumed={prediction.assumed} />
        </Notice>
      )}
    </div>
  );
}

const SIGNS: Record<Verdict["outcome"], { sign: string; word: string }> = {
  good: { sign: "✓", word: "As wanted" },
  bad: { sign: "×", word: "Not as wanted" },
  open: { sign: "~", word: "Open" },
  plain: { sign: "–", word: "" },
};

function VerdictRow({ verdict: { outcome, text, help } }: { verdict: Verdict }) {
  const { sign, word } = SIGNS[outcome];
  return (
    <li className="grid grid-cols-[1rem_minmax(0,1fr)] gap-x-2">
      <span aria-hidden className="text-center font-mono font-bold">
        {sign}
      </span>
      <span>
        {word && <span className="sr-only">{word}: </span>}
        <span className={outcome === "bad" ? "font-semibold" : undefined}>{text}</span>
        {help && <span className="block text-soft">What would help: {help}</span>}
      </span>
    </li>
  );
}

interface NumbersProps {
  layer: PredictedLayer;
  crystallises: boolean;
  unverified: boolean;
}

function solidRange([soonest, latest]: [number | null, number | null]): string | undefined {
  if (soonest === null) return undefined;
  return latest === null ? `${fixedText(soonest, 1)} and not in time` : rangeText([soonest, latest], 1);
}

function PredictedNumbers({ layer, crystallises, unverified }: NumbersProps) {
  const { interlayerC, contactC, timeAboveTgS, timeToSolidS, highestReheatC, crystallinity, band } = layer;
  const rows: { label: string; value: string; unit: string; range?: string }[] = [
    {
      label: "Interlayer temperature",
      value: fixedText(interlayerC, 0),
      unit: "°C",
      range: band ? rangeText(band.interlayerC, 0) : undefined,
    },
    {
      label: "Contact with the layer below",
      value: fixedText(contactC, 0),
      unit: "°C",
      range: band ? rangeText(band.contactC, 0) : undefined,
    },
    {
      label: "Above Tg for",
      value: timeAboveTgS === null ? "always" : fixedText(timeAboveTgS, 0),
      unit: timeAboveTgS === null ? "" : "s",
      range: band?.timeAboveTgS ? rangeText(band.timeAboveTgS, 0) : undefined,
    },
    {
      label: "Solid after",
      value: timeToSolidS === null ? "not in time" : fixedText(timeToSolidS, 1),
      unit: timeToSolidS === null ? "" : "s",
      range: band ? solidRange(band.timeToSolidS) : undefined,
    },
    {
      label: "Highest reheat",
      value: highestReheatC === null ? "never covered" : fixedText(highestReheatC, 0),
      unit: highestReheatC === null ? "" : "°C",
      range: band?.highestReheatC ? rangeText(band.highestReheatC, 0) : undefined,
    },
    ...(crystallises
      ? [
          {
            label: "Crystallinity",
            value: fixedText(crystallinity, 3),
            unit: "",
            range: band ? rangeText(band.crystallinity, 2) : undefined,
          },
        ]
      : []),
  ];
  return (
    <dl className="grid grid-cols-[minmax(0,1fr)_auto_auto] gap-x-2 text-small">
      {rows.map(({ label, value, unit, range }) => (
        <div key={label} className="col-span-3 grid grid-cols-subgrid items-baseline border-b border-hair py-1">
          <dt className="text-soft">
            {label}
            {range && <span className="block font-mono text-fine">between {range}</span>}
          </dt>
          <dd className="text-right font-mono whitespace-nowrap">
            {unverified ? <Unverified word={false}>{value}</Unverified> : value}
          </dd>
          <dd className="min-w-5 font-mono text-soft">{unit}</dd>
        </div>
      ))}
    </dl>
  );
}

const rangeText = ([low, high]: readonly [number, number], decimals: number): string =>
  `${fixedText(low, decimals)} and ${fixedText(high, decimals)}`;
