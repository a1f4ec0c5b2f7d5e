import type { Request, RequestHandler, Response, Router } from "express";
import type { Actor } from "#server/http/actor.ts";
import { AppError } from "#server/http/app-error.ts";
import { checkParams, checkPart } from "#server/http/check-request.ts";
import { readJson } from "#server/http/read-json.ts";
import type { BodyOutput, Endpoint, Method, ParamsOf, QueryOutput, ReplyInput } from "#shared/contract/endpoint.ts";
import { may, type Permission, rolesThatMay } from "#shared/contract/roles.ts";

/** What a handler is given. An endpoint that `anyone` may call has no actor. */
export interface Call<E extends Endpoint> {
  actor: E["allows"] extends "anyone" ? Actor | undefined : Actor;
  params: ParamsOf<E>;
  body: BodyOutput<E>;
  query: QueryOutput<E>;
  request: Request;
  response: Response;
}

export type Handler<E extends Endpoint> = (
  call: Call<E>,
) => E["reply"] extends "nothing" | "stream" ? Promise<void> | void : Promise<ReplyInput<E>> | ReplyInput<E>;

/** Endpoints that a router answers, for the tests that go through all of them. */
const mounted = new WeakMap<Router, Endpoint[]>();
export const mountedOn = (router: Router): readonly Endpoint[] => mounted.get(router) ?? [];

/**
 * Answers an endpoint: who calls and whether they may, then path, body and query, then the handler, then its reply.
 * A reply that doesn't keep to the contract is a fault of ours and never leaves the server.
 */
export function mount<E extends Endpoint>(router: Router, endpoint: E, handler: Handler<E>): void {
  const answer: RequestHandler = async (request, response) => {
    const { actor } = request;
    if (endpoint.allows !== "anyone") checkPermission(actor, endpoint.allows);
    const params = checkParams(request.params);
    const query = endpoint.query && checkPart(endpoint.query, "query", request.query);
    const body =
      typeof endpoint.body === "object" && checkPart(endpoint.body, "body", await readJson(request, response));
    const call = { actor, params, query, body: body === false ? undefined : body, request, response };
    const reply = await handler(call as unknown as Call<E>);
    if (typeof endpoint.reply === "object") send(response, endpoint, endpoint.reply.parse(reply));
    else if (endpoint.reply === "nothing") response.status(204).end();
  };
  const verb = endpoint.method.toLowerCase() as Lowercase<Method>;
  router[verb](endpoint.path, answer);
  mounted.set(router, [...mountedOn(router), endpoint]);
}

function checkPermission(actor: Actor | undefined, permission: Permission): void {
  if (actor === undefined) throw new AppError("signed-out", "You are not signed in, or the session has ended.");
  if (may(actor.role, permission)) return;
  const roles = rolesThatMay(permission);
  const who = roles.length === 1 ? roles[0] : `${roles.slice(0, -1).join(", ")} or ${roles.at(-1)}`;
  throw new AppError("forbidden", `Your role, ${actor.role}, does not include this.`, {
    remedy: `Ask somebody with the role ${who}.`,
  });
}

function send(response: Response, { status }: Endpoint, reply: unknown): void {
  response
    .status(status ?? 200)
    .set("Cache-Control", "no-store")
    .json(reply);
}
