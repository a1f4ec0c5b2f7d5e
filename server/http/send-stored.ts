import { pipeline } from "node:stream/promises";
import type { Request, Response } from "express";
import { errorCode } from "#server/cli/exit.ts";
import type { ByteRange, Storage } from "#server/storage/storage.ts";

export interface SentFile {
  sha256: string;
  type: string;
  /** the name it is saved under; left out: it is shown, not saved */
  fileName?: string;
}

/**
 * Sends stored bytes, or the part of them that is asked for. The digest is the ETag, so a download that broke off goes
 * on only if it is still the same file.
 */
export async function sendStored(
  request: Request,
  response: Response,
  storage: Storage,
  { sha256, type, fileName }: SentFile,
): Promise<void> {
  const etag = `"${sha256}"`;
  response.set({
    ETag: etag,
    "Accept-Ranges": "bytes",
    "Cache-Control": "private, no-cache",
    "Content-Type": type,
    "X-Content-Type-Options": "nosniff",
    ...(fileName === undefined ? {} : { "Content-Disposition": attachment(fileName) }),
  });
  if (matches(request.get("If-None-Match"), etag)) {
    response.status(304).end();
    return;
  }
  const size = await storage.size(sha256);
  const range = wantedRange(request, etag, size);
  if (range === "unsatisfiable") {
    response.status(416).set("Content-Range", `bytes */${size}`).removeHeader("Content-Disposition");
    response.end();
    return;
  }
  if (range) response.status(206).set("Content-Range", `bytes ${range.start}-${range.end}/${size}`);
  response.set("Content-Length", String(range ? range.end - range.start + 1 : size));
  if (request.method === "HEAD") {
    response.end();
    return;
  }
  try {
    await pipeline(await storage.open(sha256, range), response);
  } catch (error) {
    // The client went away; it may come back for the rest.
    if (errorCode(error) !== "ERR_STREAM_PREMATURE_CLOSE") throw error;
  }
}

/** A range this server can't read, or more than one, counts as none: the whole file is a right answer, too. */
function wantedRange(request: Request, etag: string, size: number): ByteRange | "unsatisfiable" | undefined {
  const condition = request.get("If-Range");
  if (condition !== undefined && condition !== etag) return undefined;
  const [, from, to] = /^bytes=\s*(\d{0,15})-(\d{0,15})\s*$/.exec(request.get("Range") ?? "") ?? [];
  if (from === undefined || (from === "" && to === "")) return undefined;
  if (from === "") {
    const length = Math.min(Number(to), size);
    return length === 0 ? "unsatisfiable" : { start: size - length, end: size - 1 };
  }
  const start = Number(from);
  const end = to === "" ? size - 1 : Math.min(Number(to), size - 1);
  if (to !== "" && Number(to) < start) return undefined;
  return start >= size ? "unsatisfiable" : { start, end };
}

function matches(header: string | undefined, etag: string): boolean {
  if (header === undefined) return false;
  return header.trim() === "*" || header.split(",").some((tag) => tag.trim().replace(/^W\//, "") === etag);
}

/** RFC 6266: a plain name for old programs, and the real one. */
function attachment(fileName: string): string {
  const plain = fileName.replace(/[^\x20-\x7e]|["\\%]/g, "_");
  const encoded = encodeURIComponent(fileName).replace(
    /['()*!]/g,
    (c) => `%${c.charCodeAt(0).toString(16).toUpperCase()}`,
  );
  return `attachment; filename="${plain}"; filename*=UTF-8''${encoded}`;
}
