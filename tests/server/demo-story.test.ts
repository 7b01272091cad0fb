import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, expect, test } from "vitest";
import { makeDemo } from "../../drizzle/seed/make-demo.ts";
import { dayIn, now, shiftDay } from "../../server/clock.ts";
import { type ClusterList, clusterList } from "../../shared/contracts/clusters.ts";
import { followUpList } from "../../shared/contracts/follow-up.ts";
import { FOLLOW_STATES } from "../../shared/vocabulary.ts";
import { startTestApp, type TestApp, TestClient } from "../support/app.ts";
import { PASSWORD } from "../support/factories.ts";

const folder = mkdtempSync(join(tmpdir(), "strandline-demo-"));
let app: TestApp;
let client: TestClient;
let base: string;

beforeAll(async () => {
  app = await startTestApp();
  const { pools, keys } = app;
  const options = { databaseUrl: app.adminUrl, dataDir: folder, pools, keys };
  await makeDemo({ ...options, password: PASSWORD });
  client = new TestClient(app);
  const session = await client.signIn("supervisor@strandline.example", PASSWORD);
  base = `/api/investigations/${session.body.investigationId}`;
}, 180_000);

afterAll(async () => {
  await app?.close();
  rmSync(folder, { recursive: true, force: true });
});

test("the demo shows every state of follow-up that exists", async () => {
  const states = new Set<string>();
  for (let page = 1; page < 20; page += 1) {
    const query = { show: "all", pageSize: "200", page: String(page) };
    const list = followUpList.parse((await client.get(`${base}/follow-up`, query)).body);
    for (const item of list.items) states.add(item.state);
    if (page * 200 >= list.total) break;
  }
  expect([...states].sort()).toEqual([...FOLLOW_STATES].sort());
});

test("several clusters are proposed; one workplace has been quiet for twice the longest incubation", async () => {
  const list: ClusterList = clusterList.parse((await client.get(`${base}/clusters`)).body);
  expect(list.total).toBeGreaterThanOrEqual(4);
  expect(list.total).toBeLessThanOrEqual(12);
  expect(Math.max(...list.items.map((one) => one.cases))).toBeLessThan(70);
  const today = dayIn("UTC", now());
  const quiet = list.items.filter((one) => one.kind === "workplace" && one.cases >= 8);
  expect(quiet.some((one) => one.lastDay <= shiftDay(today, -20))).toBe(true);
  expect(list.items.some((one) => one.lastDay >= shiftDay(today, -7))).toBe(true);
});
