import { createHash } from "node:crypto";
import { sql } from "drizzle-orm";
import type { Express, NextFunction, Request, Response } from "express";
import multer from "multer";
import { z } from "zod";
import { LIMITS } from "../../shared/contracts/common.ts";
import type { Role } from "../../shared/roles.ts";
import { type Tx, withTx } from "../db/with-tx.ts";
import type { Services } from "../services.ts";
import { fileAnswer, sendFile } from "./file-answer.ts";
import { HttpProblem } from "./problem.ts";
import type { Actor, AnyRoute, PlainRoute } from "./route.ts";
import { isConfirmed, type SignedIn, signedInOf } from "./sign-in.ts";
import { sqlState } from "./translate-error.ts";

const uuid = z.uuid();
const upload = multer({
  storage: multer.memoryStorage(),
  limits: {
    files: 1,
    fields: 6,
    parts: 8,
    fileSize: LIMITS.fileBytes,
    fieldNameSize: 64,
    // A choice of column for each of 256 columns fits.
    fieldSize: 8192,
  },
});

/** Parses with a contract; an absent one takes nothing. */
function parse(schema: z.ZodType | undefined, value: unknown): unknown {
  return schema ? schema.parse(value) : undefined;
}

/** Path parameters: an id that is not one is simply not found. */
function parseParams(schema: z.ZodType | undefined, request: Request): Record<string, string> {
  for (const [name, value] of Object.entries(request.params)) {
    if (/id$/i.test(name) && !uuid.safeParse(value).success) throw new HttpProblem("not_found");
  }
  const parsed = schema?.safeParse(request.params);
  if (parsed && !parsed.success) throw new HttpProblem("not_found");
  return request.params as Record<string, string>;
}

function requireRole(who: SignedIn, allowed: readonly Role[]): Role {
  if (!who.actingRole || !allowed.includes(who.actingRole)) throw new HttpProblem("role_refused");
  return who.actingRole;
}

function actorOf(who: SignedIn, role: Role, investigationId: string): Actor {
  // Another investigation than the acting one is out of scope, whether it exists or not.
  if (who.investigationId !== investigationId || !who.nonce) throw new HttpProblem("not_found");
  return { accountId: who.accountId, role, investigationId, nonce: who.nonce };
}

function idempotencyKey(request: Request): string {
  const key = uuid.safeParse(request.get("idempotency-key"));
  if (!key.success) throw new HttpProblem("idempotency_key_required");
  return key.data;
}

function requestHash(request: Request): string {
  const hash = createHash("sha256").update(request.originalUrl);
  hash.update(JSON.stringify(request.body ?? null));
  if (request.file) hash.update(request.file.buffer);
  return hash.digest("base64url");
}

/** Claims the key inside the transaction; a request answered before gives its receipt. */
async function claimKey(tx: Tx, key: string, route: string, hash: string): Promise<unknown | null> {
  const found = await tx.execute<{ request_hash: string; status: number; receipt: unknown }>(
    sql`select * from auth.claim_key(${key}::uuid, ${route}, ${hash})`,
  );
  const earlier = found.rows[0];
  if (!earlier) return null;
  if (earlier.request_hash !== hash) throw new HttpProblem("key_reused");
  if (earlier.status === 0) throw new HttpProblem("in_flight", { retryAfter: 1 });
  return earlier.receipt;
}

const RETRIED = new Set(["40001", "40P01"]);

/** True for a failure that another try of the whole transaction can mend. */
function mayPass(error: unknown): boolean {
  const state = sqlState(error) ?? "";
  if (RETRIED.has(state)) return true;
  // A random study number was taken already: the next try draws another.
  const cause = (error as { cause?: { constraint?: string } }).cause;
  return state === "23505" && cause?.constraint === "person_study_number";
}

/** Repeats a transaction that lost against another one, a few times with a growing pause. */
async function retried<T>(work: () => Promise<T>): Promise<T> {
  for (let attempt = 1; ; attempt++) {
    try {
      return await work();
    } catch (error) {
      if (attempt >= 3 || !mayPass(error)) throw error;
      await new Promise((resolve) => setTimeout(resolve, attempt * 20 * (1 + Math.random())));
    }
  }
}

async function runRoute(route: AnyRoute, request: Request, response: Response, services: Services) {
  const who = signedInOf(request);
  const role = requireRole(who, route.policy);
  const params = parseParams(route.params, request);
  const actor = actorOf(who, role, params.id as string);
  if (route.confirmed && !isConfirmed(who)) throw new HttpProblem("confirm_needed");
  const key = route.creates ? idempotencyKey(request) : null;
  const query = parse(route.query, request.query);
  const body = parse(route.body, request.body);
  const context = { pool: services.pools[role], nonce: actor.nonce };
  const hash = key ? requestHash(request) : "";
  let afterwards: (() => void)[] = [];
  const value = await retried(() =>
    withTx(
      context,
      async (tx) => {
        afterwards = [];
        const earlier = key ? await claimKey(tx, key, `${route.method} ${route.path}`, hash) : null;
        if (earlier) return earlier;
        const file = request.file && {
          buffer: request.file.buffer,
          name: request.file.originalname,
        };
        const input = {
          tx,
          actor,
          services,
          params,
          query,
          body,
          file,
          requestId: response.locals.requestId,
          afterCommit: (work: () => void) => afterwards.push(work),
        };
        const made = await route.run(input as never);
        if (key) {
          await tx.execute(
            sql`select auth.keep_receipt(${key}::uuid, ${route.status ?? 201}::smallint, ${JSON.stringify(made)}::jsonb)`,
          );
        }
        return made;
      },
      route.isolation,
    ),
  );
  for (const work of afterwards) work();
  const schema = typeof route.output === "function" ? route.output(role) : route.output;
  if (route.sendsFile) {
    await sendFile(request, response, fileAnswer.parse(value), services.log);
    return;
  }
  respond(response, route.status ?? (route.creates ? 201 : 200), schema, value);
}

/** The only way out: the answer is parsed by its contract, so an unlisted key cannot leave. */
function respond(response: Response, status: number, schema: z.ZodType, value: unknown): void {
  if (status === 204) {
    response.status(204).end();
    return;
  }
  const checked = schema.safeParse(value);
  if (!checked.success) {
    const where = checked.error.issues.map((issue) => `${issue.path.join(".")} ${issue.code}`);
    throw new Error(`answer does not fit its contract: ${where.slice(0, 8).join("; ")}`);
  }
  response.status(status).json(checked.data);
}

async function runPlain(
  route: PlainRoute,
  request: Request,
  response: Response,
  services: Services,
) {
  if (route.access !== "public") {
    const who = signedInOf(request);
    if (route.access !== "signedIn") {
      const role = requireRole(who, route.access);
      const params = parseParams(route.params, request);
      if (params.id) actorOf(who, role, params.id);
    }
  }
  if (route.creates) idempotencyKey(request);
  response.locals.query = parse(route.query, request.query);
  response.locals.body = parse(route.body, request.body);
  const value = await route.handle(request, response, services);
  if (value === undefined && route.status !== 204) return;
  respond(response, route.status ?? 200, route.output, value);
}

type Handler = (request: Request, response: Response) => Promise<void>;

/**
 * Mounts every route of the manifest and, for each path, an answer of 405 to the methods it does
 * not declare.
 */
export function mount(
  app: Express,
  services: Services,
  routes: readonly AnyRoute[],
  plain: readonly PlainRoute[],
): void {
  const byPath = new Map<string, [string, Handler, boolean, string][]>();
  const add = (method: string, path: string, handler: Handler, multipart: boolean) => {
    byPath.set(path, [...(byPath.get(path) ?? []), [method, handler, multipart, path]]);
  };
  for (const route of plain) {
    add(route.method, route.path, (q, r) => runPlain(route, q, r, services), false);
  }
  for (const route of routes) {
    add(route.method, route.path, (q, r) => runRoute(route, q, r, services), route.upload === true);
  }
  // Fixed segments come before parameters, whatever the order of features.
  const rank = (path: string) => path.replaceAll(":", "~");
  const paths = [...byPath.keys()].sort((a, b) => (rank(a) < rank(b) ? -1 : 1));
  for (const path of paths) {
    const at = app.route(path);
    const methods: string[] = [];
    for (const [method, handler, multipart] of byPath.get(path) ?? []) {
      methods.push(method.toUpperCase());
      const verb = method as "get";
      const template = (_q: Request, r: Response, next: NextFunction) => {
        r.locals.route = path;
        next();
      };
      if (multipart) at[verb](template, guardUpload, readUpload, handler);
      else at[verb](template, refuseUpload, handler);
    }
    if (methods.includes("GET")) methods.push("HEAD");
    at.all((_request, response) => {
      response.setHeader("Allow", methods.join(", "));
      throw new HttpProblem("method_not_allowed");
    });
  }
}

const oneFile = upload.single("file");

/** Reads an upload. What breaks off or has no boundary is the sender's fault, not ours. */
function readUpload(request: Request, response: Response, next: NextFunction): void {
  oneFile(request, response, (error: unknown) => {
    const known = error instanceof multer.MulterError || error instanceof HttpProblem;
    next(error && !known ? new HttpProblem("malformed_request") : error);
  });
}

/** One route takes files; the others read JSON only, whatever the name of the form. */
function refuseUpload(request: Request, _response: Response, next: NextFunction): void {
  if (request.is("multipart/form-data")) throw new HttpProblem("json_required");
  next();
}

/** Nobody's upload is read into memory before it is known who sends it. */
function guardUpload(request: Request, _response: Response, next: NextFunction): void {
  signedInOf(request);
  next();
}
