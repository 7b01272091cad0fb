import { randomBytes, randomUUID } from "node:crypto";
import { createServer, type Server } from "node:http";
import type { AddressInfo } from "node:net";
import type { Express } from "express";
import pino from "pino";
import request from "supertest";
import { inject } from "vitest";
import { type Analysis, createAnalysis } from "../../server/analysis/analysis.ts";
import { createApp } from "../../server/app.ts";
import { createPools, endPools, loginUrl, type Pools } from "../../server/db/pools.ts";
import { startDispatcher } from "../../server/events/dispatcher.ts";
import { createLiveHub } from "../../server/events/live-hub.ts";
import { startCompareUpkeep } from "../../server/features/compare/upkeep.ts";
import { createKeyRing, type KeyRing } from "../../server/identity/keys.ts";
import { startMail } from "../../server/mail/mail.ts";
import type { Services } from "../../server/services.ts";
import { createTestDatabase, TEST_PASSWORDS } from "./database.ts";

/** The real application on a real database of its own, listening on a loopback port. */
export interface TestApp {
  app: Express;
  services: Services;
  pools: Pools;
  keys: KeyRing;
  analysis: Analysis;
  /** Administrator's connection string of this file's database. */
  adminUrl: string;
  origin: string;
  /** Everything the application logged, one JSON line each. */
  logs: string[];
  close: () => Promise<void>;
}

/** Starts the application. Call `close` in afterAll. */
export async function startTestApp(): Promise<TestApp> {
  const database = await createTestDatabase(inject("adminUrl"));
  const logs: string[] = [];
  const log = pino(
    { level: "debug", base: undefined },
    { write: (line: string) => logs.push(line) },
  );
  const pools = createPools(database.adminUrl, TEST_PASSWORDS, () => {});
  const keys = createKeyRing(randomBytes(32));
  const hub = createLiveHub();
  const analysis = createAnalysis({ pools, log });
  await analysis.start();
  const systemUrl = loginUrl(database.adminUrl, "system", TEST_PASSWORDS.system);
  const comparisons = await startCompareUpkeep({ pools, log });
  const dispatcher = await startDispatcher({ pools, systemUrl, analysis, hub, log });
  let origin = "";
  const env = { loopback: true, publicUrl: undefined, smtpUrl: undefined, mailFrom: undefined };
  const mail = await startMail({ env, pools, keys, log, base: () => origin });
  const services: Services = {
    env: {
      demo: true,
      secureCookie: false,
      loopback: true,
      publicUrl: undefined,
      proxyHops: 0,
      dev: false,
    },
    secrets: { sessionSecrets: [randomBytes(32).toString("hex")] },
    pools,
    keys,
    analysis,
    hub,
    mail,
    log,
  };
  const app = createApp(services);
  const server: Server = createServer(app);
  await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve));
  origin = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
  return {
    app,
    services,
    pools,
    keys,
    analysis,
    adminUrl: database.adminUrl,
    origin,
    logs,
    async close() {
      hub.close();
      server.closeAllConnections();
      await new Promise<void>((resolve) => server.close(() => resolve()));
      await comparisons.stop();
      await mail.stop();
      await dispatcher.stop();
      await analysis.stop();
      await endPools(pools);
      await database.drop();
    },
  };
}

type Method = "get" | "post" | "patch" | "put" | "delete" | "head" | "options";
interface CallOptions {
  body?: unknown;
  query?: Record<string, string>;
  /** An Idempotency-Key; `true` makes one. */
  key?: string | true;
  headers?: Record<string, string>;
}

/** A browser's stand-in: keeps its cookie and names its origin. */
export class TestClient {
  readonly #agent: ReturnType<typeof request.agent>;
  readonly #origin: string;

  constructor(app: Pick<TestApp, "origin">) {
    this.#origin = app.origin;
    this.#agent = request.agent(app.origin);
  }

  /** Sends a request; creates need `key`. */
  call(method: Method, path: string, options: CallOptions = {}): request.Test {
    let call = this.#agent[method](path).set("Origin", this.#origin);
    if (options.query) call = call.query(options.query);
    if (options.key)
      call = call.set("Idempotency-Key", options.key === true ? randomUUID() : options.key);
    for (const [name, value] of Object.entries(options.headers ?? {})) call = call.set(name, value);
    return options.body === undefined ? call : call.send(options.body as object);
  }

  get(path: string, query?: Record<string, string>): request.Test {
    return this.call("get", path, query ? { query } : {});
  }

  post(path: string, body: unknown = {}, key: string | true = true): request.Test {
    return this.call("post", path, { body, key });
  }

  /** Uploads a file as the import form does. */
  upload(
    path: string,
    fields: Record<string, string>,
    file: Buffer | string,
    name = "file.csv",
  ): request.Test {
    let call = this.#agent
      .post(path)
      .set("Origin", this.#origin)
      .set("Idempotency-Key", randomUUID());
    for (const [key, value] of Object.entries(fields)) call = call.field(key, value);
    return call.attach("file", Buffer.isBuffer(file) ? file : Buffer.from(file), name);
  }

  async signIn(email: string, password: string): Promise<request.Response> {
    return this.call("post", "/api/session", { body: { email, password } });
  }
}
