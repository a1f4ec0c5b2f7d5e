import { existsSync } from "node:fs";
import { join } from "node:path";
import express, { type Request, type Response, Router } from "express";
import { notFound } from "#server/http/app-error.ts";

const YEAR_S = 31_536_000;

/**
 * The built client. Its pages have paths of their own, which all answer with the one document; a missing file is missing.
 *
 * @param folder where the build stands
 */
export function clientFiles(folder: string): Router {
  const router = Router();
  const page = join(folder, "index.html");
  router.use(
    express.static(folder, {
      index: false,
      redirect: false,
      setHeaders: (response, path) => {
        // Built assets are named after their contents.
        const lasting = path.startsWith(join(folder, "assets"));
        response.set("Cache-Control", lasting ? `public, max-age=${YEAR_S}, immutable` : "no-cache");
      },
    }),
  );
  router.get("/{*path}", (request, response) => {
    if (isFile(request)) throw notFound("file");
    sendPage(response, page);
  });
  return router;
}

const isFile = ({ path }: Request): boolean => /\.[a-z0-9]+$/i.test(path) || path.startsWith("/assets/");

function sendPage(response: Response, page: string): void {
  response.set("Cache-Control", "no-cache");
  if (existsSync(page)) response.sendFile(page);
  else response.status(503).type("text").send("The client is not built yet. Run: npm run build\n");
}
