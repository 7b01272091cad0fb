import { createServer, type Server } from "node:net";
import { SMTPServer } from "smtp-server";
import { afterAll, beforeAll, expect, test, vi } from "vitest";
import { withTx } from "../../server/db/with-tx.ts";
import { type Mail, startMail } from "../../server/mail/mail.ts";
import { queueLetter } from "../../server/mail/store.ts";
import { freshToken } from "../../server/mail/tokens.ts";
import { startTestApp, type TestApp } from "../support/app.ts";

let app: TestApp;

beforeAll(async () => {
  app = await startTestApp();
  // Its own postman would take the letters of these tests.
  await app.services.mail.stop();
});

afterAll(async () => {
  await app?.close();
});

interface Taken {
  from: string;
  to: string[];
  raw: string;
}

/** A mail server on loopback that refuses the first `refusals` letters for the time being. */
async function startServer(refusals: number) {
  const taken: Taken[] = [];
  let left = refusals;
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ["STARTTLS", "AUTH"],
    disableReverseLookup: true,
    logger: false,
    onData(stream, session, done) {
      const parts: Buffer[] = [];
      stream.on("data", (part: Buffer) => parts.push(part));
      stream.on("end", () => {
        if (left > 0) {
          left -= 1;
          done(Object.assign(new Error("not now"), { responseCode: 451 }));
          return;
        }
        const { mailFrom, rcptTo } = session.envelope;
        taken.push({
          from: mailFrom ? mailFrom.address : "",
          to: rcptTo.map((one) => one.address),
          raw: Buffer.concat(parts).toString(),
        });
        done();
      });
    },
  });
  await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", () => resolve()));
  const { port } = server.server.address() as { port: number };
  return {
    taken,
    port,
    close: () => new Promise<void>((resolve) => server.close(() => resolve())),
  };
}

function postman(port: number, more: object = {}): Promise<Mail> {
  const env = {
    loopback: true,
    publicUrl: undefined,
    smtpUrl: `smtp://127.0.0.1:${port}`,
    mailFrom: "desk@trace.example",
    ...more,
  };
  const { pools, keys } = app;
  return startMail({
    env,
    pools,
    keys,
    log: app.services.log,
    base: () => "https://trace.example",
  });
}

async function queue(to: string, token = freshToken()): Promise<string> {
  await withTx({ pool: app.pools.auth, nonce: null }, (tx) =>
    queueLetter(tx, app.keys, { kind: "invitation", to, token }, 60),
  );
  return token;
}

const waiting = async () => {
  const found = await app.pools.auth.query("select attempts, mail::text as line from auth.mail");
  return found.rows as { attempts: number; line: string }[];
};

test("a letter refused for now waits sealed and goes out later with the same token, once", async () => {
  const server = await startServer(1);
  const token = await queue("reader@test.example");
  const mail = await postman(server.port);
  await vi.waitFor(async () => expect((await waiting())[0]?.attempts).toBe(1));
  const [row] = await waiting();
  expect(row?.line).not.toContain(token);
  expect(row?.line).not.toContain("reader");
  await app.pools.auth.query("update auth.mail set due_at = now()");
  mail.soon();
  await vi.waitFor(async () => expect(await waiting()).toHaveLength(0), { timeout: 5000 });
  expect(server.taken).toHaveLength(1);
  expect(server.taken[0]).toMatchObject({
    from: "desk@trace.example",
    to: ["reader@test.example"],
  });
  expect(server.taken[0]?.raw.replaceAll("=\r\n", "")).toContain(
    `trace.example/invitation#${token}`,
  );
  expect(server.taken[0]?.raw).toMatch(/^Content-Type: text\/plain/m);
  expect(server.taken[0]?.raw).not.toMatch(/multipart|text\/html/);
  const logs = app.logs.join("\n");
  expect(logs).toContain("mail not sent");
  expect(logs).not.toContain("reader@");
  expect(logs).not.toContain(token);
  await mail.stop();
  await server.close();
});

test("a letter too old is not sent", async () => {
  const server = await startServer(0);
  await queue("late@test.example");
  await app.pools.auth.query("update auth.mail set expires_at = now() - interval '1 second'");
  const mail = await postman(server.port);
  await queue("fresh@test.example");
  mail.soon();
  await vi.waitFor(() =>
    expect(server.taken.map((one) => one.to)).toEqual([["fresh@test.example"]]),
  );
  await mail.stop();
  await server.close();
  await app.pools.auth.query("delete from auth.mail");
});

test("a server that says nothing keeps nobody waiting: stopping does not hang", async () => {
  const silent: Server = createServer(() => {});
  await new Promise<void>((resolve) => silent.listen(0, "127.0.0.1", () => resolve()));
  await queue("silent@test.example");
  const mail = await postman((silent.address() as { port: number }).port);
  await vi.waitFor(async () => expect((await waiting())[0]?.attempts).toBe(1));
  const started = performance.now();
  await mail.stop();
  expect(performance.now() - started).toBeLessThan(5000);
  silent.close();
  await app.pools.auth.query("delete from auth.mail");
});

test("behind a public address there is no inbox, and without a server no mail at all", async () => {
  for (const more of [
    { smtpUrl: undefined, mailFrom: undefined, publicUrl: "https://trace.example" },
    { smtpUrl: undefined, mailFrom: undefined, loopback: false },
  ]) {
    const mail = await postman(0, more);
    expect([mail.mode, mail.letters()]).toEqual(["off", []]);
    await mail.stop();
  }
  const inboxed = await postman(0, { smtpUrl: undefined, mailFrom: undefined });
  expect(inboxed.mode).toBe("inbox");
  await inboxed.stop();
});
