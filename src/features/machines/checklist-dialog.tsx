import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { type FormEvent, useState } from "react";
import { SAFETY_CHECKLIST } from "#shared/contract/safety-checklist.ts";
import { acknowledgementQuery, giveAcknowledgement } from "#src/features/machines/queries.ts";
import { asProblem } from "#src/lib/problem.ts";
import { Button } from "#src/ui/button.tsx";
import { Actions, Dialog } from "#src/ui/dialog.tsx";
import { CheckField } from "#src/ui/field.tsx";
import { ProblemNotice } from "#src/ui/notice.tsx";
import { Loaded } from "#src/ui/states.tsx";

interface Props {
  machine: { id: string; version: number; name: string };
  /** what the button says: what happens once it is pressed */
  action?: string;
  onAcknowledged(): void;
  onClose(): void;
}

/** Before the first download for a machine: each item ticked by the person who answers for it. */
export function ChecklistDialog({ machine, action, onAcknowledged, onClose }: Props) {
  const query = useQuery(acknowledgementQuery(machine.id, machine.version));
  return (
    <Dialog title={`Before the lamp of ${machine.name} is lit`} wide onClose={onClose}>
      <Loaded query={query} what="Looking for what you ticked before">
        {({ checklist }) => <Checklist {...{ machine, action, onAcknowledged, onClose }} before={checklist} />}
      </Loaded>
    </Dialog>
  );
}

function Checklist({
  machine,
  action = "I have made sure",
  before,
  onAcknowledged,
  onClose,
}: Props & { before: string[] }) {
  const client = useQueryClient();
  const [ticked, setTicked] = useState<readonly string[]>(before);
  const missing = SAFETY_CHECKLIST.filter(({ id }) => !ticked.includes(id)).length;
  const give = useMutation({
    mutationFn: () => giveAcknowledgement(machine.id, machine.version, [...ticked]),
    onSuccess: async (given) => {
      client.setQueryData(acknowledgementQuery(machine.id, machine.version).queryKey, given);
      await client.invalidateQueries({ queryKey: ["tunings"] });
      onAcknowledged();
    },
  });
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (missing === 0) give.mutate();
  };
  return (
    <form onSubmit={submit}>
      <p className="pb-3 font-semibold">
        A lamp has no protection of its own: lamp, nozzle and bed burn and can start fires, and when a print ends early
        no line of the file runs.
      </p>
      <fieldset>
        <legend className="pb-1">Tick what you have made sure of, for version {machine.version} of the machine.</legend>
        {SAFETY_CHECKLIST.map(({ id, text }) => (
          <CheckField
            key={id}
            label={text}
            checked={ticked.includes(id)}
            onChange={({ target }) => setTicked(target.checked ? [...ticked, id] : ticked.filter((one) => one !== id))}
          />
        ))}
      </fieldset>
      {give.error && <ProblemNotice problem={asProblem(give.error)} />}
      <div className="sticky bottom-0 -mx-5 border-t border-rule bg-paper px-5 pb-4">
        <Actions>
          <Button weight="main" type="submit" disabled={missing > 0 || give.isPending}>
            {action}
          </Button>
          <Button onClick={onClose}>Not now</Button>
          <p role="status" className="text-small text-soft">
            {missing > 0 ? `${missing} still to tick. What you can't tick, settle first.` : ""}
          </p>
        </Actions>
      </div>
    </form>
  );
}
