import { isIP } from "node:net";
import { dirname, resolve } from "node:path";
import { fileURLToPath } from "node:url";
import { z } from "zod";

/** A setting that is missing, unknown or malformed. The message is one line without its value. */
export class EnvError extends Error {
  override name = "EnvError";
}

/** The settings of a running server, parsed once at boot. */
export type Env = {
  port: number;
  host: string;
  /** Connection string of the login that migrates and makes the role logins. */
  databaseUrl: string;
  /** Absolute path of the folder that keeps keys, passwords and the private cluster. */
  dataDir: string;
  /** `HOST` is reached from this machine only. */
  loopback: boolean;
  /** Demo accounts and the invented investigation: on loopback without a public address only. */
  demo: boolean;
  demoPassword: string | undefined;
  /** Origin that browsers use, without a trailing slash; undefined on plain loopback. */
  publicUrl: string | undefined;
  /** Number of proxies in front, 0 without any. */
  proxyHops: number;
  /** Strict cookie: Secure and the `__Host-` prefix. */
  secureCookie: boolean;
  /** `smtp://` or `smtps://` with user and password; undefined when none is set. */
  smtpUrl: string | undefined;
  /** Address that mail comes from; set together with `smtpUrl`. */
  mailFrom: string | undefined;
  dev: boolean;
  logLevel: LogLevel;
};

const LOG_LEVELS = ["fatal", "error", "warn", "info", "debug", "trace", "silent"] as const;
export type LogLevel = (typeof LOG_LEVELS)[number];

const projectRoot = dirname(dirname(dirname(fileURLToPath(import.meta.url))));

function isUrl(value: string, protocols: string[]): boolean {
  const url = URL.canParse(value) ? new URL(value) : undefined;
  return url !== undefined && protocols.includes(url.protocol) && url.hostname !== "";
}

function isHttpsOrigin(value: string): boolean {
  if (!isUrl(value, ["https:"]) || /[?#]/.test(value)) return false;
  const url = new URL(value);
  return url.href === `${url.origin}/`;
}

/** A mail server and nothing else: options behind a `?` could switch its protection off. */
function isMailServer(value: string): boolean {
  if (!isUrl(value, ["smtp:", "smtps:"]) || /[?#]/.test(value)) return false;
  try {
    const { pathname, username, password } = new URL(value);
    decodeURIComponent(username + password);
    return pathname === "" || pathname === "/";
  } catch {
    return false;
  }
}

const isAddress = (value: string) => value.length <= 254 && z.email().safeParse(value).success;

function isHost(value: string): boolean {
  return isIP(value) > 0 || /^[a-z0-9]([a-z0-9.-]{0,252}[a-z0-9])?$/i.test(value);
}

/** True for an address that only this machine reaches. */
export function isLoopback(host: string): boolean {
  return host === "localhost" || host === "::1" || (isIP(host) === 4 && host.startsWith("127."));
}

const whole = (low: number, high: number, wanted: string) =>
  z
    .string()
    .regex(/^\d{1,6}$/, wanted)
    .transform(Number)
    .refine((value) => value >= low && value <= high, wanted);

const flag = z.enum(["0", "1"], "0 or 1").transform((value) => value === "1");

const schema = z.object({
  PORT: whole(1, 65_535, "a whole number from 1 to 65535").default(4700),
  HOST: z.string().refine(isHost, "an address or host name of this machine").default("127.0.0.1"),
  DATABASE_URL: z
    .string("set; `npm start` sets it")
    .refine((v) => isUrl(v, ["postgres:", "postgresql:"]), "a postgres:// address"),
  STRANDLINE_DATA: z
    .string()
    .refine((v) => v.trim() !== "" && !v.includes("\0"), "the path of a folder")
    .default(resolve(projectRoot, ".data")),
  STRANDLINE_DEMO: flag.default(true),
  STRANDLINE_DEMO_PASSWORD: z
    .string()
    .refine((v) => v.length >= 15 && v.length <= 256, "15 to 256 characters")
    .optional(),
  STRANDLINE_PUBLIC_URL: z
    .string()
    .refine(isHttpsOrigin, "an https:// address without a path")
    .optional(),
  STRANDLINE_PROXY: whole(1, 10, "the number of proxies in front, 1 to 10").optional(),
  STRANDLINE_SMTP_URL: z
    .string()
    .refine(isMailServer, "smtp://… or smtps://… with host, port, user and password only")
    .optional(),
  STRANDLINE_MAIL_FROM: z.string().refine(isAddress, "an e-mail address").optional(),
  STRANDLINE_DEV: flag.default(false),
  STRANDLINE_LOG_LEVEL: z.enum(LOG_LEVELS, `one of ${LOG_LEVELS.join(", ")}`).default("info"),
});

/**
 * Reads the settings. Names outside `STRANDLINE_…`, `PORT`, `HOST` and `DATABASE_URL` are none of
 * ours and are left alone.
 * @param source usually `process.env`
 * @throws EnvError naming the first bad setting, never its value
 */
export function parseEnv(source: Record<string, string | undefined>): Env {
  for (const name of Object.keys(source)) {
    if (name.startsWith("STRANDLINE_") && !Object.hasOwn(schema.shape, name)) {
      throw new EnvError(`${name} is not a setting; see docs/operations.md`);
    }
  }
  const parsed = schema.safeParse(source);
  if (!parsed.success) {
    const issue = parsed.error.issues[0];
    throw new EnvError(`${String(issue?.path[0])} must be ${issue?.message}`);
  }
  const env = parsed.data;
  const loopback = isLoopback(env.HOST);
  const publicUrl = env.STRANDLINE_PUBLIC_URL && new URL(env.STRANDLINE_PUBLIC_URL).origin;
  if (!loopback && !(publicUrl && env.STRANDLINE_PROXY)) {
    throw new EnvError(
      "HOST other than loopback needs STRANDLINE_PUBLIC_URL=https://… and STRANDLINE_PROXY",
    );
  }
  if ((publicUrl === undefined) !== (env.STRANDLINE_PROXY === undefined)) {
    throw new EnvError("STRANDLINE_PUBLIC_URL and STRANDLINE_PROXY are given together or not");
  }
  if ((env.STRANDLINE_SMTP_URL === undefined) !== (env.STRANDLINE_MAIL_FROM === undefined)) {
    throw new EnvError("STRANDLINE_SMTP_URL and STRANDLINE_MAIL_FROM are given together or not");
  }
  if (env.STRANDLINE_DEV && (!loopback || publicUrl)) {
    throw new EnvError("the development server runs on loopback only");
  }
  return {
    port: env.PORT,
    host: env.HOST,
    databaseUrl: env.DATABASE_URL,
    dataDir: resolve(env.STRANDLINE_DATA),
    loopback,
    demo: env.STRANDLINE_DEMO && loopback && publicUrl === undefined,
    demoPassword: env.STRANDLINE_DEMO_PASSWORD,
    publicUrl,
    proxyHops: env.STRANDLINE_PROXY ?? 0,
    secureCookie: publicUrl !== undefined,
    smtpUrl: env.STRANDLINE_SMTP_URL,
    mailFrom: env.STRANDLINE_MAIL_FROM,
    dev: env.STRANDLINE_DEV,
    logLevel: env.STRANDLINE_LOG_LEVEL,
  };
}
