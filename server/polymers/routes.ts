import { Router } from "express";
import { mount } from "#server/http/mount.ts";
import type { Parts } from "#server/parts.ts";
import { polymers } from "#server/polymers/service.ts";
import {
  createPolymer,
  createPolymerVersion,
  getPolymer,
  getPolymerVersion,
  listPolymers,
} from "#shared/contract/polymers.ts";

export function polymerRoutes({ db }: Pick<Parts, "db">): Router {
  const router = Router();
  mount(router, listPolymers, ({ actor }) => polymers.list(db, actor.teamId));
  mount(router, createPolymer, ({ actor, body }) => polymers.create(db, actor, body));
  mount(router, getPolymer, ({ actor, params }) => polymers.history(db, actor.teamId, params.id));
  mount(router, getPolymerVersion, ({ actor, params }) => polymers.version(db, actor.teamId, params.id, params.number));
  mount(router, createPolymerVersion, ({ actor, params, body }) => polymers.createVersion(db, actor, params.id, body));
  return router;
}
