import { Router } from "express";
import { holds } from "#server/auth/service.ts";
import { mount } from "#server/http/mount.ts";
import { EventStream } from "#server/jobs/event-stream.ts";
import * as service from "#server/jobs/service.ts";
import type { Parts } from "#server/parts.ts";
import { cancelJob, events, getJob } from "#shared/contract/jobs.ts";

/** A client that never heard anything is told what happened a little before it came. */
const LOOK_BACK_MS = 10_000;
/** Changes that were being written when the client last heard something. */
const OVERLAP_MS = 2_000;

export function jobRoutes({ db, env, closing, workshop }: Pick<Parts, "db" | "env" | "closing" | "workshop">): Router {
  const router = Router();
  mount(router, getJob, ({ actor, params }) => service.get(db, workshop, actor.teamId, params.id));
  mount(router, cancelJob, ({ actor, params }) => service.cancel(db, workshop, actor.teamId, params.id));
  mount(router, events, async ({ actor, request, response }) => {
    const since = heardUntil(request.get("Last-Event-ID"));
    const stream = new EventStream(response);
    const stop = workshop.events.listen(actor.teamId, (job) => stream.job(job));
    try {
      // Listening has begun already, so nothing falls between; a job told twice does no harm.
      for (const job of await service.recent(db, workshop, actor.teamId, since)) stream.job(job);
      await stream.last(closing, () => holds(db, actor.sessionId, env));
    } finally {
      stop();
    }
  });
  return router;
}

/** Ids of events are moments of this server, in milliseconds. */
function heardUntil(lastEventId: string | undefined): Date {
  const now = Date.now();
  const heard = /^\d{1,15}$/.test(lastEventId ?? "") ? Number(lastEventId) : now - LOOK_BACK_MS;
  return new Date(Math.min(heard, now) - OVERLAP_MS);
}
