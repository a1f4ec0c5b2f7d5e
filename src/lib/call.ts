import {
  type BodyInput,
  type Endpoint,
  type ParamsOf,
  pathOf,
  type QueryInput,
  type ReplyOutput,
} from "#shared/contract/endpoint.ts";
import { noAnswer, type ProblemError, problemFrom } from "#src/lib/problem.ts";
import { waitForSignIn } from "#src/lib/sign-in-gate.ts";

type Part<Name extends string, Value> = [Value] extends [undefined]
  ? { [N in Name]?: undefined }
  : undefined extends Value
    ? { [N in Name]?: Value }
    : { [N in Name]: Value };
type ParamsPart<E> = keyof ParamsOf<E> extends never ? { params?: undefined } : { params: ParamsOf<E> };
type QueryPart<E> =
  Record<never, never> extends QueryInput<E> ? { query?: QueryInput<E> } : Part<"query", QueryInput<E>>;
export type CallOptions<E> = ParamsPart<E> & Part<"body", BodyInput<E>> & QueryPart<E> & { signal?: AbortSignal };
type OptionalWhenEmpty<T> = Record<never, never> extends T ? [options?: T] : [options: T];

interface LooseOptions {
  params?: Record<string, string | number>;
  body?: unknown;
  query?: Record<string, unknown>;
  signal?: AbortSignal;
}

/**
 * Sends one request of the contract.
 *
 * @throws ProblemError with what the server said, or that it did not answer
 */
export async function call<E extends Endpoint>(
  spec: E,
  ...rest: OptionalWhenEmpty<CallOptions<E>>
): Promise<ReplyOutput<E>> {
  const options = (rest[0] ?? {}) as LooseOptions;
  const response = await send(spec, options);
  if (response.status === 401 && spec.allows !== "anyone" && (await waitForSignIn()))
    return reply(spec, await send(spec, options));
  return reply(spec, response);
}

/** The same, but a request that is turned away as signed out fails at once. */
export async function callOnce<E extends Endpoint>(
  spec: E,
  ...rest: OptionalWhenEmpty<CallOptions<E>>
): Promise<ReplyOutput<E>> {
  return reply(spec, await send(spec, (rest[0] ?? {}) as LooseOptions));
}

async function reply<E extends Endpoint>(spec: E, response: Response): Promise<ReplyOutput<E>> {
  if (!response.ok) throw await problemOf(response);
  if (spec.reply === "nothing" || response.status === 204) return undefined as ReplyOutput<E>;
  return (await response.json()) as ReplyOutput<E>;
}

/** Where a request of the contract goes; for links and downloads, which the browser fetches itself. */
export function urlOf<E extends Endpoint>(spec: E, params: ParamsOf<E>, query?: Record<string, unknown>): string {
  const search = new URLSearchParams();
  for (const [name, value] of Object.entries(query ?? {})) if (value !== undefined) search.set(name, String(value));
  const text = search.toString();
  return pathOf(spec.path, params as never) + (text === "" ? "" : `?${text}`);
}

async function send(spec: Endpoint, { params, body, query, signal }: LooseOptions): Promise<Response> {
  try {
    return await fetch(urlOf(spec, (params ?? {}) as never, query), {
      method: spec.method,
      signal,
      headers: { accept: "application/json", ...(body === undefined ? {} : { "content-type": "application/json" }) },
      body: body === undefined ? undefined : JSON.stringify(body),
    });
  } catch (error) {
    if (signal?.aborted) throw error;
    throw noAnswer();
  }
}

async function problemOf(response: Response): Promise<ProblemError> {
  return problemFrom(response.status, await response.text().catch(() => ""));
}
