import type { ProfileEditing } from "#src/features/profiles/editor/use-profile-editing.ts";
import { withChannel } from "#src/features/profiles/editor/zone-edits.ts";
import { Button } from "#src/ui/button.tsx";

interface Props {
  editing: ProfileEditing;
  mayEdit: boolean;
}

/** Why a profile can't be written for the machine at hand, and the way out that lies nearest. */
export function Unfit({ editing, mayEdit }: Props) {
  const { profile, machine, channels, problems } = editing;
  if (problems.all.length === 0) return null;
  const strange = channels.filter(({ channel }) => channel === undefined);
  if (!machine || strange.length === 0) {
    return (
      <p className="text-small font-semibold">
        {`Can't be written: the profile has ${problems.all.length === 1 ? "1 place" : `${problems.all.length} places`} to correct.`}
      </p>
    );
  }
  return (
    <>
      <p className="text-small font-semibold">
        {`Can't be written: ${machine.name} has no channel ${strange.map(({ id }) => id).join(", ")}.`}
      </p>
      {mayEdit &&
        strange.map(({ id, side }) => {
          const kind = side === "cooling" ? "fan" : "heater";
          const free = channels.find(({ channel, driven }) => channel?.kind === kind && !driven);
          return (
            free && (
              <Button key={id} onClick={() => editing.edit(withChannel(profile, id, free.id))}>
                {`Use ${free.id} instead of ${id}`}
              </Button>
            )
          );
        })}
    </>
  );
}
