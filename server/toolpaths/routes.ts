import { Router } from "express";
import { mount } from "#server/http/mount.ts";
import { sendStored } from "#server/http/send-stored.ts";
import { machines } from "#server/machines/service.ts";
import type { Parts } from "#server/parts.ts";
import { layerLines } from "#server/toolpaths/layer-lines.ts";
import * as service from "#server/toolpaths/service.ts";
import { receiveUpload } from "#server/toolpaths/upload.ts";
import {
  createReading,
  deleteToolpath,
  getLayerLines,
  getLayersCsv,
  getReading,
  getReadingDocument,
  getToolpath,
  listToolpaths,
  uploadToolpath,
} from "#shared/contract/toolpaths.ts";

const MEGABYTE = 2 ** 20;

export function toolpathRoutes({ db, env, workshop }: Pick<Parts, "db" | "env" | "workshop">): Router {
  const router = Router();
  const { storage } = workshop.shelf;
  const maxBytes = env.MAX_UPLOAD_MB * MEGABYTE;
  mount(router, uploadToolpath, async ({ actor, query, request, response }) => {
    const machine = await machines.stored(db, actor.teamId, query.machine);
    const options = { storage, machine: machine.document, maxBytes };
    const uploaded = await receiveUpload(request, response, options);
    return service.store(db, workshop, actor, machine, uploaded);
  });
  mount(router, listToolpaths, ({ actor }) => service.list(db, actor.teamId));
  mount(router, getToolpath, ({ actor, params }) => service.get(db, actor.teamId, params.id));
  mount(router, deleteToolpath, ({ actor, params }) => service.remove(db, workshop, actor.teamId, params.id));
  mount(router, createReading, ({ actor, params, body }) => service.readAgain(db, workshop, actor, params.id, body));
  mount(router, getReading, ({ actor, params }) => service.getReading(db, actor.teamId, params.id));
  // Stored as they are sent: checking them again would keep every other request waiting.
  mount(router, { ...getReadingDocument, reply: "stream" }, async ({ actor, params, request, response }) => {
    const { files } = await service.doneReading(db, actor.teamId, params.id);
    await sendStored(request, response, storage, { sha256: files.documentSha256, type: "application/json" });
  });
  mount(router, getLayersCsv, async ({ actor, params, request, response }) => {
    const { files, toolpath } = await service.doneReading(db, actor.teamId, params.id);
    const fileName = `${toolpath.name.replace(/\.[^.]+$/, "")}.layers.csv`;
    const sent = { sha256: files.tableSha256, type: "text/csv; charset=utf-8; header=present", fileName };
    await sendStored(request, response, storage, sent);
  });
  mount(router, getLayerLines, async ({ actor, params, query }) =>
    layerLines(storage, await service.doneReading(db, actor.teamId, params.id), query.layer),
  );
  return router;
}
