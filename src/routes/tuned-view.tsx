import { useQuery } from "@tanstack/react-query";
import { useMemo } from "react";
import type { Tuning } from "#shared/contract/tunings.ts";
import type { Machine } from "#shared/formats/machine.ts";
import { type PlanDocument, writePlan } from "#shared/formats/plan.ts";
import type { Profile } from "#shared/formats/profile.ts";
import { writeProof } from "#shared/formats/proof.ts";
import type { ReadingDocument } from "#shared/formats/reading.ts";
import { LayerDiff } from "#src/features/diff/layer-diff.tsx";
import { MACHINES, PROFILES, versionQuery } from "#src/features/documents/kinds.ts";
import { LayerLog } from "#src/features/layer-log/layer-log.tsx";
import { adviceMarks, findingMarks } from "#src/features/layer-log/log-marks.ts";
import { PlanInspector } from "#src/features/layer-log/plan-inspector.tsx";
import { readingTracks, withPlan } from "#src/features/layer-log/reading-tracks.ts";
import { readingDocumentQuery } from "#src/features/toolpaths/queries.ts";
import { AdviceList } from "#src/features/tunings/advice-list.tsx";
import { savePlanCsv } from "#src/features/tunings/plan-csv.ts";
import { ProofPanel } from "#src/features/tunings/proof-panel.tsx";
import {
  layerDiffQuery,
  tuningChangesQuery,
  tuningPlanQuery,
  tuningProofQuery,
} from "#src/features/tunings/queries.ts";
import { saveFile } from "#src/lib/save-file.ts";
import { usePinnedLayer } from "#src/lib/use-pinned-layer.ts";
import { LogBeside } from "#src/routes/log-beside.tsx";
import { usePolymerOf } from "#src/routes/use-polymers.ts";
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
  const [pinned, pin] = usePinnedLayer();
  const { layers, findings } = reading;
  const { polymer } = usePolymerOf(profile?.polymer ?? "");
  const prediction = usePrediction({ layers, machine, polymer, profile, plan });
  const predicted = prediction.forecast?.prediction;
  const advice = useMemo(
    () => [...plan.advice, ...(predicted?.advice ?? [])].sort((a, b) => a.layer - b.layer),
    [plan, predicted],
  );
  const read = useMemo(() => readingTracks(layers, machine.channels), [layers, machine]);
  const planned = useMemo(() => withPlan(read, plan), [read, plan]);
  const tracks = useMemo(() => [...planned, ...prediction.tracks], [planned, prediction.tracks]);
  const marks = useMemo(() => [...findingMarks(findings, layers), ...adviceMarks(advice)], [findings, layers, advice]);
  const layer = layers.find(({ index }) => index === pinned);
  return (
    <>
      <LogBeside
        log={
          <LayerLog
            layers={layers}
            tracks={tracks}
            marks={marks}
            zones={profile?.zones}
            states={prediction.states}
            pinnedLayer={pinned ?? null}
            onPin={pin}
          />
        }
        beside={
          <PlanInspector layer={layer} channels={machine.channels} plan={{ ...plan, advice }}>
            {prediction.ofLayer(layer)}
            {layer && polymer && (
              <p className="text-fine text-soft">
                {`Predicted with the card of ${polymer.name} as it is now, and the machine and profile as they were.`}
              </p>
            )}
          </PlanInspector>
        }
      />
      <Section title="Lines" note={layer ? `layer ${layer.index}, both files` : undefined}>
        <PinnedDiff tuningId={tuning.id} machine={machine} layer={layer?.index} onPin={pin} />
      </Section>
      {layer && polymer && (
        <Section title="Two levers" note={`layer ${layer.index}`}>
          {prediction.leversOf(layer, plan)}
        </Section>
      )}
      <Section
        title="Advice"
        note="what fan and heater can't put right"
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
        <AdviceList advice={advice} onPin={pin} />
      </Section>
    </>
  );
}

interface DiffProps {
  tuningId: string;
  machine: Machine;
  layer: number | undefined;
  onPin(layer: number): void;
}

function PinnedDiff({ tuningId, machine, layer, onPin }: DiffProps) {
  const changes = useQuery(tuningChangesQuery(tuningId));
  const diff = useQuery({ ...layerDiffQuery(tuningId, layer ?? 1), enabled: layer !== undefined });
  return (
    <Loaded query={changes} what="Looking for changes">
      {(changedLayers) =>
        layer === undefined ? (
          <p className="text-soft">
            Pin a layer in the log to see its lines in both files.{" "}
            {changedLayers.length > 0 && (
              <Button weight="quiet" onClick={() => onPin(changedLayers[0])}>
                First changed layer: {changedLayers[0]}
              </Button>
            )}
          </p>
        ) : (
          <Loaded query={diff} what="Fetching lines">
            {(found) => <LayerDiff diff={found} {...{ machine, layer, changedLayers, onPin }} />}
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
