import type { Problem } from "#shared/formats/problems.ts";

interface Props {
  problems: readonly Problem[];
  /** shows the zone in which a problem lies */
  onSelect(zone: number): void;
}

/** All problems with their places; those of a zone lead to it. Each also stands at its field. */
export function ProblemList({ problems, onSelect }: Props) {
  return (
    <div role="status" className="min-w-0 text-small">
      {problems.length === 0 ? (
        <p className="text-soft">Nothing to correct.</p>
      ) : (
        <details>
          <summary className="font-semibold">
            {problems.length === 1 ? "1 place to correct" : `${problems.length} places to correct`}
          </summary>
          <ul className="mt-1 flex flex-col gap-1">
            {problems.map(({ path, message }) => {
              const zone = /^zones\[(\d+)\]/.exec(path)?.[1];
              const place = <code className="font-mono">{path || "the document"}</code>;
              return (
                <li key={path + message}>
                  {zone === undefined ? (
                    place
                  ) : (
                    <button
                      type="button"
                      className="underline decoration-rule underline-offset-4"
                      onClick={() => onSelect(Number(zone))}
                    >
                      {place}
                    </button>
                  )}{" "}
                  {message}
                </li>
              );
            })}
          </ul>
        </details>
      )}
    </div>
  );
}
