import nodemailer from "nodemailer";
import type { Logger } from "pino";
import type { Letter } from "../../shared/contracts/accounts.ts";
import { type Env, isLoopback } from "../config/env.ts";
import type { Pools } from "../db/pools.ts";
import { safeError } from "../http/translate-error.ts";
import type { KeyRing } from "../identity/keys.ts";
import { type FakeInbox, startFakeInbox } from "./fake-inbox.ts";
import { type LetterOrder, writeLetter } from "./letters.ts";
import { claimLetter, type DueLetter, dropLetter, openReset } from "./store.ts";

const EVERY_MS = 15_000;
// Whoever asks is still inside its transaction; by then it has ended.
const SOON_MS = [60, 400, 2_500];
const STOP_MS = 1_500;
const MOST_IN_A_ROUND = 50;

/** The installation's mail: `smtp` by settings, `inbox` kept here to be read, `off` without either. */
export interface Mail {
  mode: "smtp" | "inbox" | "off";
  /** Letters kept here, the newest first; empty unless the mode is `inbox`. */
  letters(): Letter[];
  /** A letter was queued, or will be when the present transaction ends. */
  soon(): void;
  stop(): Promise<void>;
}

type MailEnv = Pick<Env, "loopback" | "publicUrl" | "smtpUrl" | "mailFrom">;

export interface MailOptions {
  env: MailEnv;
  pools: Pools;
  keys: KeyRing;
  log: Pick<Logger, "warn">;
  /** Origin that links begin with. */
  base: () => string;
}

function createTransport(env: MailEnv, inbox: FakeInbox | null) {
  const url = env.smtpUrl ? new URL(env.smtpUrl) : null;
  const host = url ? url.hostname.replace(/^\[|\]$/g, "") : "127.0.0.1";
  const secure = url?.protocol === "smtps:";
  const auth = url?.username
    ? { user: decodeURIComponent(url.username), pass: decodeURIComponent(url.password) }
    : undefined;
  return nodemailer.createTransport({
    host,
    port: inbox ? inbox.port : Number(url?.port || (secure ? 465 : 587)),
    secure,
    // Tokens travel in these letters: never in plain over a network.
    requireTLS: !secure && !isLoopback(host),
    ignoreTLS: inbox !== null,
    name: "strandline.invalid",
    connectionTimeout: 10_000,
    greetingTimeout: 10_000,
    socketTimeout: 20_000,
    dnsTimeout: 10_000,
    disableFileAccess: true,
    disableUrlAccess: true,
    ...(auth ? { auth } : {}),
  });
}

/** Starts sending what is queued, now and whenever something comes. */
export async function startMail({ env, pools, keys, log, base }: MailOptions): Promise<Mail> {
  // Behind a public address everybody could read it, so the inbox is for plain loopback only.
  const inboxed = !env.smtpUrl && env.loopback && env.publicUrl === undefined;
  if (!env.smtpUrl && !inboxed) {
    return { mode: "off", letters: () => [], soon: () => {}, stop: async () => {} };
  }
  const inbox = inboxed ? await startFakeInbox() : null;
  const transport = createTransport(env, inbox);
  const from = env.mailFrom ?? "strandline@strandline.invalid";
  let stopped = false;
  let running: Promise<void> | null = null;

  async function send(due: DueLetter): Promise<void> {
    const order = JSON.parse(keys.openLetter(due.id, due.sealed)) as LetterOrder;
    const to =
      order.kind === "reset"
        ? await openReset(pools.auth, order.token, order.to, due.expires_at)
        : order.to;
    if (to !== null) {
      await transport.sendMail({
        from: { name: "Strandline", address: from },
        // One address, as an object: nothing in it is read as a list or a name.
        to: { name: "", address: to },
        ...writeLetter(order, base()),
        textEncoding: "quoted-printable",
        headers: { "Auto-Submitted": "auto-generated" },
        disableFileAccess: true,
        disableUrlAccess: true,
      });
    }
    await dropLetter(pools.auth, due.id);
  }

  async function round(): Promise<void> {
    for (let sent = 0; sent < MOST_IN_A_ROUND && !stopped; sent++) {
      const due = await claimLetter(pools.auth);
      if (!due) return;
      try {
        await send(due);
      } catch (error) {
        log.warn({ event: "mail not sent", error: safeError(error) });
      }
    }
  }

  function run(): void {
    if (stopped || running !== null) return;
    running = round()
      .catch((error: unknown) => log.warn({ event: "mail queue", error: safeError(error) }))
      .finally(() => {
        running = null;
      });
  }

  const timers = new Set<NodeJS.Timeout>();
  const every = setInterval(run, EVERY_MS);
  every.unref();
  run();
  return {
    mode: inbox ? "inbox" : "smtp",
    letters: () => inbox?.letters() ?? [],
    soon() {
      if (stopped) return;
      for (const wait of SOON_MS) {
        const timer = setTimeout(() => {
          timers.delete(timer);
          run();
        }, wait);
        timer.unref();
        timers.add(timer);
      }
    },
    async stop() {
      stopped = true;
      clearInterval(every);
      for (const timer of timers) clearTimeout(timer);
      // A letter on its way may take longer than a stop may: it goes out again at the next start.
      await Promise.race([running, new Promise((resolve) => setTimeout(resolve, STOP_MS).unref())]);
      transport.close();
      await inbox?.close();
    },
  };
}
