import { availableParallelism } from "node:os";
import { resolve } from "node:path";
import { z } from "zod";

const whole = (min: number, max: number) => {
  const error = `must be a whole number from ${min} to ${max}`;
  return z.coerce.number({ error }).int({ error }).min(min, { error }).max(max, { error });
};
const yesNo = z.enum(["yes", "no"], { error: "must be yes or no" }).transform((word) => word === "yes");

/** Every variable the server knows, each with a default that works. An empty variable counts as not set. */
const Variables = z.object({
  /** address to listen on; other computers reach the server only with 0.0.0.0, or through a proxy on this one */
  HOST: z.string().default("127.0.0.1"),
  /** 0: any free one */
  PORT: whole(0, 65_535).default(8080),
  /** folder of the database, the uploaded and tuned files, and the secrets made at the first start */
  DATA_DIR: z.string().default("data"),
  LOG_LEVEL: z
    .enum(["trace", "debug", "info", "warn", "error", "silent"], {
      error: "must be trace, debug, info, warn, error or silent",
    })
    .default("info"),
  /** signs the session cookies; left out: made once and kept in DATA_DIR */
  SESSION_SECRET: z.string().min(32, { error: "must have at least 32 characters" }).optional(),
  /** a session that is not used ends after this many hours */
  SESSION_IDLE_HOURS: whole(1, 24 * 365).default(24),
  /** and after this many days in any case */
  SESSION_MAX_DAYS: whole(1, 365).default(30),
  /** failed sign-ins allowed from one address in fifteen minutes */
  SIGN_IN_ATTEMPTS: whole(1, 1_000_000).default(20),
  /** proxies in front of the server whose X-Forwarded headers are believed */
  TRUST_PROXY: whole(0, 10).default(0),
  /** largest upload, counted after unpacking */
  MAX_UPLOAD_MB: whole(1, 100_000).default(2_048),
  /** toolpaths read and tuned at the same time */
  WORKERS: whole(1, 64).default(Math.max(1, Math.min(4, availableParallelism() - 1))),
  /** yes: an empty database gets the demo team with its documents and toolpaths */
  SEED_DEMO: yesNo.default(true),
  /** password of the demo accounts; left out: made once and kept in DATA_DIR */
  DEMO_PASSWORD: z.string().min(10, { error: "must have at least 10 characters" }).optional(),
});

export type Env = Readonly<z.output<typeof Variables>>;

/** Variables of the environment that the server can't use. The message names all of them. */
export class BadEnvironment extends Error {
  override readonly name = "BadEnvironment";
}

/**
 * The environment, checked. DATA_DIR is made absolute.
 *
 * @throws BadEnvironment naming every variable that can't be used
 */
export function readEnv(variables: Record<string, string | undefined>): Env {
  const set = Object.fromEntries(Object.entries(variables).filter(([, value]) => value !== undefined && value !== ""));
  const result = Variables.safeParse(set);
  if (result.success) return { ...result.data, DATA_DIR: resolve(result.data.DATA_DIR) };
  const lines = new Map<string, string>();
  for (const { path, message } of result.error.issues) {
    const name = String(path[0]);
    if (!lines.has(name)) lines.set(name, `${name} ${message}`);
  }
  throw new BadEnvironment(`These environment variables can't be used:\n${[...lines.values()].join("\n")}`);
}
