import { existsSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import express, { type Express, type NextFunction, type Request, type Response } from "express";
import session from "express-session";
import expressStaticGzip from "express-static-gzip";
import { IDLE_MINUTES } from "../shared/roles.ts";
import {
  cookieWithoutEnd,
  headers,
  jsonOnly,
  originGate,
  readableBytes,
  requestId,
  shallowBody,
} from "./http/guards.ts";
import { lateCookies } from "./http/late-cookie.ts";
import { mount } from "./http/mount.ts";
import { openApiDocument } from "./http/openapi.ts";
import { HttpProblem, problemBody } from "./http/problem.ts";
import { SessionStore } from "./http/session-store.ts";
import { whoIsAsking } from "./http/sign-in.ts";
import { safeError, translateError } from "./http/translate-error.ts";
import { plainRoutes, ROUTES } from "./routes.ts";
import type { Services } from "./services.ts";

const CLIENT = fileURLToPath(new URL("../dist/client/", import.meta.url));

/** One line a request: template, status and time; no address, body or header ever. */
function logged(services: Services) {
  return (request: Request, response: Response, next: NextFunction) => {
    const started = performance.now();
    response.on("finish", () => {
      if (!request.path.startsWith("/api/")) return;
      services.log.info({
        method: request.method,
        route: response.locals.route ?? "none",
        status: response.statusCode,
        ms: Math.round(performance.now() - started),
        requestId: response.locals.requestId,
        accountId: response.locals.who?.accountId,
      });
    });
    next();
  };
}

/** The session of API requests; background requests neither extend it nor set its cookie anew. */
function sessions(services: Services) {
  const { secureCookie } = services.env;
  return session({
    name: secureCookie ? "__Host-strandline" : "strandline",
    secret: services.secrets.sessionSecrets,
    store: new SessionStore(services.pools.auth),
    resave: false,
    saveUninitialized: false,
    rolling: true,
    unset: "destroy",
    cookie: {
      httpOnly: true,
      sameSite: "strict",
      secure: secureCookie,
      path: "/",
      maxAge: Math.min(...Object.values(IDLE_MINUTES)) * 60_000,
    },
  });
}

/**
 * Builds the application without listening: health, API, then the client's files. Every API route
 * comes from the manifest; anything unexpected leaves through the one error handler.
 *
 * @param dev Vite's middleware in development, which serves the client instead of the built files
 */
export function createApp(services: Services, dev?: express.Handler): Express {
  const app = express();
  app.disable("x-powered-by");
  app.set("query parser", "simple");
  app.set("trust proxy", services.env.proxyHops || false);
  app.use(requestId, ...headers(services.env), logged(services));

  app.get("/healthz", (_request, response) => {
    response.json({ ok: true });
  });
  app.get("/readyz", async (_request, response) => {
    const started = performance.now();
    const database = await services.pools.auth
      .query("select 1")
      .then(() => performance.now() - started < 1000)
      .catch(() => false);
    const analysis = services.analysis.healthy();
    response
      .status(database && analysis ? 200 : 503)
      .json({ ok: database && analysis, database, analysis });
  });

  const plain = plainRoutes(services);
  const document = openApiDocument(ROUTES, plain);
  app.get("/api/openapi.json", (_request, response) => {
    response.json(document);
  });

  for (const path of ["/healthz", "/readyz", "/api/openapi.json"]) {
    app.route(path).all((_request, response) => {
      response.setHeader("Allow", "GET, HEAD");
      throw new HttpProblem("method_not_allowed");
    });
  }

  app.use("/api", originGate(services.env), jsonOnly);
  const json = { limit: "256kb", inflate: false, strict: true, verify: readableBytes };
  app.use("/api", express.json(json), shallowBody);
  app.use("/api", cookieWithoutEnd, lateCookies, sessions(services));
  app.use("/api", async (request: Request, response: Response, next: NextFunction) => {
    if (request.get("x-strandline-background") === "1" && request.session) {
      // Live updates are not activity: the store leaves the idle clock of a marked session alone.
      Object.defineProperty(request.session, "background", { value: true, enumerable: false });
    }
    response.locals.who = await whoIsAsking(request, services.pools.auth);
    next();
  });
  mount(app, services, ROUTES, plain);
  app.all("/api/{*rest}", () => {
    throw new HttpProblem("not_found");
  });

  if (dev) app.use(dev);
  else serveClient(app);
  app.use(errorHandler(services));
  return app;
}

function serveClient(app: Express): void {
  app.use(
    // The files were compressed when they were built; answers of the API never are, since an answer
    // that mixes secrets with what somebody typed is better left as it is.
    expressStaticGzip(CLIENT, {
      index: false,
      enableBrotli: true,
      orderPreference: ["br", "gz"],
      serveStatic: {
        setHeaders(response, path) {
          const hashed = path.includes(`${join("client", "assets")}`);
          response.setHeader(
            "Cache-Control",
            hashed ? "public, max-age=31536000, immutable" : "no-cache",
          );
        },
      },
    }),
  );
  app.get("/{*path}", (request, response) => {
    // A missing file is not the application's shell.
    if (/\.[a-z0-9]{2,5}$/i.test(request.path) || !existsSync(join(CLIENT, "index.html"))) {
      throw new HttpProblem("not_found");
    }
    response.setHeader("Cache-Control", "no-cache");
    response.sendFile(join(CLIENT, "index.html"));
  });
}

function errorHandler(services: Services) {
  return (error: unknown, request: Request, response: Response, next: NextFunction) => {
    if (response.headersSent) {
      next(error);
      return;
    }
    const { problem, alarm } = translateError(error);
    const body = problemBody(problem, response.locals.requestId);
    if (alarm) {
      services.log.error({
        alarm: problem.code,
        route: response.locals.route ?? "none",
        method: request.method,
        requestId: response.locals.requestId,
        error: safeError(error),
      });
    }
    if (problem.retryAfter) response.setHeader("Retry-After", String(problem.retryAfter));
    response.status(body.status).type("application/problem+json").send(JSON.stringify(body));
  };
}
