import { z } from "zod";
import {
  DocumentHistory,
  DocumentSummary,
  draftOf,
  nextDraftOf,
  VersionHead,
  versionOf,
} from "#shared/contract/documents.ts";
import { endpoint } from "#shared/contract/endpoint.ts";
import { Profile } from "#shared/formats/profile.ts";

export const ProfileVersion = versionOf(Profile);
export type ProfileVersion = z.infer<typeof ProfileVersion>;

export const listProfiles = endpoint({
  method: "GET",
  path: "/api/profiles",
  allows: "read",
  reply: z.array(DocumentSummary),
});

export const createProfile = endpoint({
  method: "POST",
  path: "/api/profiles",
  allows: "edit",
  body: draftOf(Profile),
  reply: ProfileVersion,
  status: 201,
});

export const getProfile = endpoint({
  method: "GET",
  path: "/api/profiles/:id",
  allows: "read",
  reply: DocumentHistory,
});

export const getProfileVersion = endpoint({
  method: "GET",
  path: "/api/profiles/:id/versions/:number",
  allows: "read",
  reply: ProfileVersion,
});

export const createProfileVersion = endpoint({
  method: "POST",
  path: "/api/profiles/:id/versions",
  allows: "edit",
  body: nextDraftOf(Profile),
  reply: ProfileVersion,
  status: 201,
});

/** Approves a version for parts that ship. It stays approved; approving it again changes nothing. */
export const approveProfileVersion = endpoint({
  method: "POST",
  path: "/api/profiles/:id/versions/:number/approval",
  allows: "approve",
  reply: VersionHead,
});
