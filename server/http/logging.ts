import type { RequestHandler } from "express";
import { destination, type Logger, pino } from "pino";
import { pinoHttp } from "pino-http";

/** What opens a session never reaches a log. */
const SECRETS = [
  "req.headers.cookie",
  "req.headers.authorization",
  'res.headers["set-cookie"]',
  "req.headers.referer",
  "*.password",
];

/** One JSON object a line on standard error; standard output is for people. */
export function makeLog(level: string, to: { write(line: string): void } = destination(2)): Logger {
  return pino({ level, redact: { paths: SECRETS, censor: "[redacted]" } }, to);
}

/** One line for every request that has ended. */
export function logRequests(log: Logger): RequestHandler {
  return pinoHttp({
    logger: log,
    genReqId: () => crypto.randomUUID(),
    customLogLevel: (_request, response, error) => {
      if (error || response.statusCode >= 500) return "error";
      return response.statusCode >= 400 ? "info" : "debug";
    },
  });
}
