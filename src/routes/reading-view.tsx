import { useQuery } from "@tanstack/react-query";
import { useMemo, useState } from "react";
import type { Machine } from "#shared/formats/machine.ts";
import type { ReadingDocument } from "#shared/formats/reading.ts";
import { durationText } from "#shared/units/words.ts";
import { MACHINES, versionQuery } from "#src/features/documents/kinds.ts";
import { LayerLog } from "#src/features/layer-log/layer-log.tsx";
import { PlanInspector } from "#src/features/layer-log/plan-inspector.tsx";
import { readingTracks } from "#src/features/layer-log/reading-tracks.ts";
import { Findings } from "#src/features/toolpaths/findings.tsx";
import { LayerLines } from "#src/features/toolpaths/layer-lines.tsx";
import { readingDocumentQuery } from "#src/features/toolpaths/queries.ts";
import { Waits } from "#src/features/toolpaths/waits.tsx";
import { counted } from "#src/lib/format.ts";
import { fixedText } from "#src/lib/number-text.ts";
import { findingRemarks, placedRemarks } from "#src/lib/remarks.ts";
import { usePinnedLayer } from "#src/lib/use-pinned-layer.ts";
import { LogBeside } from "#src/routes/log-beside.tsx";
import { Button } from "#src/ui/button.tsx";
import { Facts } from "#src/ui/facts.tsx";
import { Section } from "#src/ui/section.tsx";
import { Loaded } from "#src/ui/states.tsx";

interface Props {
  reading: { id: string; machineId: string; machineVersion: number };
}

/** A finished reading: its numbers, the layer log, what was found. */
export function ReadingView({ reading }: Props) {
  const document = useQuery(readingDocumentQuery(reading.id));
  const machine = useQuery(versionQuery(MACHINES, reading.machineId, reading.machineVersion));
  return (
    <Loaded query={document} what="Fetching layers">
      {(found) => (
        <Loaded query={machine} what="Fetching the machine">
          {(version) => <Read readingId={reading.id} document={found} machine={version.document} />}
        </Loaded>
      )}
    </Loaded>
  );
}

function Read({ readingId, document, machine }: { readingId: string; document: ReadingDocument; machine: Machine }) {
  const [linesShown, showLines] = useState(false);
  const [marked, mark] = useState<{ line: number; layer: number }>();
  const { layers, findings, totals } = document;
  const tracks = useMemo(() => readingTracks(layers, machine.channels), [layers, machine]);
  const marks = useMemo(() => placedRemarks(findingRemarks(findings, layers)), [findings, layers]);
  const [pinned, pin] = usePinnedLayer(marks[0]?.layer ?? layers[0]?.index);
  const layer = layers.find(({ index }) => index === pinned);
  const top = layers.at(-1);
  const layerWith = (line: number) => layers.find(({ firstLine, lastLine }) => firstLine <= line && line <= lastLine);
  const show = (line: number, inLayer: number) => {
    pin(inLayer);
    showLines(true);
    mark({ line, layer: inLayer });
  };
  return (
    <>
      <Facts
        facts={[
          { label: "Layers", value: totals.layers },
          { label: "Height", value: top ? fixedText(Math.max(...layers.map(({ zMm }) => zMm)), 2) : "–", unit: "mm" },
          { label: "Print time", value: durationText(totals.printTimeS) },
          { label: "Deposited", value: fixedText(totals.depositedLengthMm / 1000, 2), unit: "m" },
          { label: "Travel", value: fixedText(totals.travelLengthMm / 1000, 2), unit: "m" },
          { label: "Filament", value: fixedText(totals.filamentMm / 1000, 3), unit: "m" },
          { label: "Lines", value: counted(document.file.lines) },
        ]}
      />
      <LogBeside
        log={
          <LayerLog
            layers={layers}
            tracks={tracks}
            marks={marks}
            pinnedLayer={pinned ?? null}
            onPin={pin}
            onUnpin={() => pin(undefined)}
          />
        }
        beside={<PlanInspector layer={layer} channels={machine.channels} />}
      />
      {layer && (
        <Section
          title="Lines"
          note={`layer ${layer.index}, ${counted(layer.lastLine - layer.firstLine + 1, "line")}`}
          actions={
            <Button weight="quiet" aria-expanded={linesShown} onClick={() => showLines(!linesShown)}>
              {linesShown ? "Put away" : "Show"}
            </Button>
          }
        >
          {linesShown ? (
            <LayerLines
              key={layer.index}
              readingId={readingId}
              layer={layer.index}
              marked={marked?.layer === layer.index ? marked.line : undefined}
              onBehind={() => marked && layer.index < layers.length && show(marked.line, layer.index + 1)}
            />
          ) : (
            <p className="text-soft">
              From line <span className="font-mono">{layer.firstLine}</span> to line{" "}
              <span className="font-mono">{layer.lastLine}</span> of the file.
            </p>
          )}
        </Section>
      )}
      <Section title="Findings" note="what looks odd in the file">
        <Findings
          findings={findings}
          onPin={pin}
          hasLine={(line) => layerWith(line) !== undefined}
          onLine={(line) => show(line, layerWith(line)?.index ?? 1)}
        />
      </Section>
      <Section title="Dwells and pauses" note="what has no known length is not in the print time">
        <Waits layers={layers} />
      </Section>
    </>
  );
}
