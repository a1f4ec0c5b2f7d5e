import { Router } from "express";
import { mount } from "#server/http/mount.ts";
import type { Parts } from "#server/parts.ts";
import * as service from "#server/teams/service.ts";
import { addMember, listMembers } from "#shared/contract/members.ts";

export function memberRoutes({ db }: Pick<Parts, "db">): Router {
  const router = Router();
  mount(router, listMembers, ({ actor }) => service.listMembers(db, actor.teamId));
  mount(router, addMember, ({ actor, body }) => service.addMember(db, actor.teamId, body));
  return router;
}
