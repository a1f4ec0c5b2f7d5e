import { z } from "zod";
import { DocumentHistory, DocumentSummary, draftOf, nextDraftOf, versionOf } from "#shared/contract/documents.ts";
import { endpoint } from "#shared/contract/endpoint.ts";
import { Polymer } from "#shared/formats/polymer.ts";

export const PolymerVersion = versionOf(Polymer);
export type PolymerVersion = z.infer<typeof PolymerVersion>;

export const listPolymers = endpoint({
  method: "GET",
  path: "/api/polymers",
  allows: "read",
  reply: z.array(DocumentSummary),
});

export const createPolymer = endpoint({
  method: "POST",
  path: "/api/polymers",
  allows: "edit",
  body: draftOf(Polymer),
  reply: PolymerVersion,
  status: 201,
});

export const getPolymer = endpoint({
  method: "GET",
  path: "/api/polymers/:id",
  allows: "read",
  reply: DocumentHistory,
});

export const getPolymerVersion = endpoint({
  method: "GET",
  path: "/api/polymers/:id/versions/:number",
  allows: "read",
  reply: PolymerVersion,
});

export const createPolymerVersion = endpoint({
  method: "POST",
  path: "/api/polymers/:id/versions",
  allows: "edit",
  body: nextDraftOf(Polymer),
  reply: PolymerVersion,
  status: 201,
});
