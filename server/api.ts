import type { Router } from "express";
import { sessionRoutes } from "#server/auth/routes.ts";
import type { SessionCookie } from "#server/auth/session-cookie.ts";
import { jobRoutes } from "#server/jobs/routes.ts";
import { machineRoutes } from "#server/machines/routes.ts";
import type { Parts } from "#server/parts.ts";
import { polymerRoutes } from "#server/polymers/routes.ts";
import { profileRoutes } from "#server/profiles/routes.ts";
import { memberRoutes } from "#server/teams/routes.ts";
import { toolpathRoutes } from "#server/toolpaths/routes.ts";
import { tuningRoutes } from "#server/tunings/routes.ts";

/** Everything below /api. */
export function apiRouters(parts: Parts, cookie: SessionCookie): Router[] {
  return [
    sessionRoutes(parts, cookie),
    memberRoutes(parts),
    machineRoutes(parts),
    polymerRoutes(parts),
    profileRoutes(parts),
    toolpathRoutes(parts),
    tuningRoutes(parts),
    jobRoutes(parts),
  ];
}
