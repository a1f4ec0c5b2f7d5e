import { keepPreviousData, useQuery } from "@tanstack/react-query";
import { useMemo, useState } from "react";
import type { Tuning } from "#shared/contract/tunings.ts";
import type { Machine } from "#shared/formats/machine.ts";
import { type PlanDocument, writePlan } from "#shared/formats/plan.ts";
import type { Profile } from "#shared/formats/profile.ts";
import { writeProof } from "#shared/formats/proof.ts";
import type { ReadingDocument } from "#shared/formats/reading.ts";
import { LayerDiff } from "#src/features/diff/layer-diff.tsx";
import { MACHINES, PROFILES, versionQuery } from "#src/features/documents/kinds.ts";
import { LayerLog } from "#src/features/layer-log/layer-log.tsx";
import { PlanInspector, reasonsOf } from "#src/features/layer-log/plan-inspector.tsx";
import { readingTracks, withPlan } from "#src/features/layer-log/reading-tracks.ts";
import { readingDocumentQuery } from "#src/features/toolpaths/queries.ts";
import { savePlanCsv } from "#src/features/tunings/plan-csv.ts";
import { ProofPanel } from "#src/features/tunings/proof-panel.tsx";
import {
  layerDiffQuery,
  tuningChangesQuery,
  tuningPlanQuery,
  tuningProofQuery,
} from "#src/features/tunings/queries.ts";
import { RemarkList } from "#src/features/tunings/remark-list.tsx";
import { fixedText } from "#src/lib/number-text.ts";
import { placedRemarks, remarksOf } from "#src/lib/remarks.ts";
import { saveFile } from "#src/lib/save-file.ts";
import { usePinnedLayer } from "#src/lib/use-pinned-layer.ts";
import { LogBeside } from "#src/routes/log-beside.tsx";
import { usePolymerUsed } from "#src/routes/use-polymers.ts";
import { usePrediction } from "#src/routes/use-prediction.tsx";
import { Button } from "#src/ui/button.tsx";
import { Section } from "#src/ui/section.tsx";
import { Loaded } from "#src/ui/states.tsx";

/** A finished tuning: what was planned and why, the lines that changed, and the proof. */
export function TunedView({ tuning }: { tuning: Tuning }) {
  const reading = useQuery(readingDocumentQuery(tuning.readingId));
  const plan = useQuery(tuningPlanQuery(tuning.id));
  const machine = useQuery(versionQuery(MACHINES, tuning.machineId, tuning.machineVersion));
  const profile = useQuery(versionQuery(PROFILES, tuning.profileId, tuning.profileVersion));
  return (
    <>
      <Loaded query={reading} what="Fetching layers">
        {(found) => (
          <Loaded query={machine} what="Fetching the machine">
            {(version) => (
              <Loaded query={plan} what="Fetching the plan">
                {(planned) => (
                  <Planned
                    tuning={tuning}
                    reading={found}
                    plan={planned}
                    machine={version.document}
                    profile={profile.data?.document}
                  />
                )}
              </Loaded>
            )}
          </Loaded>
        )}
      </Loaded>
      <Proof tuningId={tuning.id} fileName={tuning.fileName} />
    </>
  );
}

interface PlannedProps {
  tuning: Tuning;
  reading: ReadingDocument;
  plan: PlanDocument;
  machine: Machine;
  profile: Profile | undefined;
}

function Planned({ tuning, reading, plan, machine, profile }: PlannedProps) {
  const { layers, findings } = reading;
  const polymer = usePolymerUsed(tuning);
  const prediction = usePrediction({ layers, machine, polymer, profile, plan });
  const predicted = prediction.forecast?.prediction;
  const advice = useMemo(
    () => [...plan.advice, ...(predicted?.advice ?? [])].sort((a, b) => a.layer - b.layer),
    [plan, predicted],
  );
  const read = useMemo(() => readingTracks(layers, machine.channels), [layers, machine]);
  const planned = useMemo(() => withPlan(read, plan), [read, plan]);
  const tracks = useMemo(() => [...planned, ...prediction.tracks], [planned, prediction.tracks]);
  const remarks = useMemo(() => remarksOf(findings, advice, layers), [findings, advice, layers]);
  const marks = useMemo(() => placedRemarks(remarks), [remarks]);
  const [pinned, pin] = usePinnedLayer(
    placedRemarks(remarksOf(findings, plan.advice, layers))[0]?.layer ?? layers[0]?.index,
  );
  const layer = layers.find(({ index }) => index === pinned);
  return (
    <>
      <LogBeside
        log={
          <>
            <LayerLog
              layers={layers}
              tracks={tracks}
              marks={marks}
              zones={profile?.zones}
              states={prediction.states}
              pinnedLayer={pinned ?? null}
              onPin={pin}
              onUnpin={() => pin(undefined)}
              spoken={reasonsOf(plan, layer?.index)}
            />
            {prediction.absent && <div className="border-t border-hair p-2">{prediction.absent}</div>}
          </>
        }
        beside={
          <PlanInspector layer={layer} channels={machine.channels} plan={{ ...plan, advice }}>
            {prediction.ofLayer(layer)}
            {layer && polymer && (
              <p className="text-fine text-soft">
                {`Predicted with the card of ${polymer.name}, the machine and the profile in the versions it was written with.`}
              </p>
            )}
          </PlanInspector>
        }
      />
      <Section title="Lines" note={layer ? `layer ${layer.index}, both files` : undefined}>
        <PinnedDiff
          tuningId={tuning.id}
          machine={machine}
          layer={layer?.index}
          duties={layer ? dutiesText(layer, plan) : ""}
          onPin={pin}
        />
      </Section>
      {layer && polymer && (
        <Section title="Two levers" note={`layer ${layer.index}`}>
          {prediction.leversOf(layer, plan)}
        </Section>
      )}
      <Section
        title="Warnings and advice"
        note="of the file, and what fan and heater can't put right"
        actions={
          <>
            <Button weight="quiet" onClick={() => saveFile(`${tuning.fileName}.plan.json`, writePlan(plan))}>
              Plan as JSON
            </Button>
            <Button
              weight="quiet"
              onClick={() => savePlanCsv(`${tuning.fileName}.plan.csv`, { layers, plan, prediction: predicted })}
            >
              Plan as CSV
            </Button>
          </>
        }
      >
        <RemarkList remarks={remarks} predicted={predicted !== undefined} onPin={pin} />
      </Section>
    </>
  );
}

interface DiffProps {
  tuningId: string;
  machine: Machine;
  layer: number | undefined;
  duties: string;
  onPin(layer: number): void;
}

/** "part-fan 1.00 → 0.12, as in the layer below; lamp 0.70 → 0.50" */
function dutiesText(layer: ReadingDocument["layers"][number], plan: PlanDocument): string {
  const at = plan.layers.findIndex(({ index }) => index === layer.index);
  const [below, planned] = [plan.layers[at - 1], plan.layers[at]];
  return Object.entries(planned?.duty ?? {})
    .map(([id, duty]) => {
      const seen = layer.duty[id];
      const ranged = seen && seen.max - seen.min >= 0.005;
      const before = !seen
        ? "not set"
        : ranged
          ? `${fixedText(seen.min, 2)} to ${fixedText(seen.max, 2)}`
          : fixedText(seen.mean, 2);
      return `${id} ${before} → ${fixedText(duty, 2)}${below?.duty[id] === duty ? ", as in the layer below" : ""}`;
    })
    .join("; ");
}

function PinnedDiff({ tuningId, machine, layer, duties, onPin }: DiffProps) {
  const [takeFocus, setTakeFocus] = useState(false);
  const changes = useQuery(tuningChangesQuery(tuningId));
  // The layer before stays until the next one is here: what has the focus is not taken away meanwhile.
  const diff = useQuery({
    ...layerDiffQuery(tuningId, layer ?? 1),
    enabled: layer !== undefined,
    placeholderData: keepPreviousData,
  });
  return (
    <Loaded query={changes} what="Looking for changes">
      {(changedLayers) =>
        layer === undefined ? (
          <p className="text-soft">
            Pin a layer in the log to see its lines in both files.{" "}
            {changedLayers.length > 0 && (
              <Button
                weight="quiet"
                onClick={() => {
                  setTakeFocus(true);
                  onPin(changedLayers[0]);
                }}
              >
                First changed layer: {changedLayers[0]}
              </Button>
            )}
          </p>
        ) : (
          <Loaded query={diff} what="Fetching lines">
            {(found) => <LayerDiff diff={found} {...{ machine, layer, duties, takeFocus, changedLayers, onPin }} />}
          </Loaded>
        )
      }
    </Loaded>
  );
}

function Proof({ tuningId, fileName }: { tuningId: string; fileName: string }) {
  const query = useQuery(tuningProofQuery(tuningId));
  const actions = query.data && (
    <Button weight="quiet" onClick={() => saveFile(`${fileName}.proof.json`, writeProof(query.data))}>
      Proof as JSON
    </Button>
  );
  return (
    <Section title="Proof" note="made by a second reader" actions={actions}>
      <Loaded query={query} what="Fetching the proof">
        {(proof) => <ProofPanel proof={proof} />}
      </Loaded>
    </Section>
  );
}
