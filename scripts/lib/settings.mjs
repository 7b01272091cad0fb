// The settings of the product, checked before anything is installed or started.
// server/config/env.ts checks the same rules again with types; tests/server/env.test.ts runs one
// table of good and bad settings through both.
import { isIP } from "node:net";
import { PlainError } from "./plain.mjs";

const flag = (value) => /^[01]$/.test(value);
const inRange = (value, low, high) =>
  /^\d{1,6}$/.test(value) && Number(value) >= low && Number(value) <= high;

function isUrl(value, protocols) {
  try {
    const url = new URL(value);
    return protocols.includes(url.protocol) && url.hostname !== "";
  } catch {
    return false;
  }
}

function isHttpsOrigin(value) {
  if (!isUrl(value, ["https:"])) return false;
  const url = new URL(value);
  return url.href === `${url.origin}/` && !value.includes("?") && !value.includes("#");
}

// A mail server and nothing else: options behind a `?` could switch its protection off.
function isMailServer(value) {
  if (!isUrl(value, ["smtp:", "smtps:"]) || /[?#]/.test(value)) return false;
  try {
    const { pathname, username, password } = new URL(value);
    decodeURIComponent(username + password);
    return pathname === "" || pathname === "/";
  } catch {
    return false;
  }
}

// The expression of zod's own e-mail check, which this file may not load.
const ADDRESS =
  /^(?:[A-Za-z0-9_'+-]+\.)*[A-Za-z0-9_'+-]*[A-Za-z0-9_+-]@(?:[A-Za-z0-9][A-Za-z0-9-]*\.)+[A-Za-z]{2,}$/;

function isHost(value) {
  return isIP(value) > 0 || /^[a-z0-9]([a-z0-9.-]{0,252}[a-z0-9])?$/i.test(value);
}

const LEVELS = ["fatal", "error", "warn", "info", "debug", "trace", "silent"];

/** Name → [test, what is wanted]. */
const RULES = {
  PORT: [(v) => inRange(v, 1, 65535), "a whole number from 1 to 65535"],
  HOST: [isHost, "an address or host name of this machine"],
  DATABASE_URL: [(v) => isUrl(v, ["postgres:", "postgresql:"]), "a postgres:// address"],
  STRANDLINE_DATA: [(v) => v.trim() !== "" && !v.includes("\0"), "the path of a folder"],
  STRANDLINE_DEMO: [flag, "0 or 1"],
  STRANDLINE_DEMO_PASSWORD: [(v) => v.length >= 15 && v.length <= 256, "15 to 256 characters"],
  STRANDLINE_PUBLIC_URL: [isHttpsOrigin, "an https:// address without a path"],
  STRANDLINE_PROXY: [(v) => inRange(v, 1, 10), "the number of proxies in front, 1 to 10"],
  STRANDLINE_SMTP_URL: [
    isMailServer,
    "smtp://… or smtps://… with host, port, user and password only",
  ],
  STRANDLINE_MAIL_FROM: [(v) => v.length <= 254 && ADDRESS.test(v), "an e-mail address"],
  STRANDLINE_DEV: [flag, "0 or 1"],
  STRANDLINE_LOG_LEVEL: [(v) => LEVELS.includes(v), `one of ${LEVELS.join(", ")}`],
};

/** True for an address that only this machine reaches. */
export function isLoopback(host) {
  return host === "localhost" || host === "::1" || (isIP(host) === 4 && host.startsWith("127."));
}

/**
 * Checks the settings; values are never printed, they may hold a password.
 * @throws PlainError naming the first bad setting
 */
export function checkSettings(env) {
  for (const name of Object.keys(env)) {
    if (name.startsWith("STRANDLINE_") && !Object.hasOwn(RULES, name)) {
      throw new PlainError(`${name} is not a setting; see docs/operations.md`);
    }
  }
  for (const [name, [test, wanted]] of Object.entries(RULES)) {
    const value = env[name];
    if (value !== undefined && !test(value)) throw new PlainError(`${name} must be ${wanted}`);
  }
  const host = env.HOST ?? "127.0.0.1";
  const url = env.STRANDLINE_PUBLIC_URL !== undefined;
  const proxy = env.STRANDLINE_PROXY !== undefined;
  if (!isLoopback(host) && !(url && proxy)) {
    throw new PlainError(
      `HOST other than loopback needs STRANDLINE_PUBLIC_URL=https://… and STRANDLINE_PROXY`,
    );
  }
  if (url !== proxy) {
    throw new PlainError("STRANDLINE_PUBLIC_URL and STRANDLINE_PROXY are given together or not");
  }
  if ((env.STRANDLINE_SMTP_URL === undefined) !== (env.STRANDLINE_MAIL_FROM === undefined)) {
    throw new PlainError("STRANDLINE_SMTP_URL and STRANDLINE_MAIL_FROM are given together or not");
  }
  if (env.STRANDLINE_DEV === "1" && (!isLoopback(host) || url)) {
    throw new PlainError("the development server runs on loopback only");
  }
}
