import { lazy, Suspense, useEffect, useMemo, useRef, useState } from "react";
import type { LayerDiff as Diff } from "#shared/contract/tunings.ts";
import type { Machine } from "#shared/formats/machine.ts";
import { joinHunks } from "#src/features/diff/join-hunks.ts";
import type { DiffChanges, DiffHandle } from "#src/features/diff/monaco-diff.tsx";
import { counted } from "#src/lib/format.ts";
import { Button } from "#src/ui/button.tsx";
import { Loading } from "#src/ui/states.tsx";

// The editor is several times the size of everything else: it is fetched when a diff is first looked at.
const MonacoDiff = lazy(async () => ({ default: (await import("#src/features/diff/monaco-diff.tsx")).MonacoDiff }));

interface Props {
  diff: Diff;
  machine: Machine;
  layer: number;
  /** what becomes of the channels' duties in this layer */
  duties: string;
  /** it was asked for with the keyboard or a click elsewhere, which is gone by now */
  takeFocus?: boolean;
  /** layers with changes, ascending */
  changedLayers: readonly number[];
  onPin(layer: number): void;
}

/** One layer of both files, and the ways from change to change. */
export function LayerDiff({ diff, machine, layer, duties, takeFocus = false, changedLayers, onPin }: Props) {
  const handle = useRef<DiffHandle>(null);
  const { original, tuned } = useMemo(() => joinHunks(diff.hunks), [diff]);
  const [changes, setChanges] = useState<DiffChanges>();
  const count = changes?.places;
  const top = useRef<HTMLDivElement>(null);
  useEffect(() => {
    if (takeFocus) top.current?.focus();
  }, [takeFocus]);
  const below = changedLayers.filter((index) => index < layer).at(-1);
  const above = changedLayers.find((index) => index > layer);
  return (
    // biome-ignore lint/a11y/useSemanticElements: a diff is no set of form fields
    <div ref={top} role="group" tabIndex={-1} aria-label={`Layer ${layer} in both files`} className="outline-none">
      <p className="pb-2">{duties}</p>
      <div className="flex flex-wrap items-center gap-3 pb-3">
        <Button disabled={!count} onClick={() => handle.current?.toChange("previous")}>
          Previous change
        </Button>
        <Button disabled={!count} onClick={() => handle.current?.toChange("next")}>
          Next change
        </Button>
        <p role="status" className="min-w-44 text-small text-soft">
          {count === undefined
            ? ""
            : count === 0
              ? "Nothing changed in this layer."
              : `${counted(count, "place")} changed: ${counted(changes?.out ?? 0, "line")} taken out, ${changes?.in ?? 0} put in`}
        </p>
        <span className="ml-auto flex flex-wrap gap-3">
          <Button disabled={below === undefined} onClick={() => below !== undefined && onPin(below)}>
            Changed layer below{below !== undefined && <span className="font-mono text-small">{below}</span>}
          </Button>
          <Button disabled={above === undefined} onClick={() => above !== undefined && onPin(above)}>
            Changed layer above{above !== undefined && <span className="font-mono text-small">{above}</span>}
          </Button>
        </span>
      </div>
      <div className="grid grid-cols-2 text-small">
        <p className="pb-1">
          <span aria-hidden className="font-mono">
            −{" "}
          </span>
          Original, from line <span className="font-mono">{original.lineNumbers.find((number) => number !== "")}</span>
        </p>
        <p className="pb-1">
          <span aria-hidden className="font-mono">
            +{" "}
          </span>
          Tuned, from line <span className="font-mono">{tuned.lineNumbers.find((number) => number !== "")}</span>
        </p>
      </div>
      <Suspense fallback={<Loading what="Fetching the diff" />}>
        <MonacoDiff {...{ original, tuned, machine, handle }} onChanges={setChanges} />
      </Suspense>
      <p className="flex flex-wrap gap-x-6 pt-2 text-small text-soft">
        <span>
          <span aria-hidden className="diff-fan diff-edge mr-2 inline-block h-3 w-5 align-middle" />
          drives a fan
        </span>
        <span>
          <span aria-hidden className="diff-heater diff-edge mr-2 inline-block h-3 w-5 align-middle" />
          drives a heater
        </span>
        {diff.shows !== "layer" && (
          <span>
            The layer is long: shown are{" "}
            {diff.shows === "changes" ? "its changes" : "the first of its changes, as many as can be shown at once,"}{" "}
            and the lines around them.
          </span>
        )}
      </p>
    </div>
  );
}
