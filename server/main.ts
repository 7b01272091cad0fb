import type { Server } from "node:http";
import pino from "pino";
import { createAnalysis } from "./analysis/analysis.ts";
import { createApp } from "./app.ts";
import { EnvError, parseEnv } from "./config/env.ts";
import { loadSecrets } from "./config/secrets.ts";
import { migrate } from "./db/migrate.ts";
import { createPools, endPools, loginUrl } from "./db/pools.ts";
import { startDispatcher } from "./events/dispatcher.ts";
import { createLiveHub } from "./events/live-hub.ts";
import { startCompareUpkeep } from "./features/compare/upkeep.ts";
import { startExportUpkeep } from "./features/exports/upkeep.ts";
import { startImportUpkeep } from "./features/imports/upkeep.ts";
import { firstOfficerToken } from "./features/session/first-officer.ts";
import { safeError } from "./http/translate-error.ts";
import { createKeyRing } from "./identity/keys.ts";
import { startHousekeeping } from "./jobs/housekeeping.ts";
import { startMail } from "./mail/mail.ts";
import type { Services } from "./services.ts";

const STOP_MS = 10_000;
/** Exit code of a boot that was refused in plain words; the start script adds none of its own. */
const REFUSED = 78;

/** Stores the key check at the first boot and refuses another master key afterwards. */
async function checkKey(services: Pick<Services, "pools" | "keys">): Promise<void> {
  const found = await services.pools.auth.query(
    "select value from auth.meta where key = 'key_check'",
  );
  const value = found.rows[0]?.value as string | undefined;
  if (value === undefined) {
    await services.pools.auth.query("insert into auth.meta (key, value) values ('key_check', $1)", [
      services.keys.checkValue(),
    ]);
  } else if (!services.keys.opensCheck(value)) {
    throw new EnvError(
      "the master key does not open this database; restore secrets.json from its backup",
    );
  }
}

/** A durable database only: an acknowledged interview must survive a crash. */
async function checkDurability(services: Pick<Services, "pools">): Promise<void> {
  const found = await services.pools.system.query(
    `select name from pg_settings where name in ('fsync', 'full_page_writes', 'synchronous_commit')
       and setting = 'off'`,
  );
  if (found.rowCount) {
    throw new EnvError(
      `PostgreSQL runs with ${found.rows[0].name}=off, which can lose acknowledged work`,
    );
  }
}

async function main(): Promise<void> {
  // A reader that goes away (`npm start | head`) must not take the server with it.
  process.stdout.on("error", () => {});
  process.stderr.on("error", () => {});
  const env = parseEnv(process.env);
  const log = pino({ level: env.logLevel, base: undefined });
  const secrets = loadSecrets(env.dataDir);
  await migrate(env.databaseUrl, secrets.logins);
  const pools = createPools(env.databaseUrl, secrets.logins, (error) =>
    log.warn({ event: "database connection lost", error: safeError(error) }),
  );
  const keys = createKeyRing(secrets.masterKey);
  await checkKey({ pools, keys });
  await checkDurability({ pools });
  if (env.demo) {
    const { makeDemo } = await import("../drizzle/seed/make-demo.ts");
    await makeDemo({
      databaseUrl: env.databaseUrl,
      dataDir: env.dataDir,
      pools,
      keys,
      password: env.demoPassword,
    });
  }
  const systemUrl = loginUrl(env.databaseUrl, "system", secrets.logins.system);
  const hub = createLiveHub();
  const analysis = createAnalysis({ pools, log });
  await analysis.start();
  const imports = await startImportUpkeep({ pools, log });
  const exports = await startExportUpkeep({ pools, log });
  const comparisons = await startCompareUpkeep({ pools, log });
  const dispatcher = await startDispatcher({ pools, systemUrl, analysis, hub, log });
  const housekeeping = startHousekeeping(pools, log);
  const address =
    env.publicUrl ?? `http://${env.host.includes(":") ? `[${env.host}]` : env.host}:${env.port}`;
  const mail = await startMail({ env, pools, keys, log, base: () => address });
  const services: Services = { env, secrets, pools, keys, analysis, hub, mail, log };

  const dev = env.dev ? await (await import("./dev-client.ts")).devClient() : undefined;
  const app = createApp(services, dev?.middleware);
  const server: Server = app.listen(env.port, env.host, (error?: Error) => {
    if (error) {
      process.stderr.write(
        `strandline: cannot listen on ${env.host}:${env.port} (${(error as NodeJS.ErrnoException).code})\n`,
      );
      process.exit(1);
    }
    announce().catch((error: unknown) =>
      log.error({ event: "start not announced in full", error: safeError(error) }),
    );
  });
  server.requestTimeout = 60_000;
  server.headersTimeout = 10_000;

  async function announce(): Promise<void> {
    process.stdout.write(`Strandline is ready at ${address}\n`);
    if (env.demo) {
      const { demoNotice } = await import("../drizzle/seed/make-demo.ts");
      process.stdout.write(demoNotice(env.dataDir, env.demoPassword));
      return;
    }
    const token = await firstOfficerToken(pools);
    if (token) {
      process.stdout.write(
        `Make the first data officer (single use, 72 hours): ${address}/first-officer#${token}\n`,
      );
    }
  }

  let stopping = false;
  const stop = (signal: string) => {
    if (stopping) return;
    stopping = true;
    log.info({ event: "stopping", signal });
    const hard = setTimeout(() => process.exit(1), STOP_MS);
    hard.unref();
    hub.close();
    server.close(async () => {
      imports.stop();
      exports.stop();
      housekeeping.stop();
      await comparisons.stop();
      await mail.stop();
      await dispatcher.stop();
      await analysis.stop();
      await dev?.close();
      await endPools(pools);
      process.exit(0);
    });
    server.closeIdleConnections();
  };
  process.on("SIGTERM", () => stop("SIGTERM"));
  process.on("SIGINT", () => stop("SIGINT"));
  for (const event of ["uncaughtException", "unhandledRejection"] as const) {
    process.on(event, (error: unknown) => {
      log.fatal({ event, error: safeError(error) });
      process.exit(1);
    });
  }
}

main().catch((error: unknown) => {
  // A refused setting is said in its own words; anything else by name only, for it may carry data.
  const plain =
    error instanceof EnvError ||
    (error instanceof Error && !("code" in error) && !("cause" in error));
  const line = plain ? error.message : JSON.stringify(safeError(error));
  process.stderr.write(`strandline: ${line}\n`);
  process.exit(plain ? REFUSED : 1);
});
