import { Router } from "express";
import { mount } from "#server/http/mount.ts";
import * as acknowledgements from "#server/machines/acknowledgements.ts";
import { machines } from "#server/machines/service.ts";
import type { Parts } from "#server/parts.ts";
import {
  acknowledge,
  createMachine,
  createMachineVersion,
  getAcknowledgement,
  getMachine,
  getMachineVersion,
  listMachines,
} from "#shared/contract/machines.ts";

export function machineRoutes({ db }: Pick<Parts, "db">): Router {
  const router = Router();
  mount(router, listMachines, ({ actor }) => machines.list(db, actor.teamId));
  mount(router, createMachine, ({ actor, body }) => machines.create(db, actor, body));
  mount(router, getMachine, ({ actor, params }) => machines.history(db, actor.teamId, params.id));
  mount(router, getMachineVersion, ({ actor, params }) => machines.version(db, actor.teamId, params.id, params.number));
  mount(router, createMachineVersion, ({ actor, params, body }) => machines.createVersion(db, actor, params.id, body));
  mount(router, getAcknowledgement, ({ actor, params }) => acknowledgements.get(db, actor, params.id, params.number));
  mount(router, acknowledge, ({ actor, params, body }) =>
    acknowledgements.give(db, actor, params.id, params.number, body.checklist),
  );
  return router;
}
