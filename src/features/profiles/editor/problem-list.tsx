import type { Problem } from "#shared/formats/problems.ts";
import type { Profile } from "#shared/formats/profile.ts";
import { placeOf, placeText } from "#src/lib/place.ts";

interface Props {
  /** names the places */
  profile: Profile;
  problems: readonly Problem[];
  /** shows the zone in which a problem lies */
  onSelect(zone: number): void;
}

/** One cause may show in many places: a channel that the machine lacks, in every zone. */
export function causesOf(problems: readonly Problem[]): { message: string; paths: string[] }[] {
  const causes = new Map<string, string[]>();
  for (const { path, message } of problems) causes.set(message, [...(causes.get(message) ?? []), path]);
  return [...causes].map(([message, paths]) => ({ message, paths }));
}

/** All problems with their places; those of a zone lead to it. Each also stands at its field. */
export function ProblemList({ profile, problems, onSelect }: Props) {
  const causes = causesOf(problems);
  return (
    <div role="status" className="min-w-0 text-small">
      {causes.length === 0 ? (
        <p className="text-soft">Nothing to correct.</p>
      ) : (
        <details>
          <summary className="font-semibold">
            {causes.length === 1 ? "1 thing to correct" : `${causes.length} things to correct`}
          </summary>
          <ul className="mt-1 flex flex-col gap-1">
            {causes.map(({ message, paths }) => (
              <li key={message}>
                {paths.map((path, i) => (
                  <span key={path}>
                    {i > 0 && "; "}
                    <PlaceLink profile={profile} path={path} onSelect={onSelect} />
                  </span>
                ))}
                {": "}
                {message}
              </li>
            ))}
          </ul>
        </details>
      )}
    </div>
  );
}

function PlaceLink({ profile, path, onSelect }: Pick<Props, "profile" | "onSelect"> & { path: string }) {
  const zone = /^zones\[(\d+)\]/.exec(path)?.[1];
  const place = <span className="font-semibold">{placeText(placeOf(path, profile))}</span>;
  if (zone === undefined) return place;
  return (
    <button
      type="button"
      className="underline decoration-rule underline-offset-4 hover:decoration-ink"
      onClick={() => onSelect(Number(zone))}
    >
      {place}
    </button>
  );
}
