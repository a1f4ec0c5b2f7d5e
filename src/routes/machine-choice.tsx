import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { useNavigate, useSearchParams } from "react-router-dom";
import type { Reading } from "#shared/contract/toolpaths.ts";
import { paths } from "#src/app/paths.ts";
import { documentsQuery, MACHINES } from "#src/features/documents/kinds.ts";
import { readAgain } from "#src/features/toolpaths/queries.ts";
import { asProblem } from "#src/lib/problem.ts";
import { SelectField } from "#src/ui/field.tsx";
import { ProblemNotice } from "#src/ui/notice.tsx";

/** Layer times depend on the machine: another one means another reading. */
export function MachineChoice({ reading }: { reading: Reading }) {
  const client = useQueryClient();
  const navigate = useNavigate();
  const [search] = useSearchParams();
  const machines = useQuery(documentsQuery(MACHINES));
  const change = useMutation({
    mutationFn: (machineId: string) =>
      readAgain(reading.toolpathId, machineId, machines.data?.find(({ id }) => id === machineId)?.latest.number ?? 1),
    onSuccess: ({ id }) => {
      client.invalidateQueries({ queryKey: ["toolpaths"] });
      navigate(`${paths.tune(id)}?${search}`, { replace: true });
    },
  });
  const latest = machines.data?.find(({ id }) => id === reading.machineId)?.latest.number;
  return (
    <div>
      <SelectField
        label="Machine"
        value={reading.machineId}
        disabled={change.isPending}
        hint={
          latest !== undefined && latest > reading.machineVersion
            ? `Read with version ${reading.machineVersion}; ${latest} is the latest.`
            : `Read with version ${reading.machineVersion}.`
        }
        onChange={({ target }) => change.mutate(target.value)}
      >
        {(machines.data ?? [{ id: reading.machineId, name: reading.machineName }]).map(({ id, name }) => (
          <option key={id} value={id}>
            {name}
          </option>
        ))}
      </SelectField>
      {change.error && <ProblemNotice problem={asProblem(change.error)} />}
    </div>
  );
}
