import { queryOptions } from "@tanstack/react-query";
import { type Acknowledgement, acknowledge, getAcknowledgement } from "#shared/contract/machines.ts";
import { call } from "#src/lib/call.ts";

/** What the person who asks has ticked for this version of the machine. */
export const acknowledgementQuery = (id: string, number: number) =>
  queryOptions({
    queryKey: ["acknowledgements", id, number],
    queryFn: ({ signal }) => call(getAcknowledgement, { params: { id, number }, signal }),
  });

export const giveAcknowledgement = (id: string, number: number, checklist: string[]): Promise<Acknowledgement> =>
  call(acknowledge, { params: { id, number }, body: { checklist } });
