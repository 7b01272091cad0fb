import pg from "pg";
import { afterAll, beforeAll, expect, it } from "vitest";
import { resetInterrupted, sweepStages } from "../../../server/features/imports/upkeep.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInAs } from "../../support/factories.ts";
import { commit, problemLines, stage } from "../../support/imports.ts";

let app: TestApp;
let admin: pg.Client;
let officer: Member;

beforeAll(async () => {
  app = await startTestApp();
  admin = new pg.Client({ connectionString: app.adminUrl });
  await admin.connect();
  officer = await signInAs(app, "officer", await buildInvestigation(app));
});

afterAll(async () => {
  await admin.end();
  await app.close();
});

it("makes an interrupted commit ready again", async () => {
  const { id } = await stage(officer, "people", "ref\nU-1\n");
  // What a crash in the middle of a commit leaves behind.
  await admin.query("update core.import set state = 'committing', progress = 0.4 where id = $1", [
    id,
  ]);
  expect(await resetInterrupted(app.pools)).toBe(1);
  expect((await officer.client.get(`${officer.base}/imports/${id}`)).body).toMatchObject({
    state: "ready",
    progress: 0,
  });
  expect((await commit(officer, id)).state).toBe("committed");
  expect(await resetInterrupted(app.pools)).toBe(0);
});

it("deletes checked rows after a day; the same file can be brought again", async () => {
  const text = "ref\nU-2\n";
  const { id } = await stage(officer, "people", text);
  expect(await sweepStages(app.pools)).toBe(0);
  await admin.query(
    `update core.import set counts = jsonb_set(counts, '{stagedAt}',
       to_jsonb(extract(epoch from now() - interval '25 hours')::bigint)) where id = $1`,
    [id],
  );
  expect(await sweepStages(app.pools)).toBe(1);
  const left = await admin.query("select 1 from identity.import_stage where import_id = $1", [id]);
  expect(left.rowCount).toBe(0);
  const path = `${officer.base}/imports/${id}`;
  const gone = (await officer.client.get(path)).body;
  expect(gone.state).toBe("failed");
  expect(problemLines(gone)).toEqual(["0 file stage_dropped"]);
  expect((await officer.client.call("post", `${path}/commit`, { body: {} })).status).toBe(409);
  const again = await stage(officer, "people", text);
  expect(again).toMatchObject({ id, state: "ready", problems: [] });
  expect((await commit(officer, id)).counts).toMatchObject({ addedPeople: 1 });
});
