import { useQuery } from "@tanstack/react-query";
import { useEffect, useRef } from "react";
import { layerLinesQuery } from "#src/features/toolpaths/queries.ts";
import { Loaded } from "#src/ui/states.tsx";

interface Props {
  readingId: string;
  layer: number;
  /** a line of the file that is looked for */
  marked?: number;
  /** it stands behind these lines: the last lines of a layer go with the next one, whose commands stand before them */
  onBehind?(): void;
}

/** The G-code of one layer as it stands in the file, with its line numbers. */
export function LayerLines({ readingId, layer, marked, onBehind }: Props) {
  const query = useQuery(layerLinesQuery(readingId, layer));
  const behind =
    query.data !== undefined &&
    marked !== undefined &&
    !query.data.truncated &&
    marked >= query.data.firstLine + linesOf(query.data.text).length;
  const tell = useRef(onBehind);
  tell.current = onBehind;
  useEffect(() => {
    if (behind) tell.current?.();
  }, [behind]);
  return (
    <Loaded query={query} what="Fetching lines">
      {({ firstLine, text, truncated }) => {
        const lines = linesOf(text);
        const at = marked === undefined ? -1 : marked - firstLine;
        return (
          <>
            <Sheet
              label={`Lines of layer ${layer}`}
              firstLine={firstLine}
              lines={lines}
              marked={at >= 0 && at < lines.length ? at : undefined}
            />
            {truncated && (
              <p className="mt-2 text-small text-soft">
                The layer is longer; this is its beginning.
                {at >= lines.length && ` Line ${marked} lies behind it.`}
              </p>
            )}
          </>
        );
      }}
    </Loaded>
  );
}

const linesOf = (text: string): string[] => text.replace(/\r\n?/g, "\n").replace(/\n$/, "").split("\n");

interface SheetProps {
  label: string;
  firstLine: number;
  lines: readonly string[];
  /** position of the line that is looked for */
  marked: number | undefined;
}

/** Height of a line and room above the first, as the classes below set them, rem. */
const [LINE_REM, TOP_REM] = [1.125, 0.5];

function Sheet({ label, firstLine, lines, marked }: SheetProps) {
  const box = useRef<HTMLElement>(null);
  const bar = useRef<HTMLDivElement>(null);
  useEffect(() => {
    if (marked === undefined || !box.current || !bar.current) return;
    box.current.scrollIntoView({ block: "nearest" });
    box.current.focus({ preventScroll: true });
    box.current.scrollTop = bar.current.offsetTop - box.current.clientHeight / 2;
  }, [marked]);
  return (
    <section
      ref={box}
      aria-label={label}
      // biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls must be reachable from the keyboard
      tabIndex={0}
      className="relative max-h-96 overflow-auto border border-hair bg-sheet"
    >
      {marked !== undefined && (
        <div
          ref={bar}
          aria-hidden
          className="absolute inset-x-0 border-y border-ink"
          style={{ top: `${TOP_REM + marked * LINE_REM}rem`, height: `${LINE_REM}rem` }}
        />
      )}
      <div className="flex w-max min-w-full font-mono text-small">
        <pre
          aria-hidden
          className="sticky left-0 border-r border-hair bg-sheet px-3 py-2 text-right text-soft select-none"
        >
          {lines.map((_, line) => firstLine + line).join("\n")}
        </pre>
        <pre className="px-3 py-2">{lines.join("\n")}</pre>
      </div>
    </section>
  );
}
