import { afterAll, beforeAll, expect, test } from "vitest";
import { firstOfficerToken } from "../../../server/features/session/first-officer.ts";
import { startTestApp, type TestApp, TestClient } from "../../support/app.ts";

let app: TestApp;

beforeAll(async () => {
  app = await startTestApp();
});

afterAll(async () => {
  await app?.close();
});

const form = {
  displayName: "First Officer",
  email: "First@Test.example",
  password: "a password of some length",
  investigationName: "Opening",
  timeZone: "Europe/Lisbon",
};

test("the printed link makes the first officer, once", async () => {
  const client = new TestClient(app);
  expect((await client.get("/api/welcome")).body).toMatchObject({ setUpNeeded: true });
  const older = await firstOfficerToken(app.pools);
  const token = await firstOfficerToken(app.pools);
  const send = (value: string | null, body: object = form) =>
    client.call("post", "/api/first-officer", { body: { token: value, ...body } });

  expect((await send("a token that was never made")).status).toBe(404);
  expect((await send(older)).status).toBe(404);
  const short = await send(token, { ...form, password: "too short" });
  expect(short.status).toBe(422);
  expect(short.body.errors).toEqual([{ path: "password", code: "too_short" }]);

  expect((await send(token)).status).toBe(201);
  expect((await send(token)).status).toBe(404);
  expect(await firstOfficerToken(app.pools)).toBeNull();

  const session = await client.signIn(form.email, form.password);
  expect(session.status).toBe(200);
  expect(session.body.memberships.map((one: { role: string }) => one.role).sort()).toEqual([
    "officer",
    "supervisor",
  ]);
  expect((await client.get("/api/welcome")).body).toMatchObject({
    signedIn: true,
    setUpNeeded: false,
  });
});
