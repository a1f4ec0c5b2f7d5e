import type { ProfileGist } from "#shared/contract/gists.ts";
import type { Zone } from "#shared/formats/profile.ts";
import { STATE_FILLS, STATE_NAMES } from "#src/lib/state-fill.ts";

/** A zone's target, or how it changes within the zone. */
type Target = ProfileGist["zones"][number]["target"];

const PATTERNS = { alternating: "Both by turns", graded: "From one to the other" };

/** A target state, as it looks and by name. */
export function TargetMark({ target }: { target: Target }) {
  const changing = target === "alternating" || target === "graded";
  return (
    <span className="inline-flex items-center gap-2 whitespace-nowrap">
      <span
        aria-hidden
        className="inline-block size-3.5 shrink-0 border border-bone-edge"
        style={STATE_FILLS[changing ? "undecided" : target]}
      />
      {changing ? PATTERNS[target] : STATE_NAMES[target]}
    </span>
  );
}

/** The same as an upright band. */
export function TargetBand({ target }: { target: Zone["target"] }) {
  return (
    <span aria-hidden className="w-5 shrink-0 self-stretch border-r border-bone-edge" style={STATE_FILLS[target]} />
  );
}
