import { afterAll, beforeAll, expect, test, vi } from "vitest";
import { dayIn, now, shiftDay } from "../../../server/clock.ts";
import type { Letter } from "../../../shared/contracts/accounts.ts";
import { startTestApp, type TestApp, TestClient } from "../../support/app.ts";
import {
  buildAccount,
  buildInvestigation,
  buildMember,
  PASSWORD,
  signInAs,
} from "../../support/factories.ts";
import { asAdmin } from "../../support/field-work.ts";

let app: TestApp;

beforeAll(async () => {
  app = await startTestApp();
});

afterAll(async () => {
  await app?.close();
});

const NEXT = "gannets over the harbour wall";

/** The letters for an address, read as the inbox page reads them; waits until there are `count`. */
async function lettersTo(email: string, count = 1): Promise<Letter[]> {
  return vi.waitFor(
    async () => {
      const answer = await new TestClient(app).get("/api/inbox");
      const found = (answer.body.items as Letter[]).filter((one) => one.to === email);
      if (found.length < count) throw new Error(`${found.length} letters`);
      return found;
    },
    { timeout: 8000, interval: 50 },
  );
}

function tokenIn(letter: Letter | undefined): string {
  return /#([\w-]{43})$/m.exec(letter?.text ?? "")?.[1] ?? "";
}

const publicPost = (path: string, body: unknown, client = new TestClient(app)) =>
  client.call("post", path, { body });

test("an invitation makes an account and a membership, once, from a letter with nobody's data", async () => {
  const id = await buildInvestigation(app, { name: "Heronsgate fever" });
  const supervisor = await signInAs(app, "supervisor", id);
  const email = "new.colleague@test.example";
  const made = await supervisor.client.post(`${supervisor.base}/invitations`, {
    email: "New.Colleague@test.example",
    role: "tracer",
    team: "North",
  });
  expect(made.status).toBe(201);
  const pending = await supervisor.client.get(`${supervisor.base}/invitations`);
  expect(pending.body).toMatchObject({
    total: 1,
    items: [{ id: made.body.id, email, role: "tracer", team: "North" }],
  });

  const [letter] = await lettersTo(email);
  expect(letter?.text).toContain(`${app.origin}/invitation#`);
  expect(`${letter?.subject} ${letter?.text}`).not.toMatch(/heronsgate|colleague/i);
  const token = tokenIn(letter);
  const stored = await app.pools.auth.query(
    "select (select string_agg(i::text, ' ') from auth.invitation i) as links, (select count(*)::int from auth.mail) as waiting",
  );
  expect(stored.rows[0].links).not.toContain(token);
  expect(stored.rows[0].waiting).toBe(0);

  const seen = await publicPost("/api/invitations/look", { token });
  expect(seen.body).toEqual({
    email,
    role: "tracer",
    investigationName: "Heronsgate fever",
    invented: true,
    endsOn: null,
    hasAccount: false,
  });
  const bare = await publicPost("/api/invitations/accept", { token });
  expect([bare.status, bare.body.errors]).toEqual([
    422,
    [
      { path: "displayName", code: "required" },
      { path: "password", code: "required" },
    ],
  ]);
  const body = { token, displayName: "Rowan Ferry", password: "Rowan Ferry rowan 2026" };
  const easy = await publicPost("/api/invitations/accept", body);
  expect(easy.body.errors).toEqual([{ path: "password", code: "common_password" }]);

  const both = await Promise.all(
    [1, 2].map(() => publicPost("/api/invitations/accept", { ...body, password: NEXT })),
  );
  expect(both.map((one) => one.status).sort()).toEqual([201, expect.toBeOneOf([404, 409])]);
  const again = await publicPost("/api/invitations/accept", { ...body, password: NEXT });
  expect(again.status).toBe(404);

  const signedIn = await new TestClient(app).signIn(email, NEXT);
  expect(signedIn.body).toMatchObject({ actingRole: "tracer", investigationId: id });
  const members = await supervisor.client.get(`${supervisor.base}/members`, { q: email });
  expect(members.body.items).toMatchObject([{ displayName: "Rowan Ferry", team: "North" }]);
  const left = await supervisor.client.get(`${supervisor.base}/invitations`);
  expect(left.body.total).toBe(0);
});

test("an invitation to an existing account adds the role and touches nothing else", async () => {
  const id = await buildInvestigation(app);
  const officer = await signInAs(app, "officer", id);
  const account = await buildAccount(app, { displayName: "Already Here" });
  const invitation = { email: account.email, role: "epidemiologist" };
  await officer.client.post(`${officer.base}/invitations`, invitation);
  const [letter] = await lettersTo(account.email);
  const token = tokenIn(letter);
  expect((await publicPost("/api/invitations/look", { token })).body.hasAccount).toBe(true);
  const body = { token, displayName: "Somebody Else", password: NEXT };
  const done = await publicPost("/api/invitations/accept", body);
  expect([done.status, done.body]).toEqual([201, { accepted: true, newAccount: false }]);
  expect((await new TestClient(app).signIn(account.email, NEXT)).status).toBe(401);
  const signedIn = await new TestClient(app).signIn(account.email, PASSWORD);
  expect(signedIn.body).toMatchObject({
    displayName: "Already Here",
    actingRole: "epidemiologist",
  });
  const twice = await officer.client.post(`${officer.base}/invitations`, invitation);
  expect(twice.body.errors).toEqual([{ path: "role", code: "already_member" }]);
});

test("a second invitation ends the link of the first, and a late one opens nothing", async () => {
  const id = await buildInvestigation(app);
  const supervisor = await signInAs(app, "supervisor", id);
  const invitation = { email: "twice@test.example", role: "tracer" };
  await supervisor.client.post(`${supervisor.base}/invitations`, invitation);
  const first = tokenIn((await lettersTo(invitation.email))[0]);
  await supervisor.client.post(`${supervisor.base}/invitations`, invitation);
  const second = tokenIn((await lettersTo(invitation.email, 2))[0]);
  expect(first).not.toBe(second);
  expect((await publicPost("/api/invitations/look", { token: first })).status).toBe(404);
  expect((await publicPost("/api/invitations/look", { token: second })).status).toBe(200);
  await app.pools.auth.query(
    "update auth.invitation set expires_at = now() - interval '1 second' where email = $1",
    [invitation.email],
  );
  for (const path of ["look", "accept"]) {
    const body = {
      token: second,
      ...(path === "accept" ? { displayName: "A", password: NEXT } : {}),
    };
    expect((await publicPost(`/api/invitations/${path}`, body)).status).toBe(404);
  }
});

test("an invitation carries the last day of the role, and opens nothing once that day is over", async () => {
  const id = await buildInvestigation(app);
  const officer = await signInAs(app, "officer", id);
  const today = dayIn("UTC", now());
  const email = "short.stay@test.example";
  const invitation = { email, role: "tracer", endsOn: today };
  const past = await officer.client.post(`${officer.base}/invitations`, {
    ...invitation,
    endsOn: shiftDay(today, -1),
  });
  expect(past.body.errors).toEqual([{ path: "endsOn", code: "in_past" }]);
  const made = await officer.client.post(`${officer.base}/invitations`, invitation);
  const open = () => officer.client.get(`${officer.base}/invitations`);
  expect((await open()).body.items).toMatchObject([{ email, endsOn: today }]);
  const token = tokenIn((await lettersTo(email))[0]);
  const seen = await publicPost("/api/invitations/look", { token });
  expect(seen.body).toMatchObject({ email, endsOn: today });
  const setEnd = (day: string) =>
    app.pools.auth.query("update auth.invitation set ends_on = $2 where id = $1", [
      made.body.id,
      day,
    ]);
  await setEnd(shiftDay(today, -1));
  const body = { token, displayName: "Short Stay", password: NEXT };
  expect((await publicPost("/api/invitations/look", { token })).status).toBe(404);
  expect((await publicPost("/api/invitations/accept", body)).status).toBe(404);
  expect((await open()).body.total).toBe(0);
  await setEnd(today);
  expect((await publicPost("/api/invitations/accept", body)).status).toBe(201);
  const members = await officer.client.get(`${officer.base}/members`, { q: email });
  expect(members.body.items).toMatchObject([{ displayName: "Short Stay", endsOn: today }]);
});

test("who held a role that ran out may take up an invitation to it", async () => {
  const id = await buildInvestigation(app);
  const officer = await signInAs(app, "officer", id);
  const account = await buildAccount(app);
  const first = await buildMember(app, id, account.id, "tracer");
  await asAdmin(app, "update core.member set ends_on = '2020-01-31' where id = $1", [first]);
  const invitation = { email: account.email, role: "tracer" };
  const made = await officer.client.post(`${officer.base}/invitations`, invitation);
  expect(made.status).toBe(201);
  const token = tokenIn((await lettersTo(account.email))[0]);
  expect((await publicPost("/api/invitations/accept", { token })).status).toBe(201);
  const members = await officer.client.get(`${officer.base}/members`, { q: account.email });
  expect(members.body.items).toMatchObject([{ endsOn: null }]);
  expect(members.body.items[0].id).not.toBe(first);
});

test("a withdrawn invitation opens nothing, and only its own investigation can withdraw it", async () => {
  const supervisor = await signInAs(app, "supervisor", await buildInvestigation(app));
  const elsewhere = await signInAs(app, "officer", await buildInvestigation(app));
  const email = "withdrawn@test.example";
  const made = await supervisor.client.post(`${supervisor.base}/invitations`, {
    email,
    role: "tracer",
  });
  const token = tokenIn((await lettersTo(email))[0]);
  const end = (who: typeof supervisor) =>
    who.client.call("delete", `${who.base}/invitations/${made.body.id}`);
  expect((await end(elsewhere)).status).toBe(404);
  expect((await publicPost("/api/invitations/look", { token })).status).toBe(200);
  expect((await end(supervisor)).status).toBe(204);
  expect((await publicPost("/api/invitations/look", { token })).status).toBe(404);
  expect((await end(supervisor)).status).toBe(404);
});

test("demo accounts are invited to invented investigations only", async () => {
  const demo = await buildAccount(app, { demo: true });
  const real = await signInAs(app, "officer", await buildInvestigation(app, { invented: false }));
  const invented = await signInAs(app, "officer", await buildInvestigation(app));
  const body = { email: demo.email, role: "tracer" };
  const refused = await real.client.post(`${real.base}/invitations`, body);
  expect(refused.body.errors).toEqual([{ path: "email", code: "demo_only" }]);
  expect((await invented.client.post(`${invented.base}/invitations`, body)).status).toBe(201);
});

test("a reset answers alike for known and unknown, changes the password once and ends all sessions", async () => {
  const tracer = await signInAs(app, "tracer", await buildInvestigation(app));
  const answers = [
    await publicPost("/api/password-resets", { email: tracer.email.toUpperCase() }),
    await publicPost("/api/password-resets", { email: "nobody-at-all@test.example" }),
  ];
  for (const answer of answers) {
    expect([answer.status, answer.body]).toEqual([202, { asked: true }]);
  }
  const [letter] = await lettersTo(tracer.email);
  expect(letter?.text).toContain("/new-password#");
  const token = tokenIn(letter);
  const easy = await publicPost("/api/password-resets/use", {
    token,
    password: "passwordpassword1",
  });
  expect(easy.body.errors).toEqual([{ path: "password", code: "common_password" }]);
  const both = await Promise.all(
    [1, 2].map(() => publicPost("/api/password-resets/use", { token, password: NEXT })),
  );
  expect(both.map((one) => one.status).sort()).toEqual([200, 404]);
  expect((await tracer.client.get("/api/session")).status).toBe(401);
  expect((await new TestClient(app).signIn(tracer.email, PASSWORD)).status).toBe(401);
  expect((await new TestClient(app).signIn(tracer.email, NEXT)).status).toBe(200);
  const letters = await lettersTo(tracer.email, 2);
  expect(letters[0]?.subject).toBe("Your Strandline password was changed");
  await vi.waitFor(async () => {
    const waiting = await app.pools.auth.query("select count(*)::int as n from auth.mail");
    expect(waiting.rows[0].n).toBe(0);
  });
  const inbox = await new TestClient(app).get("/api/inbox");
  const to = (inbox.body.items as Letter[]).map((one) => one.to);
  expect(to).not.toContain("nobody-at-all@test.example");
});

test("no more than ten reset letters an hour go to one address, and the answer stays the same", async () => {
  const account = await buildAccount(app);
  for (let at = 0; at < 12; at++) {
    const answer = await publicPost("/api/password-resets", { email: account.email });
    expect(answer.status).toBe(202);
  }
  await lettersTo(account.email, 10);
  const waiting = await app.pools.auth.query("select count(*)::int as n from auth.mail");
  expect(waiting.rows[0].n).toBe(0);
  expect(await lettersTo(account.email)).toHaveLength(10);
});

test("changing the password asks for the old one, keeps this session and ends the others", async () => {
  const id = await buildInvestigation(app);
  const account = await buildAccount(app, { displayName: "Merrin Vale" });
  await buildMember(app, id, account.id, "supervisor");
  const [here, there] = [new TestClient(app), new TestClient(app)];
  await here.signIn(account.email, PASSWORD);
  await there.signIn(account.email, PASSWORD);
  const change = (body: object) => here.call("post", "/api/session/password", { body });
  const wrong = await change({ current: "not this one", next: NEXT });
  expect(wrong.body.errors).toEqual([{ path: "current", code: "wrong_password" }]);
  const own = await change({ current: PASSWORD, next: "merrin vale merrin" });
  expect(own.body.errors).toEqual([{ path: "next", code: "common_password" }]);
  const same = await change({ current: PASSWORD, next: PASSWORD });
  expect(same.body.errors).toEqual([{ path: "next", code: "same_password" }]);
  const done = await change({ current: PASSWORD, next: NEXT });
  expect(done.status).toBe(200);
  expect(done.body).toMatchObject({ actingRole: "supervisor", investigationId: id });
  expect((await here.get(`/api/investigations/${id}/members`)).status).toBe(200);
  expect((await there.get("/api/session")).status).toBe(401);
});

test("without a mail server, invitations and resets say that no mail is sent, and there is no inbox", async () => {
  const supervisor = await signInAs(app, "supervisor", await buildInvestigation(app));
  const kept = app.services.mail;
  app.services.mail = { ...kept, mode: "off" };
  try {
    const body = { email: "someone@test.example", role: "tracer" };
    const invited = await supervisor.client.post(`${supervisor.base}/invitations`, body);
    expect([invited.status, invited.body.code]).toEqual([503, "mail_off"]);
    const reset = await publicPost("/api/password-resets", { email: supervisor.email });
    expect([reset.status, reset.body.code]).toEqual([503, "mail_off"]);
    expect((await new TestClient(app).get("/api/inbox")).status).toBe(404);
  } finally {
    app.services.mail = kept;
  }
});

test("the inbox is for this machine's own names", async () => {
  const headers = { Host: `rebound.example:${new URL(app.origin).port}` };
  const answer = await new TestClient(app).call("get", "/api/inbox", { headers });
  expect(answer.status).toBe(404);
});
