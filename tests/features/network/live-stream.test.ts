import { get, type IncomingMessage } from "node:http";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { dayIn, now, shiftDay } from "../../../server/clock.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, PASSWORD, signInAs } from "../../support/factories.ts";
import { asAdmin, contactRow, register, submit } from "../../support/field-work.ts";

let app: TestApp;
let id: string;
let supervisor: Member;
let tracer: Member;

beforeAll(async () => {
  app = await startTestApp();
  id = await buildInvestigation(app);
  supervisor = await signInAs(app, "supervisor", id);
  tracer = await signInAs(app, "tracer", id);
});

afterAll(async () => {
  await app?.close();
});

type Stream = {
  cookie: string;
  status: number;
  text: () => string;
  ended: Promise<void>;
  close: () => void;
};

/** Opens a stream as a browser does. */
async function openStream(member: Member, path = `${member.base}/live`): Promise<Stream> {
  const signIn = await fetch(`${app.origin}/api/session`, {
    method: "POST",
    headers: { "content-type": "application/json", origin: app.origin },
    body: JSON.stringify({ email: member.email, password: PASSWORD }),
  });
  const cookie = signIn.headers.get("set-cookie")?.split(";")[0] ?? "";
  return await new Promise((resolve, reject) => {
    const request = get(`${app.origin}${path}`, { headers: { cookie } });
    request.on("error", reject);
    request.on("response", (response: IncomingMessage) => {
      let text = "";
      response.setEncoding("utf8");
      response.on("data", (part: string) => {
        text += part;
      });
      const ended = new Promise<void>((done) => response.on("close", done));
      resolve({
        cookie,
        status: response.statusCode ?? 0,
        text: () => text,
        ended,
        close: () => response.destroy(),
      });
    });
  });
}

const messagesOf = (stream: Stream) =>
  [...stream.text().matchAll(/^data: (.*)$/gm)].map(([, json]) => JSON.parse(json ?? ""));

async function until(holds: () => boolean): Promise<void> {
  for (let turn = 0; turn < 200 && !holds(); turn++) {
    await new Promise((resolve) => setTimeout(resolve, 10));
  }
  expect(holds()).toBe(true);
}

describe("GET live", () => {
  it("tells of a submitted interview once it can be read, without a word of it", async () => {
    const seen = await openStream(supervisor);
    const held = await openStream(tracer);
    expect(seen.status).toBe(200);
    const caseId = await register(tracer, { name: "Fay Tarn" });
    const { body } = await submit(tracer, caseId, { contacts: [contactRow({ name: "Gus Vale" })] });
    const isIt = (message: { topic: string; version: number }) =>
      message.topic === "graph" && message.version === body.graphVersion;
    await until(() => messagesOf(seen).some(isIt));
    const groups = await supervisor.client.get(`${supervisor.base}/groups`);
    expect(groups.body.graphVersion).toBeGreaterThanOrEqual(body.graphVersion);
    expect(messagesOf(seen).find(isIt).id).toBe(body.id);
    expect(seen.text()).not.toMatch(/Fay|Gus/);
    await until(() => messagesOf(held).some(isIt));
    expect(messagesOf(held).every((message) => message.id === null)).toBe(true);
    for (const message of messagesOf(seen)) {
      expect(Object.keys(message).sort()).toEqual(["id", "topic", "version"]);
    }
    seen.close();
    held.close();
    await Promise.all([seen.ended, held.ended]);
  });

  it("hears nothing of another investigation, and cannot be opened on one", async () => {
    const elsewhere = await signInAs(app, "supervisor", await buildInvestigation(app));
    const stream = await openStream(elsewhere);
    await register(tracer, { name: "Hal Wick" });
    const own = await register(elsewhere, { name: "Ivy Yarrow" });
    await until(() => messagesOf(stream).some((message) => message.id === own));
    expect(messagesOf(stream).every((message) => message.id === own)).toBe(true);
    stream.close();
    const refused = await openStream(elsewhere, `${supervisor.base}/live`);
    expect(refused.status).toBe(404);
    refused.close();
  });

  it("ends the oldest stream of an account that opens too many", async () => {
    const streams: Stream[] = [];
    for (let k = 0; k < 13; k++) streams.push(await openStream(tracer));
    await streams[0]?.ended;
    for (const stream of streams) stream.close();
    await Promise.all(streams.map(({ ended }) => ended));
  });

  it.each(["signs out", "acts as something else"])(
    "ends at once when its session %s",
    async (how) => {
      const stream = await openStream(supervisor);
      const session = `${app.origin}/api/session`;
      const headers = {
        cookie: stream.cookie,
        origin: app.origin,
        "content-type": "application/json",
      };
      const acting = { actingRole: "supervisor", investigationId: id };
      const answer =
        how === "signs out"
          ? await fetch(session, { method: "DELETE", headers })
          : await fetch(session, { method: "PATCH", headers, body: JSON.stringify(acting) });
      expect(answer.ok).toBe(true);
      await stream.ended;
    },
  );

  it("tells nothing more from the end of a role's last day on, which nobody announces", async () => {
    const leaving = await signInAs(app, "supervisor", id);
    const lastDay = (day: string) =>
      asAdmin(app, "update core.member set ends_on = $2 where id = $1", [leaving.memberId, day]);
    const today = dayIn("UTC", now());
    await lastDay(today);
    const stream = await openStream(leaving);
    const heard = await register(tracer, { name: "Jan Zale" });
    await until(() => messagesOf(stream).some((message) => message.id === heard));
    await lastDay(shiftDay(today, -1));
    const unheard = await register(tracer, { name: "Kit Alder" });
    await stream.ended;
    expect(messagesOf(stream).some((message) => message.id === unheard)).toBe(false);
  });

  it("tells a member whose membership ended nothing more", async () => {
    const leaving = await signInAs(app, "epidemiologist", id);
    const stream = await openStream(leaving);
    const path = `${supervisor.base}/members/${leaving.memberId}`;
    expect((await supervisor.client.call("delete", path)).status).toBe(204);
    await stream.ended;
    expect(messagesOf(stream)).toEqual([]);
  });
});
