import { isUtf8 } from "node:buffer";
import { randomUUID } from "node:crypto";
import type { NextFunction, Request, RequestHandler, Response } from "express";
import helmet from "helmet";
import type { Services } from "../services.ts";
import { HttpProblem } from "./problem.ts";

const SAFE = new Set(["GET", "HEAD", "OPTIONS"]);

/** Gives each request an id; it stands in every problem and log line. */
export function requestId(_request: Request, response: Response, next: NextFunction): void {
  response.locals.requestId = randomUUID();
  response.setHeader("X-Request-Id", response.locals.requestId);
  next();
}

/** Headers of every answer: strict content-security policy, nothing cached, nothing framed. */
export function headers(env: Services["env"]): RequestHandler[] {
  const policy = {
    "default-src": ["'none'"],
    "script-src": ["'self'"],
    "style-src": ["'self'"],
    "img-src": ["'self'", "blob:"],
    "font-src": ["'self'"],
    "connect-src": ["'self'"],
    "form-action": ["'self'"],
    "base-uri": ["'none'"],
    "frame-ancestors": ["'none'"],
    "object-src": ["'none'"],
    "worker-src": ["'self'"],
    "manifest-src": ["'self'"],
    "require-trusted-types-for": ["'script'"],
    "trusted-types": ["strandline"],
  };
  return [
    helmet({
      // Vite's own client needs inline scripts and styles; it only ever runs in development.
      contentSecurityPolicy: env.dev ? false : { useDefaults: false, directives: policy },
      strictTransportSecurity: env.secureCookie,
      crossOriginEmbedderPolicy: false,
      crossOriginOpenerPolicy: { policy: "same-origin" },
      crossOriginResourcePolicy: { policy: "same-origin" },
      referrerPolicy: { policy: "no-referrer" },
    }),
    (request, response, next) => {
      if (request.path.startsWith("/api/")) response.setHeader("Cache-Control", "no-store");
      next();
    },
  ];
}

/** Origins that count as this server: the public one, or the loopback names of the bound port. */
function ownOrigin(request: Request, env: Services["env"]): (origin: string) => boolean {
  if (env.publicUrl) {
    const expected = new URL(env.publicUrl).origin;
    return (origin) => origin === expected;
  }
  const port = request.socket.localPort;
  return (origin) => {
    if (!URL.canParse(origin)) return false;
    const url = new URL(origin);
    return (
      url.origin === origin &&
      url.protocol === "http:" &&
      ["localhost", "127.0.0.1", "[::1]"].includes(url.hostname) &&
      Number(url.port || 80) === port
    );
  };
}

/**
 * One gate against forged requests: whatever may change something must name this server as its
 * origin; a browser's own Sec-Fetch-Site, where sent, must agree.
 */
export function originGate(env: Services["env"]): RequestHandler {
  return (request, _response, next) => {
    if (SAFE.has(request.method)) return next();
    const origin = request.get("origin");
    const site = request.get("sec-fetch-site");
    if (!origin || !ownOrigin(request, env)(origin) || (site && site !== "same-origin")) {
      throw new HttpProblem("origin_refused");
    }
    next();
  };
}

/** How deep a body may be nested; the deepest of ours, a draft's rows, needs six. */
const MOST_DEPTH = 32;

/**
 * Bytes that are no UTF-8 would be kept as replacement characters, another name than was sent; they
 * are refused before they are read.
 */
export function readableBytes(_request: unknown, _response: unknown, bytes: Buffer): void {
  if (!isUtf8(bytes)) throw new HttpProblem("malformed_request");
}

/** Refuses a body nested deeper than any form of ours: what writes it out again is recursive. */
export function shallowBody(request: Request, _response: Response, next: NextFunction): void {
  let level: unknown[] = [request.body];
  for (let depth = 0; level.length > 0; depth++) {
    if (depth > MOST_DEPTH) throw new HttpProblem("malformed_request");
    level = level.flatMap((value) =>
      value !== null && typeof value === "object" ? Object.values(value) : [],
    );
  }
  next();
}

/** Bodies are JSON, except one upload. */
export function jsonOnly(request: Request, _response: Response, next: NextFunction): void {
  if (SAFE.has(request.method)) {
    next();
    return;
  }
  const length = Number(request.get("content-length") ?? 0);
  const hasBody = length > 0 || request.get("transfer-encoding") !== undefined;
  const type = (request.get("content-type") ?? "").split(";")[0]?.trim().toLowerCase();
  if (hasBody && type !== "application/json" && type !== "multipart/form-data") {
    throw new HttpProblem("json_required");
  }
  next();
}

/**
 * The session cookie ends with the browser, and on the server when it is due: the date that the
 * session's own library writes into it is taken out. A cookie being cleared keeps its date.
 */
export function cookieWithoutEnd(_request: Request, response: Response, next: NextFunction): void {
  const setHeader = response.setHeader.bind(response);
  const undated = (cookie: string) =>
    /^[^=;]+=;/.test(cookie) ? cookie : cookie.replace(/; Expires=[^;]*/i, "");
  response.setHeader = (name, value) => {
    if (name.toLowerCase() !== "set-cookie" || typeof value === "number") {
      return setHeader(name, value);
    }
    return setHeader(name, typeof value === "string" ? undated(value) : value.map(undated));
  };
  next();
}
