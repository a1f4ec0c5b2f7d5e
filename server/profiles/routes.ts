import { Router } from "express";
import { mount } from "#server/http/mount.ts";
import type { Parts } from "#server/parts.ts";
import { profiles } from "#server/profiles/service.ts";
import {
  approveProfileVersion,
  createProfile,
  createProfileVersion,
  getProfile,
  getProfileVersion,
  listProfiles,
} from "#shared/contract/profiles.ts";

export function profileRoutes({ db }: Pick<Parts, "db">): Router {
  const router = Router();
  mount(router, listProfiles, ({ actor }) => profiles.list(db, actor.teamId));
  mount(router, createProfile, ({ actor, body }) => profiles.create(db, actor, body));
  mount(router, getProfile, ({ actor, params }) => profiles.history(db, actor.teamId, params.id));
  mount(router, getProfileVersion, ({ actor, params }) => profiles.version(db, actor.teamId, params.id, params.number));
  mount(router, createProfileVersion, ({ actor, params, body }) => profiles.createVersion(db, actor, params.id, body));
  mount(router, approveProfileVersion, ({ actor, params }) => profiles.approve(db, actor, params.id, params.number));
  return router;
}
