import { type ReactNode, useMemo, useRef } from "react";
import type { Machine } from "#shared/formats/machine.ts";
import type { PlanDocument } from "#shared/formats/plan.ts";
import type { Polymer } from "#shared/formats/polymer.ts";
import type { Profile } from "#shared/formats/profile.ts";
import type { LayerReading } from "#shared/formats/reading.ts";
import { type LayerTarget, layerTargets } from "#shared/plan/layer-targets.ts";
import { marginsOf } from "#shared/polymers/material.ts";
import { Refusal } from "#shared/refusal.ts";
import { predictionTracks } from "#src/features/layer-log/prediction-tracks.ts";
import type { Track } from "#src/features/layer-log/track.ts";
import { BalancePanel } from "#src/features/prediction/balance-panel.tsx";
import { LeversPanel } from "#src/features/prediction/levers-panel.tsx";
import { ObstacleNotice } from "#src/features/prediction/obstacle-notice.tsx";
import { PredictedPanel } from "#src/features/prediction/predicted-panel.tsx";
import { type LiveForecast, useForecast } from "#src/features/prediction/use-forecast.ts";
import type { Part } from "#src/features/prediction/worker/messages.ts";
import type { PredictedState } from "#src/lib/state-fill.ts";

interface Input {
  layers: readonly LayerReading[];
  machine: Machine;
  /** undefined while there is no card */
  polymer: Polymer | undefined;
  /** undefined while the draft has problems */
  profile: Profile | undefined;
  /** left out: what the profile gives */
  plan?: PlanDocument;
}

export interface PagePrediction extends LiveForecast {
  part: Part | undefined;
  tracks: Track[];
  /** of every layer, once they are predicted */
  states: PredictedState[] | undefined;
  /** said under the log where nothing is predicted and nothing is on its way */
  absent: ReactNode;
  /** what is predicted of a layer, and why, for beside the log */
  ofLayer(layer: LayerReading | undefined): ReactNode;
  /** what fan and lamp do to a layer; the duties are those planned for it, where there is a plan */
  leversOf(layer: LayerReading | undefined, plan: Pick<PlanDocument, "layers"> | undefined): ReactNode;
}

/** The prediction of a page: tracks for its log, panels for its pinned layer. */
export function usePrediction({ layers, machine, polymer, profile, plan }: Input): PagePrediction {
  const part = useMemo(() => polymer && { layers, machine, polymer }, [layers, machine, polymer]);
  const live = useForecast(part, profile, plan);
  const { forecast, pale, obstacle, client } = live;
  const prediction = forecast?.prediction.layers.length === layers.length ? forecast.prediction : undefined;
  const known = useLastKnown(profile);
  const targets = useTargets(layers, known);
  const own = known?.margins;
  const fresh = useMemo(
    () => (polymer && targets ? predictionTracks({ polymer, margins: own, targets, prediction }) : []),
    [polymer, own, targets, prediction],
  );
  const tracks = useMemo(() => fresh.map((track) => ({ ...track, pale })), [fresh, pale]);
  const crystallises = polymer?.crystallinity !== null;
  const states = useMemo(
    () => (crystallises ? prediction?.layers.map(({ verdicts }) => verdicts.state) : undefined),
    [prediction, crystallises],
  );
  const positionOf = (layer: LayerReading) => layers.indexOf(layer);

  const absent = part ? (
    obstacle && <ObstacleNotice obstacle={obstacle} />
  ) : (
    <p className="text-small">{`Nothing is predicted: there is no card of ${known?.polymer ?? "the polymer"}. Colours and zones show what is wanted.`}</p>
  );
  const ofLayer = (layer: LayerReading | undefined) => {
    if (!layer) return null;
    if (!part) return absent;
    if (obstacle) return <ObstacleNotice obstacle={obstacle} />;
    if (!prediction) return <p className="text-small text-soft">Being predicted …</p>;
    const position = positionOf(layer);
    return (
      <PredictedPanel
        prediction={prediction}
        position={position}
        target={targets?.[position]}
        polymer={part.polymer}
        margins={marginsOf(part.polymer, own)}
        pale={pale}
        balance={
          <BalancePanel client={client} part={part} forecast={pale ? undefined : forecast} position={position} />
        }
      />
    );
  };
  const leversOf: PagePrediction["leversOf"] = (layer, planned) =>
    part ? (
      <LeversPanel
        client={client}
        part={part}
        layer={layer}
        duty={layer && planned?.layers[positionOf(layer)]?.duty}
        margins={marginsOf(part.polymer, own)}
      />
    ) : (
      <p className="text-soft">Without a polymer card there is nothing to compute with.</p>
    );
  return { ...live, part, tracks, states, absent, ofLayer, leversOf };
}

/** While a draft has problems, what was last without stays. */
function useLastKnown<Value>(value: Value | undefined): Value | undefined {
  const last = useRef(value);
  if (value !== undefined) last.current = value;
  return last.current;
}

/** What is wanted of every layer; undefined where the profile leaves layers out. */
function useTargets(layers: readonly LayerReading[], profile: Profile | undefined): LayerTarget[] | undefined {
  return useMemo(() => {
    if (!profile) return undefined;
    try {
      return layerTargets(layers, profile);
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      return undefined;
    }
  }, [layers, profile]);
}
