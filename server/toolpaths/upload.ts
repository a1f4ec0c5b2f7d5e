import type { Readable } from "node:stream";
import type { Request, Response } from "express";
import multer, { MulterError, type StorageEngine } from "multer";
import { AppError } from "#server/http/app-error.ts";
import type { Staged, Storage } from "#server/storage/storage.ts";
import { toolpathStream } from "#server/toolpaths/toolpath-stream.ts";
import type { Machine } from "#shared/formats/machine.ts";
import { Refusal } from "#shared/refusal.ts";

export interface Uploaded {
  /** as the browser or hook names it, without folders and `.gz` */
  name: string;
  staged: Staged;
}

export interface UploadOptions {
  storage: Storage;
  /** the file is looked at as this machine would read it */
  machine: Machine;
  maxBytes: number;
}

/**
 * Takes the one file of a multipart form straight into the storage. What is refused, breaks off, or is followed by
 * another file leaves nothing behind.
 *
 * @throws Refusal, AppError `too-large`, `upload-incomplete`, `invalid-request`, `wrong-media-type`
 */
export async function receiveUpload(request: Request, response: Response, options: UploadOptions): Promise<Uploaded> {
  if (!request.is("multipart/form-data"))
    throw new AppError("wrong-media-type", "A toolpath is sent as multipart/form-data, in the field file.");
  const engine = new StagingEngine(options);
  // A packed file is never larger than what it holds by more than a few bytes in every 16 KiB.
  const fileSize = Math.ceil(options.maxBytes * 1.01) + 1024;
  const receive = multer({
    storage: engine,
    limits: { files: 1, fields: 8, fieldSize: 1024, parts: 9, fileSize },
    // Browsers write names as UTF-8.
    defParamCharset: "utf8",
  }).single("file");
  await new Promise<void>((resolve, reject) => {
    receive(request, response, (error: unknown) => (error ? reject(uploadError(error, options)) : resolve()));
  });
  const { file } = request;
  if (file === undefined)
    throw new AppError("invalid-request", "The form holds no file.", { remedy: "Send it in the field file." });
  return { name: plainName(file.originalname), staged: engine.stagedOf(file) };
}

class StagingEngine implements StorageEngine {
  private readonly options: UploadOptions;
  private readonly staged = new Map<string, Staged>();

  constructor(options: UploadOptions) {
    this.options = options;
  }

  /** What was staged for a file; its path is the temporary's name, by which multer knows that there is something. */
  stagedOf({ path }: Pick<Express.Multer.File, "path">): Staged {
    return this.staged.get(path)!;
  }

  _handleFile(
    _request: Request,
    file: Express.Multer.File,
    done: (error?: unknown, info?: Partial<Express.Multer.File>) => void,
  ): void {
    const { storage, machine, maxBytes } = this.options;
    // A refusal leaves the rest of the stream unread; destroying it would look like a connection that broke off.
    const source = (file.stream as Readable).iterator({ destroyOnReturn: false });
    const bytes = toolpathStream(source, file.originalname, machine, maxBytes);
    storage.stage(bytes, `upload-${crypto.randomUUID()}`).then(
      (staged) => {
        this.staged.set(staged.name, staged);
        done(null, { path: staged.name, size: staged.bytes });
      },
      (error: unknown) => done(error),
    );
  }

  _removeFile(_request: Request, { path }: Express.Multer.File, done: (error: Error | null) => void): void {
    const staged = this.staged.get(path);
    const discarded = staged ? this.options.storage.discard(staged) : Promise.resolve();
    discarded.then(() => done(null), done);
  }
}

/** What multer and the parser below it throw, in our terms; a client that goes away is a plain Error there. */
function uploadError(error: unknown, { maxBytes }: UploadOptions): unknown {
  if (error instanceof Refusal) return error.code === "too-large" ? tooLargeError(error.message, error.remedy) : error;
  if (error instanceof MulterError) {
    if (error.code === "LIMIT_FILE_SIZE") {
      const message = `the toolpath is larger than ${maxBytes / 2 ** 20} MiB`;
      return tooLargeError(message, "Check that it is the right file; whoever runs this server can raise the limit.");
    }
    const remedy = "Send one file, in the field file.";
    return new AppError("invalid-request", "The form holds something other than one file.", { remedy });
  }
  if (error instanceof Error && BROKEN_OFF.test(error.message))
    return new AppError("upload-incomplete", "The upload ended before the file did.", { remedy: "Send it again." });
  if (error instanceof Error && MALFORMED.test(error.message))
    return new AppError("invalid-request", "The form can't be read as multipart/form-data.");
  return error;
}

const BROKEN_OFF = /^(Request (aborted|closed|error)|Unexpected end of (form|file)|aborted|Premature close)$/;
const MALFORMED = /^(Malformed (part header|content type)|Multipart: Boundary not found)$/;

const tooLargeError = (message: string, remedy: string): AppError =>
  new AppError("too-large", `${message}.`, { remedy });

/** A name for lists and downloads: no folders, no control characters, no `.gz`, not too long. */
function plainName(original: string): string {
  const last = original.split(/[\\/]/).at(-1) ?? "";
  const plain = last
    .replace(/[\p{Cc}\p{Cf}\p{Cs}\p{Zl}\p{Zp}]/gu, "")
    .trim()
    .replace(/\.gz$/i, "");
  return plain.slice(-200) || "toolpath.gcode";
}
