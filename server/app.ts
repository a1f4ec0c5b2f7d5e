import express, { type Express } from "express";
import { apiRouters } from "#server/api.ts";
import { findWhoCalls } from "#server/auth/find-who-calls.ts";
import { SessionCookie } from "#server/auth/session-cookie.ts";
import { AppError } from "#server/http/app-error.ts";
import { clientFiles } from "#server/http/client-files.ts";
import { logRequests } from "#server/http/logging.ts";
import { answerProblems } from "#server/http/problems.ts";
import { sameOriginWrites } from "#server/http/same-origin.ts";
import { securityHeaders } from "#server/http/security-headers.ts";
import type { Parts } from "#server/parts.ts";

/** The whole application as a function of its parts; nothing listens yet. */
export function buildApp(parts: Parts): Express {
  const { env, log, sessionSecret, clientFolder } = parts;
  const cookie = new SessionCookie(sessionSecret);
  const app = express();
  app.disable("x-powered-by");
  app.set("trust proxy", env.TRUST_PROXY);
  app.set("query parser", "simple");
  app.use(logRequests(log), securityHeaders());
  app.use("/api", sameOriginWrites, findWhoCalls(parts, cookie));
  for (const router of apiRouters(parts, cookie)) app.use(router);
  app.use("/api", ({ method, originalUrl }) => {
    throw new AppError("not-found", `There is nothing at ${method} ${originalUrl.split("?")[0]}.`);
  });
  app.use(clientFiles(clientFolder));
  app.use(answerProblems(log));
  return app;
}
