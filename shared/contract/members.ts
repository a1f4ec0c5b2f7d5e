import { z } from "zod";
import { Email, Id, Instant } from "#shared/contract/common.ts";
import { endpoint } from "#shared/contract/endpoint.ts";
import { Role } from "#shared/contract/roles.ts";
import { Label } from "#shared/formats/fields.ts";

export const Member = z.object({
  id: Id,
  email: z.string(),
  name: z.string().optional(),
  role: Role,
  createdAt: Instant,
});
export type Member = z.infer<typeof Member>;

export const MIN_PASSWORD_LENGTH = 10;

/** The lead sets a first password and tells it to the new member. */
export const NewMember = z.object({
  email: Email,
  name: Label.optional(),
  role: Role,
  password: z
    .string()
    .min(MIN_PASSWORD_LENGTH, { error: `is shorter than ${MIN_PASSWORD_LENGTH} characters. Lengthen it` })
    .max(256, { error: "is longer than 256 characters. Shorten it" }),
});
export type NewMember = z.input<typeof NewMember>;

export const listMembers = endpoint({
  method: "GET",
  path: "/api/members",
  allows: "read",
  reply: z.array(Member),
});

/** 409 `email-taken` */
export const addMember = endpoint({
  method: "POST",
  path: "/api/members",
  allows: "manage-members",
  body: NewMember,
  reply: Member,
  status: 201,
});
