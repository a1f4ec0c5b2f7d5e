import type { z } from "zod";
import type { Permission } from "#shared/contract/roles.ts";

export type Method = "GET" | "POST" | "PUT" | "DELETE";

/** A number from 1 stands behind `:number` and `:index`; every other name in a path is the uuid of a row. */
export type NumberParam = "number" | "index";

type ParamNames<Path extends string> = Path extends `${string}:${infer Rest}`
  ? Rest extends `${infer Name}/${infer Tail}`
    ? Name | ParamNames<`/${Tail}`>
    : Rest extends `${infer Name}.${string}`
      ? Name
      : Rest
  : never;

/** `"/api/machines/:id/versions/:number"` -> `{ id: string; number: number }` */
export type PathParams<Path extends string> = {
  [Name in ParamNames<Path>]: Name extends NumberParam ? number : string;
};

/** `file`: a multipart form with one field `file`, streamed. */
export type BodySpec = z.ZodType | "file" | undefined;
/** `nothing`: 204. `stream`: bytes or events that the handler writes itself. */
export type ReplySpec = z.ZodType | "nothing" | "stream";

export interface Endpoint<
  M extends Method = Method,
  Path extends string = string,
  Body extends BodySpec = BodySpec,
  Query extends z.ZodType | undefined = z.ZodType | undefined,
  Reply extends ReplySpec = ReplySpec,
> {
  method: M;
  path: Path;
  /** permission that the caller's role must hold; `anyone`: also signed out */
  allows: Permission | "anyone";
  body?: Body;
  query?: Query;
  reply: Reply;
  /** of a successful reply; 200 unless stated */
  status?: 200 | 201 | 202;
}

/** One request that client and server agree on. The client calls it with `call`, the server answers it with `mount`. */
export function endpoint<
  const M extends Method,
  const Path extends `/api/${string}`,
  Reply extends ReplySpec,
  Body extends BodySpec = undefined,
  Query extends z.ZodType | undefined = undefined,
>(spec: Endpoint<M, Path, Body, Query, Reply>): Endpoint<M, Path, Body, Query, Reply> {
  return spec;
}

type In<Spec> = Spec extends z.ZodType ? z.input<Spec> : undefined;
type Out<Spec> = Spec extends z.ZodType ? z.output<Spec> : undefined;

/** What the client sends … */
export type BodyInput<E> = E extends Endpoint<Method, string, infer Body> ? In<Body> : never;
export type QueryInput<E> = E extends Endpoint<Method, string, BodySpec, infer Query> ? In<Query> : never;
/** … and what the server's handler is given: checked, defaults filled in. */
export type BodyOutput<E> = E extends Endpoint<Method, string, infer Body> ? Out<Body> : never;
export type QueryOutput<E> = E extends Endpoint<Method, string, BodySpec, infer Query> ? Out<Query> : never;
/** What a handler returns, and what the client receives. */
export type ReplyInput<E> =
  E extends Endpoint<Method, string, BodySpec, z.ZodType | undefined, infer Reply> ? In<Reply> : never;
export type ReplyOutput<E> =
  E extends Endpoint<Method, string, BodySpec, z.ZodType | undefined, infer Reply> ? Out<Reply> : never;
export type ParamsOf<E> = E extends Endpoint<Method, infer Path> ? PathParams<Path> : never;

/** `"/api/machines/:id"` with `{ id }` filled in. */
export function pathOf<Path extends string>(path: Path, params: PathParams<Path>): string {
  const values = params as Record<string, string | number>;
  return path.replace(/:([A-Za-z]+)/g, (_, name: string) => encodeURIComponent(String(values[name])));
}
