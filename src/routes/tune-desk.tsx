import { useQuery } from "@tanstack/react-query";
import { useMemo, useState } from "react";
import type { Reading } from "#shared/contract/toolpaths.ts";
import type { Machine } from "#shared/formats/machine.ts";
import type { Polymer } from "#shared/formats/polymer.ts";
import type { Profile } from "#shared/formats/profile.ts";
import type { ReadingDocument } from "#shared/formats/reading.ts";
import { paths } from "#src/app/paths.ts";
import { useMay } from "#src/features/auth/session-context.tsx";
import { historyQuery, MACHINES, PROFILES, type Version, versionQuery } from "#src/features/documents/kinds.ts";
import { LayerLog } from "#src/features/layer-log/layer-log.tsx";
import { PlanInspector, reasonsOf } from "#src/features/layer-log/plan-inspector.tsx";
import { readingTracks, withPlan } from "#src/features/layer-log/reading-tracks.ts";
import { ProfileForm } from "#src/features/profiles/editor/profile-form.tsx";
import { useProfileEditing } from "#src/features/profiles/editor/use-profile-editing.ts";
import { ZoneBands } from "#src/features/profiles/editor/zone-bands.tsx";
import { ProfileSheet } from "#src/features/profiles/profile-sheet.tsx";
import { readingDocumentQuery } from "#src/features/toolpaths/queries.ts";
import { savePlanCsv } from "#src/features/tunings/plan-csv.ts";
import { RemarkList } from "#src/features/tunings/remark-list.tsx";
import { moment } from "#src/lib/format.ts";
import { placedRemarks, remarksOf } from "#src/lib/remarks.ts";
import { documentFileName } from "#src/lib/save-file.ts";
import { undoKeys } from "#src/lib/undo-keys.ts";
import { useDraft } from "#src/lib/use-draft.ts";
import { usePinnedLayer } from "#src/lib/use-pinned-layer.ts";
import { useWindowHeight } from "#src/lib/use-window-height.ts";
import { Unfit } from "#src/routes/unfit.tsx";
import { usePlanned } from "#src/routes/use-planned.ts";
import { usePolymerOf } from "#src/routes/use-polymers.ts";
import { WriteTuned } from "#src/routes/write-tuned.tsx";
import { Button, ButtonLink } from "#src/ui/button.tsx";
import { Notice } from "#src/ui/notice.tsx";
import { RefusalNotice } from "#src/ui/refusal-notice.tsx";
import { Loaded } from "#src/ui/states.tsx";
import { Tabs } from "#src/ui/tabs.tsx";

interface Props {
  reading: Reading;
  profile: { id: string; version: number };
}

/** The reading, the machine and the profile version that were chosen, once all are here. */
export function TuneDesk({ reading, profile: { id, version } }: Props) {
  const document = useQuery(readingDocumentQuery(reading.id));
  const machine = useQuery(versionQuery(MACHINES, reading.machineId, reading.machineVersion));
  const profile = useQuery(versionQuery(PROFILES, id, version));
  const history = useQuery(historyQuery(PROFILES, id));
  return (
    <Loaded query={document} what="Fetching layers">
      {(read) => (
        <Loaded query={machine} what="Fetching the machine">
          {({ document: machineDocument }) => (
            <Loaded query={profile} what="Fetching the profile">
              {(chosen) => (
                <Loaded query={history} what="Looking for the profile's versions">
                  {({ versions }) => (
                    <Desk
                      reading={reading}
                      document={read}
                      machine={machineDocument}
                      chosen={chosen}
                      latest={versions[0].number}
                    />
                  )}
                </Loaded>
              )}
            </Loaded>
          )}
        </Loaded>
      )}
    </Loaded>
  );
}

interface DeskProps {
  reading: Reading;
  document: ReadingDocument;
  machine: Machine;
  chosen: Version<Profile>;
  /** number of the profile's latest version: a changed draft is saved on top of it */
  latest: number;
}

const BANDS_PX = 144;

/** What stands beside the log. */
type Beside = "profile" | "layer" | "levers" | "remarks";

function Desk({ reading, document, machine, chosen, latest }: DeskProps) {
  const mayEdit = useMay()("edit");
  const [begunFrom] = useState(latest);
  const base = useMemo(() => ({ number: begunFrom, document: chosen.document }), [begunFrom, chosen]);
  const draft = useDraft(`tune.${chosen.id}.${chosen.number}`, base);
  const profile = mayEdit ? draft.document : chosen.document;
  const { polymer, names } = usePolymerOf(profile.polymer);
  const desk = useDesk(document, machine, profile, polymer, draft.change);
  const { layers, findings, plan, prediction, advice, editing, layer, pinned, pin, rugs, at } = desk;
  const [selected, setSelected] = useState(0);
  const [beside, showBeside] = useState<Beside>("profile");
  const read = useMemo(() => readingTracks(layers, machine.channels), [layers, machine]);
  const planned = useMemo(() => withPlan(read, plan), [read, plan]);
  const tracks = useMemo(() => [...planned, ...prediction.tracks], [planned, prediction.tracks]);
  const remarks = useMemo(() => remarksOf(findings, advice, layers), [findings, advice, layers]);
  const marks = useMemo(() => placedRemarks(remarks), [remarks]);
  const heightPx = useDeskHeight();
  const log = (
    <LayerLog
      layers={layers}
      tracks={tracks}
      marks={marks}
      zones={profile.zones}
      states={prediction.states}
      pinnedLayer={pinned ?? null}
      onPin={pin}
      onUnpin={() => pin(undefined)}
      spoken={reasonsOf(plan, pinned)}
      heightPx={heightPx}
      aside={
        mayEdit
          ? {
              title:
                editing.scale.unit === "mm"
                  ? "Zones, mm"
                  : editing.scale.unit === "layer"
                    ? "Zones, layer"
                    : "Zones, 0–1",
              widthPx: BANDS_PX,
              render: (axis) => <ZoneBands editing={editing} axis={axis} selected={selected} onSelect={setSelected} />,
            }
          : undefined
      }
    />
  );
  const form = mayEdit ? (
    <ProfileForm editing={editing} selected={selected} onSelect={setSelected} polymers={names} rugs={rugs} at={at} />
  ) : (
    <ProfileSheet profile={profile} />
  );
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: the fields within it have the focus; this only hears undo
    <div
      className="grid gap-x-8 gap-y-6 border-t border-rule pt-4 xl:grid-cols-[minmax(0,1fr)_33rem]"
      onKeyDown={mayEdit ? (event) => undoKeys(event, editing) : undefined}
    >
      <div className="min-w-0 self-start xl:sticky xl:top-0">
        <WriteTuned
          readingId={reading.id}
          profile={chosen}
          draft={draft}
          checked={editing.checked}
          ready={plan !== undefined && desk.problem === undefined && editing.checked !== undefined}
          remarks={remarks}
          unfit={<Unfit editing={editing} mayEdit={mayEdit} />}
        />
        <div className="border border-rule">{log}</div>
        <div className="flex flex-wrap gap-x-5 py-1">
          <ButtonLink
            weight="quiet"
            className="text-small"
            to={paths.comparePlans(reading.id, { id: chosen.id, version: chosen.number })}
          >
            Compare with another profile
          </ButtonLink>
          <Button
            weight="quiet"
            className="text-small"
            disabled={!plan}
            onClick={() => plan && savePlanCsv(csvName(profile), { layers, plan, prediction: desk.predicted })}
          >
            Plan as CSV
          </Button>
        </div>
        {prediction.absent}
        {desk.problem && <RefusalNotice title="This can't be planned yet" refusal={desk.problem} />}
      </div>
      <div className="min-w-0">
        {draft.changed && draft.resumedFrom && (
          <div className="pb-4">
            <Notice kind="note" actions={<Button onClick={draft.discard}>Discard them</Button>}>
              The profile has your changes from {moment(draft.resumedFrom)}, not saved yet.
            </Notice>
          </div>
        )}
        <Tabs<Beside>
          label="Beside the log"
          shown={beside}
          onShow={showBeside}
          tabs={[
            { id: "profile", name: "Profile", panel: form },
            {
              id: "layer",
              name: layer ? `Layer ${layer.index}` : "Layer",
              panel: (
                <PlanInspector layer={layer} channels={machine.channels} plan={plan && { ...plan, advice }}>
                  {prediction.ofLayer(layer)}
                </PlanInspector>
              ),
            },
            { id: "levers", name: "Levers", panel: prediction.leversOf(layer, plan) },
            {
              id: "remarks",
              name: remarks.length > 0 ? `Warnings and advice, ${remarks.length}` : "Warnings and advice",
              panel: <RemarkList remarks={remarks} predicted={desk.predicted !== undefined} onPin={pin} />,
            },
          ]}
        />
      </div>
    </div>
  );
}

const csvName = ({ name }: Profile): string => documentFileName(name).replace(/json$/, "plan.csv");

/** Button, head and foot of the log, and most of the page's head stand in sight together with the plot. */
const AROUND_PLOT_PX = 520;

function useDeskHeight(): number {
  return Math.min(Math.max(useWindowHeight() - AROUND_PLOT_PX, 340), 760);
}

/** The draft on the table, the plan it gives, and the pinned layer. */
function useDesk(
  { layers, findings }: ReadingDocument,
  machine: Machine,
  profile: Profile,
  polymer: Polymer | undefined,
  onChange: (profile: Profile) => void,
) {
  const [pinned, pin] = usePinnedLayer();
  const part = useMemo(() => ({ layerTopsMm: firstObject(layers).map(({ zMm }) => zMm) }), [layers]);
  const editing = useProfileEditing({ profile, onChange, machine, polymer, part });
  const { plan, refusal, prediction, predicted } = usePlanned({ layers, machine, polymer, profile: editing.checked });
  const advice = useMemo(
    () => [...(plan?.advice ?? []), ...(predicted?.advice ?? [])].sort((a, b) => a.layer - b.layer),
    [plan, predicted],
  );
  const layer = layers.find(({ index }) => index === pinned);
  const rugs = useMemo(
    () => ({
      "layer-time": layers.map(({ timeS }) => timeS),
      "deposited-length": layers.map(({ depositedLengthMm }) => depositedLengthMm),
      height: layers.map(({ zMm }) => zMm),
    }),
    [layers],
  );
  const at = layer && { "layer-time": layer.timeS, "deposited-length": layer.depositedLengthMm, height: layer.zMm };
  return {
    layers,
    findings,
    plan,
    prediction,
    predicted,
    advice,
    problem: refusal,
    editing,
    layer,
    pinned,
    pin,
    rugs,
    at,
  };
}

/** Zones are laid over one object; those printed after it get the same ones. */
const firstObject = (layers: ReadingDocument["layers"]) => layers.filter(({ object }) => object === layers[0].object);
