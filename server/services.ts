import type { Logger } from "pino";
import type { Analysis } from "./analysis/analysis.ts";
import type { Env } from "./config/env.ts";
import type { Secrets } from "./config/secrets.ts";
import type { Pools } from "./db/pools.ts";
import type { LiveHub } from "./events/live-hub.ts";
import type { KeyRing } from "./identity/keys.ts";
import type { Mail } from "./mail/mail.ts";

/** What handlers are given; made once at boot (and once per test file). */
export interface Services {
  env: Pick<Env, "demo" | "secureCookie" | "loopback" | "publicUrl" | "proxyHops" | "dev">;
  secrets: Pick<Secrets, "sessionSecrets">;
  pools: Pools;
  keys: KeyRing;
  analysis: Analysis;
  hub: LiveHub;
  mail: Mail;
  log: Logger;
}
