import { lazy, Suspense, useMemo, useRef, useState } from "react";
import type { LayerDiff as Diff } from "#shared/contract/tunings.ts";
import type { Machine } from "#shared/formats/machine.ts";
import { joinHunks } from "#src/features/diff/join-hunks.ts";
import type { DiffHandle } from "#src/features/diff/monaco-diff.tsx";
import { Button } from "#src/ui/button.tsx";
import { Loading } from "#src/ui/states.tsx";

// The editor is several times the size of everything else: it is fetched when a diff is first looked at.
const MonacoDiff = lazy(async () => ({ default: (await import("#src/features/diff/monaco-diff.tsx")).MonacoDiff }));

interface Props {
  diff: Diff;
  machine: Machine;
  layer: number;
  /** layers with changes, ascending */
  changedLayers: readonly number[];
  onPin(layer: number): void;
}

/** One layer of both files, and the ways from change to change. */
export function LayerDiff({ diff, machine, layer, changedLayers, onPin }: Props) {
  const handle = useRef<DiffHandle>(null);
  const { original, tuned } = useMemo(() => joinHunks(diff.hunks), [diff]);
  const [count, setCount] = useState<number>();
  const below = changedLayers.filter((index) => index < layer).at(-1);
  const above = changedLayers.find((index) => index > layer);
  return (
    <div>
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
              : `${count} place${count === 1 ? "" : "s"} changed`}
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
          Original, from line <span className="font-mono">{original.lineNumbers[0]}</span>
        </p>
        <p className="pb-1">
          <span aria-hidden className="font-mono">
            +{" "}
          </span>
          Tuned, from line <span className="font-mono">{tuned.lineNumbers[0]}</span>
        </p>
      </div>
      <Suspense fallback={<Loading what="Fetching the diff" />}>
        <MonacoDiff {...{ original, tuned, machine, handle }} onChanges={setCount} />
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
