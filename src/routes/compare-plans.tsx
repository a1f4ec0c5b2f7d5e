import { useQuery } from "@tanstack/react-query";
import { useMemo } from "react";
import { useParams, useSearchParams } from "react-router-dom";
import type { Reading } from "#shared/contract/toolpaths.ts";
import type { Machine } from "#shared/formats/machine.ts";
import type { Profile } from "#shared/formats/profile.ts";
import type { ReadingDocument } from "#shared/formats/reading.ts";
import { paths } from "#src/app/paths.ts";
import { MACHINES, PROFILES, type Version, versionQuery } from "#src/features/documents/kinds.ts";
import { comparisonTracks } from "#src/features/layer-log/comparison-tracks.ts";
import { LayerLog } from "#src/features/layer-log/layer-log.tsx";
import { readingDocumentQuery, readingQuery, toolpathQuery } from "#src/features/toolpaths/queries.ts";
import { DifferenceRuns } from "#src/features/tunings/difference-runs.tsx";
import { planDifferences } from "#src/features/tunings/plan-differences.ts";
import { usePageTitle } from "#src/lib/use-page-title.ts";
import { usePinnedLayer } from "#src/lib/use-pinned-layer.ts";
import { type Choice, ProfileChoice, useVersionChoice } from "#src/routes/profile-choice.tsx";
import { usePlanned } from "#src/routes/use-planned.ts";
import { usePolymerOf } from "#src/routes/use-polymers.ts";
import { ButtonLink } from "#src/ui/button.tsx";
import { RefusalNotice } from "#src/ui/refusal-notice.tsx";
import { PageHead, Section } from "#src/ui/section.tsx";
import { Empty, Loaded } from "#src/ui/states.tsx";

/** Two profiles, or two versions of one, on the same toolpath and machine. */
export function ComparePlansPage() {
  const { id = "" } = useParams();
  const reading = useQuery(readingQuery(id));
  return (
    <Loaded query={reading} what="Looking for the reading">
      {(found) => <Compare key={found.id} reading={found} />}
    </Loaded>
  );
}

function Compare({ reading }: { reading: Reading }) {
  const toolpath = useQuery(toolpathQuery(reading.toolpathId));
  const document = useQuery({ ...readingDocumentQuery(reading.id), enabled: reading.state === "done" });
  const machine = useQuery(versionQuery(MACHINES, reading.machineId, reading.machineVersion));
  const [first, second] = [useSide("a"), useSide("b")];
  const on = { id: reading.machineId, name: reading.machineName };
  const name = toolpath.data?.name ?? "Toolpath";
  usePageTitle(`Two profiles on ${name}`);
  return (
    <>
      <PageHead
        kind="Two profiles"
        title={name}
        note={`on ${reading.machineName}`}
        actions={<ButtonLink to={paths.tune(reading.id)}>Back to tuning</ButtonLink>}
      />
      <Section title="Before" note="full lines">
        <div className="grid gap-4 md:grid-cols-[minmax(0,1fr)_14rem]">
          <ProfileChoice {...first} machine={on} />
        </div>
      </Section>
      <Section title="After" note="broken lines">
        <div className="grid gap-4 md:grid-cols-[minmax(0,1fr)_14rem]">
          <ProfileChoice {...second} machine={on} />
        </div>
      </Section>
      {reading.state !== "done" ? (
        <Empty>The toolpath has not been read yet.</Empty>
      ) : first.version === undefined || second.version === undefined ? (
        <Empty>Choose two profiles, or the same one in two versions.</Empty>
      ) : (
        <Loaded query={document} what="Fetching layers">
          {(read) => (
            <Loaded query={machine} what="Fetching the machine">
              {(found) => (
                <Sides
                  document={read}
                  machine={found.document}
                  first={{ id: first.profileId, version: first.version as number }}
                  second={{ id: second.profileId, version: second.version as number }}
                />
              )}
            </Loaded>
          )}
        </Loaded>
      )}
    </>
  );
}

/** One side's choice, kept in the address. */
function useSide(side: "a" | "b"): Choice {
  const [search, setSearch] = useSearchParams();
  const profileId = search.get(side) ?? search.get("a") ?? "";
  const version = useVersionChoice(profileId, Number(search.get(`${side}v`)));
  return {
    profileId,
    version,
    choose: (profile, wanted) => {
      const next = new URLSearchParams(search);
      next.set(side, profile);
      if (wanted === undefined) next.delete(`${side}v`);
      else next.set(`${side}v`, String(wanted));
      setSearch(next, { replace: true, preventScrollReset: true });
    },
  };
}

interface Chosen {
  id: string;
  version: number;
}

function Sides({
  document,
  machine,
  first,
  second,
}: {
  document: ReadingDocument;
  machine: Machine;
  first: Chosen;
  second: Chosen;
}) {
  const before = useQuery(versionQuery(PROFILES, first.id, first.version));
  const after = useQuery(versionQuery(PROFILES, second.id, second.version));
  return (
    <Loaded query={before} what="Fetching the first profile">
      {(left) => (
        <Loaded query={after} what="Fetching the second profile">
          {(right) => <Compared layers={document.layers} machine={machine} first={left} second={right} />}
        </Loaded>
      )}
    </Loaded>
  );
}

interface ComparedProps {
  layers: ReadingDocument["layers"];
  machine: Machine;
  first: Version<Profile>;
  second: Version<Profile>;
}

function Compared({ layers, machine, first, second }: ComparedProps) {
  const [pinned, pin] = usePinnedLayer();
  const firstCard = usePolymerOf(first.document.polymer).polymer;
  const secondCard = usePolymerOf(second.document.polymer).polymer;
  const before = usePlanned({ layers, machine, polymer: firstCard, profile: first.document });
  const after = usePlanned({ layers, machine, polymer: secondCard, profile: second.document });
  const [left, right] = [useSideOf(before), useSideOf(after)];
  const card = firstCard?.name === secondCard?.name ? firstCard : undefined;
  const tracks = useMemo(() => {
    if (!left || !right) return [];
    const sides = [
      { name: "before", ...left },
      { name: "after", ...right },
    ] as const;
    return comparisonTracks(machine.channels, sides, card);
  }, [machine, left, right, card]);
  const runs = useMemo(() => (left && right ? planDifferences(left, right) : []), [left, right]);
  const refused = [before.refusal, after.refusal].filter((refusal) => refusal !== undefined);
  return (
    <>
      {refused.map((refusal) => (
        <RefusalNotice key={refusal.message} title="This can't be planned" refusal={refusal} />
      ))}
      <div className="my-5 border border-rule">
        <LayerLog
          layers={layers}
          tracks={tracks}
          zones={second.document.zones}
          pinnedLayer={pinned ?? null}
          onPin={pin}
          heightPx={480}
        />
      </div>
      <Section title="Differences" note="from the bottom up">
        {left && right ? (
          <DifferenceRuns runs={runs} onPin={pin} />
        ) : (
          <p role="status" className="text-soft">
            {refused.length > 0 ? "" : "Planning …"}
          </p>
        )}
      </Section>
    </>
  );
}

function useSideOf({ plan, predicted }: ReturnType<typeof usePlanned>) {
  return useMemo(() => plan && { plan, prediction: predicted }, [plan, predicted]);
}
