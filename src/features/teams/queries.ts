import { queryOptions } from "@tanstack/react-query";
import { addMember, listMembers, type Member, type NewMember } from "#shared/contract/members.ts";
import { call } from "#src/lib/call.ts";

export const membersQuery = queryOptions({
  queryKey: ["members"],
  queryFn: ({ signal }) => call(listMembers, { signal }),
});

export const takeIn = (member: NewMember): Promise<Member> => call(addMember, { body: member });
