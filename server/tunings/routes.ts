import { Router } from "express";
import { mount } from "#server/http/mount.ts";
import { sendStored } from "#server/http/send-stored.ts";
import type { Parts } from "#server/parts.ts";
import { layerDiff } from "#server/tunings/layer-diff.ts";
import * as service from "#server/tunings/service.ts";
import {
  createTuning,
  downloadTunedFile,
  getLayerDiff,
  getTuning,
  getTuningChanges,
  getTuningPlan,
  getTuningProof,
  listTunings,
} from "#shared/contract/tunings.ts";

const JSON_TYPE = "application/json";

export function tuningRoutes({ db, workshop }: Pick<Parts, "db" | "workshop">): Router {
  const router = Router();
  const { storage } = workshop.shelf;
  mount(router, createTuning, ({ actor, body }) => service.create(db, workshop, actor, body));
  mount(router, listTunings, ({ actor }) => service.list(db, actor));
  mount(router, getTuning, ({ actor, params }) => service.get(db, actor, params.id));
  // Stored as they are sent: checking them again would keep every other request waiting.
  mount(router, { ...getTuningPlan, reply: "stream" }, async ({ actor, params, request, response }) => {
    const { files } = await service.doneTuning(db, actor.teamId, params.id);
    await sendStored(request, response, storage, { sha256: files.planSha256, type: JSON_TYPE });
  });
  mount(router, { ...getTuningProof, reply: "stream" }, async ({ actor, params, request, response }) => {
    const { files } = await service.doneTuning(db, actor.teamId, params.id);
    await sendStored(request, response, storage, { sha256: files.proofSha256, type: JSON_TYPE });
  });
  mount(router, { ...getTuningChanges, reply: "stream" }, async ({ actor, params, request, response }) => {
    const { files } = await service.doneTuning(db, actor.teamId, params.id);
    await sendStored(request, response, storage, { sha256: files.changesSha256, type: JSON_TYPE });
  });
  mount(router, getLayerDiff, async ({ actor, params }) =>
    layerDiff(storage, await service.doneTuning(db, actor.teamId, params.id), params.index),
  );
  mount(router, downloadTunedFile, async ({ actor, params, request, response }) => {
    const { sha256, fileName } = await service.downloadable(db, actor, params.id);
    await sendStored(request, response, storage, { sha256, type: "text/x-gcode", fileName });
  });
  return router;
}
