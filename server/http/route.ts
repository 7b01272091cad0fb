import type { Request, Response } from "express";
import type { z } from "zod";
import type { Role } from "../../shared/roles.ts";
import type { Tx } from "../db/with-tx.ts";
import type { Services } from "../services.ts";

/** The acting person of a request inside an investigation. */
export interface Actor {
  accountId: string;
  role: Role;
  investigationId: string;
  nonce: string;
}

/** Settings of the acting investigation that handlers need with nearly every answer. */
export interface Input<P, Q, B> {
  params: P;
  query: Q;
  body: B;
}

/** What a handler gets: one transaction as the acting role's login, and the parsed input. */
export interface RunContext<P, Q, B> extends Input<P, Q, B> {
  tx: Tx;
  actor: Actor;
  services: Services;
  requestId: string;
  file: { buffer: Buffer; name: string } | undefined;
  /** Work to start once the transaction is committed; it does not happen when it is not. */
  afterCommit(work: () => void): void;
}

type Shape = z.ZodType;
type Out<T extends Shape | undefined> = T extends Shape ? z.output<T> : undefined;

/** Everything a route declares; the manifest, the OpenAPI document and the tests are made from it. */
export interface RouteSpec<
  P extends Shape | undefined = Shape | undefined,
  Q extends Shape | undefined = Shape | undefined,
  B extends Shape | undefined = Shape | undefined,
> {
  method: "get" | "post" | "patch" | "put" | "delete";
  path: string;
  summary: string;
  /** Acting roles that ever have this route; others get 403. */
  policy: readonly Role[];
  params?: P;
  query?: Q;
  body?: B;
  /** A multipart upload with one part `file`. */
  upload?: boolean;
  /** Parsed on the way out; a function when it depends on the acting role. */
  output: Shape | ((role: Role) => Shape);
  status?: 200 | 201 | 202 | 204;
  /** Creates need an Idempotency-Key and answer with a receipt of ids and versions. */
  creates?: boolean;
  isolation?: "committed" | "repeatable" | "serializable";
  /** Asks for a password given within the last minutes (403 `confirm_needed`). */
  confirmed?: boolean;
  /** Answers with a file: `run` gives a `FileAnswer`, and `output` is `fileAnswer`. */
  sendsFile?: boolean;
  run(context: RunContext<Out<P>, Out<Q>, Out<B>>): Promise<unknown>;
}

/** A route with its types erased, as the manifest holds it. */
export type AnyRoute = Omit<RouteSpec, "run"> & {
  run(context: RunContext<never, never, never>): Promise<unknown>;
};

/**
 * Declares a route of an investigation (`/api/investigations/:id/…`). Parse, load, authorise, run
 * and present happen in `run`; the kit around it has checked session, role and scope.
 */
export function defineRoute<
  P extends Shape | undefined = undefined,
  Q extends Shape | undefined = undefined,
  B extends Shape | undefined = undefined,
>(spec: RouteSpec<P, Q, B>): AnyRoute {
  if (!spec.policy || !spec.output) {
    throw new Error(`${spec.method} ${spec.path} has no policy or no output`);
  }
  return spec as unknown as AnyRoute;
}

/**
 * A route outside any investigation (sign-in, session, list of investigations) or one that streams.
 * `access` says who may come: anyone, the signed-in, or acting roles.
 */
export interface PlainRoute {
  method: "get" | "post" | "patch" | "delete";
  path: string;
  summary: string;
  access: "public" | "signedIn" | readonly Role[];
  params?: Shape;
  query?: Shape;
  body?: Shape;
  output: Shape;
  status?: 200 | 201 | 202 | 204;
  creates?: boolean;
  handle(request: Request, response: Response, services: Services): Promise<unknown>;
}

/** Declares a plain route; what it returns is parsed by `output` and sent, undefined sends nothing. */
export function definePlainRoute(spec: PlainRoute): PlainRoute {
  if (!spec.access || !spec.output) {
    throw new Error(`${spec.method} ${spec.path} has no access rule or no output`);
  }
  return spec;
}
