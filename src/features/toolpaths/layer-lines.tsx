import { useQuery } from "@tanstack/react-query";
import { layerLinesQuery } from "#src/features/toolpaths/queries.ts";
import { Loaded } from "#src/ui/states.tsx";

/** The G-code of one layer as it stands in the file, with its line numbers. */
export function LayerLines({ readingId, layer }: { readingId: string; layer: number }) {
  const query = useQuery(layerLinesQuery(readingId, layer));
  return (
    <Loaded query={query} what="Fetching lines">
      {({ firstLine, text, truncated }) => {
        const lines = text.replace(/\r\n?/g, "\n").replace(/\n$/, "").split("\n");
        const numbers = lines.map((_, line) => firstLine + line).join("\n");
        return (
          <>
            <section
              aria-label={`Lines of layer ${layer}`}
              // biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls must be reachable from the keyboard
              tabIndex={0}
              className="max-h-96 overflow-auto border border-hair bg-sheet"
            >
              <div className="flex w-max min-w-full font-mono text-small">
                <pre
                  aria-hidden
                  className="sticky left-0 border-r border-hair bg-sheet px-3 py-2 text-right text-soft select-none"
                >
                  {numbers}
                </pre>
                <pre className="px-3 py-2">{lines.join("\n")}</pre>
              </div>
            </section>
            {truncated && <p className="mt-2 text-small text-soft">The layer is longer; this is its beginning.</p>}
          </>
        );
      }}
    </Loaded>
  );
}
