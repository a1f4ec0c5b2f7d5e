import { z } from "zod";
import { Instant } from "#shared/contract/common.ts";
import { DocumentHistory, DocumentSummary, draftOf, nextDraftOf, versionOf } from "#shared/contract/documents.ts";
import { endpoint } from "#shared/contract/endpoint.ts";
import { Machine } from "#shared/formats/machine.ts";

export const MachineVersion = versionOf(Machine);
export type MachineVersion = z.infer<typeof MachineVersion>;

export const listMachines = endpoint({
  method: "GET",
  path: "/api/machines",
  allows: "read",
  reply: z.array(DocumentSummary),
});

export const createMachine = endpoint({
  method: "POST",
  path: "/api/machines",
  allows: "edit",
  body: draftOf(Machine),
  reply: MachineVersion,
  status: 201,
});

export const getMachine = endpoint({
  method: "GET",
  path: "/api/machines/:id",
  allows: "read",
  reply: DocumentHistory,
});

export const getMachineVersion = endpoint({
  method: "GET",
  path: "/api/machines/:id/versions/:number",
  allows: "read",
  reply: MachineVersion,
});

export const createMachineVersion = endpoint({
  method: "POST",
  path: "/api/machines/:id/versions",
  allows: "edit",
  body: nextDraftOf(Machine),
  reply: MachineVersion,
  status: 201,
});

/** One person's acknowledgement of the cautions for one version of a machine; nothing ticked and no time until given. */
export const Acknowledgement = z.object({ checklist: z.array(z.string()), at: Instant.nullable() });
export type Acknowledgement = z.infer<typeof Acknowledgement>;

export const getAcknowledgement = endpoint({
  method: "GET",
  path: "/api/machines/:id/versions/:number/acknowledgement",
  allows: "read",
  reply: Acknowledgement,
});

/** Ids of the ticked items of `SAFETY_CHECKLIST`. 422 `checklist-incomplete` names what is missing. */
export const acknowledge = endpoint({
  method: "PUT",
  path: "/api/machines/:id/versions/:number/acknowledgement",
  allows: "operate",
  body: z.strictObject({ checklist: z.array(z.string().max(60)).max(60) }),
  reply: Acknowledgement,
});
