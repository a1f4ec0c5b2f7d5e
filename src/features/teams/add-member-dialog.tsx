import { useMutation, useQueryClient } from "@tanstack/react-query";
import { type FormEvent, useState } from "react";
import { MIN_PASSWORD_LENGTH, type NewMember } from "#shared/contract/members.ts";
import { Role } from "#shared/contract/roles.ts";
import { ROLE_TEXTS } from "#src/features/teams/member-table.tsx";
import { membersQuery, takeIn } from "#src/features/teams/queries.ts";
import { asProblem } from "#src/lib/problem.ts";
import { Button } from "#src/ui/button.tsx";
import { Actions, Dialog } from "#src/ui/dialog.tsx";
import { SelectField, TextField } from "#src/ui/field.tsx";
import { ProblemNotice } from "#src/ui/notice.tsx";

export function AddMemberDialog({ onClose }: { onClose(): void }) {
  const client = useQueryClient();
  const [member, setMember] = useState<NewMember>({ email: "", role: "operator", password: "" });
  const add = useMutation({
    mutationFn: () => takeIn(member),
    onSuccess: () => {
      client.invalidateQueries({ queryKey: membersQuery.queryKey });
      onClose();
    },
  });
  const problem = add.error ? asProblem(add.error) : undefined;
  const errorOf = (field: string) => {
    const message = problem?.errors?.find(({ path }) => path === field || path.endsWith(`.${field}`))?.message;
    return message && `This ${message}.`;
  };
  const named = problem?.errors?.some(({ path }) => /(^|\.)(email|password)$/.test(path));
  const submit = (event: FormEvent) => {
    event.preventDefault();
    add.mutate();
  };
  return (
    <Dialog title="Add a member" onClose={onClose}>
      <form onSubmit={submit} className="flex flex-col gap-4">
        <TextField
          label="E-mail"
          type="email"
          autoComplete="off"
          required
          error={errorOf("email")}
          value={member.email}
          onChange={({ target }) => setMember({ ...member, email: target.value })}
        />
        <SelectField
          label="Role"
          hint={ROLE_TEXTS[member.role]}
          value={member.role}
          onChange={({ target }) => setMember({ ...member, role: Role.parse(target.value) })}
        >
          {Role.options.map((role) => (
            <option key={role}>{role}</option>
          ))}
        </SelectField>
        <TextField
          label="First password"
          hint={`At least ${MIN_PASSWORD_LENGTH} characters. Tell it to the new member.`}
          type="text"
          autoComplete="new-password"
          spellCheck={false}
          required
          minLength={MIN_PASSWORD_LENGTH}
          error={errorOf("password")}
          value={member.password}
          onChange={({ target }) => setMember({ ...member, password: target.value })}
        />
        {problem && !named && <ProblemNotice problem={problem} />}
        <Actions>
          <Button weight="main" type="submit" disabled={add.isPending}>
            Add
          </Button>
          <Button onClick={onClose}>Cancel</Button>
        </Actions>
      </form>
    </Dialog>
  );
}
