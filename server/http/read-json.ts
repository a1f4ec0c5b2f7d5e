import express, { type Request, type Response } from "express";
import { AppError } from "#server/http/app-error.ts";

/** The largest documents are some hundred kilobytes. */
const parser = express.json({ limit: "4mb", strict: false });

/**
 * The body of a request as JSON. It is read only once the caller is known to be allowed to send it.
 *
 * @throws AppError `wrong-media-type`; errors of the parser, which http/problems.ts knows
 */
export async function readJson(request: Request, response: Response): Promise<unknown> {
  if (!request.is("application/json")) {
    throw new AppError("wrong-media-type", "The body of this request must be JSON, sent as application/json.");
  }
  await new Promise<void>((resolve, reject) => {
    parser(request, response, (error?: unknown) => (error === undefined ? resolve() : reject(error)));
  });
  return request.body;
}
