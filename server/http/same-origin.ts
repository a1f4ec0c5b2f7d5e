import type { RequestHandler } from "express";
import { AppError } from "#server/http/app-error.ts";

const READING = new Set(["GET", "HEAD", "OPTIONS"]);

/**
 * Lets writes through only from pages of this server. Browsers say where a request comes from; a program that is no
 * browser says nothing, and carries no cookie that somebody else could make it send.
 */
export const sameOriginWrites: RequestHandler = (request, _response, next) => {
  if (READING.has(request.method)) return next();
  const site = request.get("Sec-Fetch-Site");
  const origin = request.get("Origin");
  const fromHere = site === undefined ? origin === undefined || hostOf(origin) === request.host : isHere(site);
  if (fromHere) return next();
  throw new AppError("cross-site", "This request was sent by a page of another site.", {
    remedy: "Open Quenchline itself and do it there.",
  });
};

const isHere = (site: string): boolean => site === "same-origin" || site === "none";

function hostOf(origin: string): string | undefined {
  return URL.canParse(origin) ? new URL(origin).host : undefined;
}
