import { afterAll, beforeAll, describe, expect, it } from "vitest";
import {
  DEFAULT_CASE_RULES,
  DEFAULT_EXPOSURE_GRADING,
  type SettingMeasure,
  settingsPreview,
} from "../../../shared/contracts/settings.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInAs } from "../../support/factories.ts";
import { asAdmin, contactRow, countRows, register, submit } from "../../support/field-work.ts";
import { ago, check } from "../../support/follow-desk.ts";

let app: TestApp;

beforeAll(async () => {
  app = await startTestApp();
});

afterAll(async () => {
  await app?.close();
});

/** An investigation with the usual settings: 2 before, 10 after, incubation 1–14, monitoring 14. */
async function desk(): Promise<{ supervisor: Member; officer: Member }> {
  const id = await buildInvestigation(app, { timeZone: "UTC" });
  return {
    supervisor: await signInAs(app, "supervisor", id),
    officer: await signInAs(app, "officer", id),
  };
}

async function preview(member: Member, change: Record<string, unknown>) {
  const answer = await member.client.call("post", `${member.base}/settings/preview`, {
    body: { version: 1, ...change },
  });
  expect(answer.status, answer.text).toBe(200);
  return settingsPreview.parse(answer.body);
}

/** Before and after of each measure, for a change of one setting. */
async function moves(member: Member, change: Record<string, unknown>) {
  const { moves: all } = await preview(member, change);
  for (const { setting } of all) expect(Object.keys(change)).toContain(setting);
  return Object.fromEntries(all.map((one) => [one.measure, [one.before, one.after]])) as Partial<
    Record<SettingMeasure, [number, number]>
  >;
}

async function tells(member: Member, personId: string, contacts: Record<string, unknown>[]) {
  const answer = await submit(member, personId, {
    contacts: contacts.map((row, at) => contactRow({ name: `Contact Number${at}`, ...row })),
  });
  expect(answer.status, answer.text).toBe(201);
}

describe("windows", () => {
  it("count pairs with a telling inside them", async () => {
    const { supervisor, officer } = await desk();
    // Infectious from 12 days ago; infection between 24 and 11 days ago.
    const source = await register(supervisor, { onsetDate: ago(10) });
    const days = (first: number, last = first) => ({
      firstExposure: ago(first),
      lastExposure: ago(last),
    });
    await tells(supervisor, source, [days(20), days(13), days(12), days(5), days(0), {}]);
    expect(await moves(supervisor, { infectiousBefore: 3 })).toEqual({ pairs_in_window: [3, 4] });
    expect(await moves(officer, { infectiousAfter: 4 })).toEqual({ pairs_in_window: [3, 1] });
    expect(await moves(officer, { incubationMin: 3 })).toEqual({ source_pairs_in_window: [3, 2] });
    expect(await moves(officer, { incubationMax: 9 })).toMatchObject({
      source_pairs_in_window: [3, 2],
    });
    // Both at once are what would be saved.
    const both = await preview(officer, { infectiousBefore: 3, infectiousAfter: 4 });
    expect(both.moves).toEqual([
      { setting: "infectiousBefore", measure: "pairs_in_window", before: 3, after: 2 },
      { setting: "infectiousAfter", measure: "pairs_in_window", before: 3, after: 2 },
    ]);
  });

  it("count from the first positive specimen without an onset, and end with isolation", async () => {
    const { supervisor } = await desk();
    const source = await register(supervisor, {
      specimenDate: ago(8),
      result: "positive",
      isolationDate: ago(6),
    });
    await tells(supervisor, source, [
      { lastExposure: ago(11) },
      { lastExposure: ago(9) },
      { lastExposure: ago(4) },
    ]);
    expect(await moves(supervisor, { infectiousBefore: 3 })).toEqual({ pairs_in_window: [1, 2] });
    expect(await moves(supervisor, { incubationMin: 3 })).toEqual({
      source_pairs_in_window: [0, 0],
    });
  });
});

describe("follow-up", () => {
  it("counts as the round lists", async () => {
    const { supervisor, officer } = await desk();
    const source = await register(supervisor);
    await tells(supervisor, source, [
      { lastExposure: ago(20) },
      { lastExposure: ago(14) },
      { lastExposure: ago(12) },
      { lastExposure: ago(3) },
      { lastExposure: ago(0) },
    ]);
    const contacts = await asAdmin<{ id: string; day: string }>(
      app,
      `select p.id, e.last_exposure as day from core.person p
       join core.contact_pair c on p.id in (c.person_a, c.person_b)
       join core.exposure e on e.pair_id = c.id
       where p.investigation_id = $1 and p.classification = 'contact'`,
      [supervisor.investigationId],
    );
    await asAdmin(
      app,
      `update core.person set recorded_at = now() - interval '30 days'
       where investigation_id = $1 and classification = 'contact'`,
      [supervisor.investigationId],
    );
    const of = (days: number) => contacts.find((one) => one.day === ago(days))?.id ?? "";
    // Reached four days ago, not since: two whole days missed by now, and a third by yesterday.
    await check(supervisor, of(12), { day: ago(4), outcome: "seen" });
    // Symptomatic long after the end, so due all the same; seen on its last day.
    await check(supervisor, of(20), { day: ago(6), outcome: "seen", symptoms: "yes" });
    // Without a day 0, so never due; at its end all the same, as the round lists it.
    const gone = await register(supervisor, { classification: "contact" });
    const end = `${supervisor.base}/follow-up/${gone}/end`;
    expect((await supervisor.client.post(end, { reason: "moved" }, true)).status).toBe(201);
    const listed = async (show: string) =>
      (await supervisor.client.get(`${supervisor.base}/follow-up`, { show })).body.total as number;
    const [due, ended] = [await listed("due"), await listed("ended")];
    const all = (await supervisor.client.get(`${supervisor.base}/follow-up`, { show: "all" })).body;
    const lost = all.items.filter((one: { state: string }) => one.state === "lost").length;
    expect([due, ended, lost]).toEqual([4, 2, 2]);
    expect(await moves(officer, { monitoringDays: 13 })).toEqual({
      contacts_due_today: [due, 3],
      follow_ups_ended: [ended, 3],
      follow_ups_lost: [lost, 2],
    });
    expect(await moves(officer, { lostAfterDays: 2 })).toEqual({ follow_ups_lost: [2, 3] });
    expect(await moves(officer, { lostAfterDays: 20 })).toEqual({ follow_ups_lost: [2, 0] });
  });
});

describe("clusters", () => {
  it("are proposed, counted and called quiet as the settings say", async () => {
    const { supervisor, officer } = await desk();
    const aCase = (days: number) => register(supervisor, { onsetDate: ago(days) });
    const [a, b, c] = [await aCase(60), await aCase(50), await aCase(40)];
    const [d, e] = [await aCase(20), await aCase(15)];
    const met = (personId: string) => ({ name: null, personId, lastExposure: ago(30) });
    await tells(supervisor, a, [met(b)]);
    await tells(supervisor, b, [met(c)]);
    await tells(supervisor, d, [met(e)]);
    expect(await moves(supervisor, { clusterWindowDays: 9 })).toEqual({
      proposed_clusters: [2, 1],
      cases_in_clusters: [5, 2],
    });
    expect(await moves(officer, { clusterMinimumCases: 3 })).toEqual({
      proposed_clusters: [2, 1],
      cases_in_clusters: [5, 3],
    });
    // Twice the longest incubation is 28 days until days are set.
    expect(await moves(officer, { closureDays: 15 })).toEqual({ clusters_quiet: [1, 2] });
    expect(await moves(officer, { closureDays: 16 })).toEqual({ clusters_quiet: [1, 1] });
    expect(await moves(officer, { incubationMax: 21 })).toMatchObject({ clusters_quiet: [1, 0] });
    const fixed = await moves(officer, { closureDays: 40, incubationMax: 21 });
    expect(fixed.clusters_quiet).toEqual([1, 1]);
  });
});

describe("grades", () => {
  it("count pairs of cases by their gravest telling", async () => {
    const { supervisor, officer } = await desk();
    const source = await register(supervisor, { onsetDate: ago(4) });
    await tells(supervisor, source, [
      { setting: "household" },
      { minutes: 20, distanceM: 1 },
      { minutes: 12, distanceM: 1 },
      { minutes: 20, distanceM: 3 },
      { minutes: null, distanceM: 1 },
    ]);
    const exposureGrading = { ...DEFAULT_EXPOSURE_GRADING, highMinutes: 10, highSettings: [] };
    expect(await moves(officer, { exposureGrading })).toEqual({
      pairs_high_risk: [2, 2],
      pairs_low_risk: [2, 1],
      pairs_grade_unknown: [1, 2],
    });
  });
});

describe("the case definition", () => {
  it("says how many would be classed otherwise, and reclassifies nobody", async () => {
    const { supervisor, officer } = await desk();
    const onset = { onsetDate: ago(4) };
    const positive = { specimenDate: ago(3), result: "positive" };
    const index = await register(supervisor, { ...positive, classification: "confirmed" });
    await register(supervisor, { ...onset, classification: "suspected" });
    await register(supervisor, { ...onset, classification: "confirmed" });
    await register(supervisor, { ...onset, classification: "not_a_case" });
    await register(supervisor, { onsetDate: "unknown", classification: "suspected" });
    await register(supervisor, { area: "North", classification: null });
    const linked = await register(supervisor, { ...onset, classification: "probable" });
    await tells(supervisor, index, [{ name: null, personId: linked }, { name: "Well Contact" }]);
    const caseRules = {
      ...DEFAULT_CASE_RULES,
      suspected: { laboratory: false, clinical: false, link: true },
    };
    const answer = await preview(officer, { caseRules });
    expect(answer.newCaseDefinition).toBe(true);
    // By the usual rules: one confirmed, one probable, two suspected; the confirmed without a test
    // and the suspected without an onset differ. With links for suspects: the linked contact is
    // one; she, both with an onset only, and the one with neither differ.
    expect(answer.moves.map((one) => [one.measure, one.before, one.after])).toEqual([
      ["cases_meeting_confirmed", 1, 1],
      ["cases_meeting_probable", 1, 1],
      ["cases_meeting_suspected", 2, 1],
      ["classes_that_differ", 2, 4],
    ]);
    const wording = await preview(officer, { caseDefinition: "Other words." });
    expect(wording).toEqual({ moves: [], newCaseDefinition: true });
    expect(await countRows(app, "case_definition", officer.investigationId)).toBe(1);
  });
});

describe("other settings", () => {
  it("another zone moves entries to another day", async () => {
    const { supervisor, officer } = await desk();
    await register(supervisor);
    await register(supervisor, { classification: null, area: "North" });
    for (const table of ["person", "classification"]) {
      await asAdmin(
        app,
        `update core.${table} set recorded_at = '2026-03-01T13:30:00Z' where investigation_id = $1`,
        [officer.investigationId],
      );
    }
    // Two people and one classification, at half past two in the night there.
    expect(await moves(officer, { timeZone: "Pacific/Auckland" })).toEqual({
      entries_on_another_day: [0, 3],
    });
    expect(await moves(officer, { timeZone: "Europe/Lisbon" })).toEqual({
      entries_on_another_day: [0, 0],
    });
  });

  it("what moves no count has no line, nor has what stays as it is", async () => {
    const { officer } = await desk();
    const answer = await preview(officer, {
      name: "Another",
      countryCode: "NZ",
      populationAtRisk: 5,
      smallCellThreshold: 10,
      infectiousBefore: 2,
      texts: [{ kind: "advice", language: "en", text: "Rest." }],
    });
    expect(answer).toEqual({ moves: [], newCaseDefinition: false });
  });

  it("counts nothing in an empty investigation, and stores nothing whatever is asked", async () => {
    const { officer } = await desk();
    const before = await countRows(app, "setting_change", officer.investigationId);
    const events = () =>
      asAdmin(app, "select 1 from audit.event where investigation_id = $1", [
        officer.investigationId,
      ]);
    const was = (await events()).length;
    const answer = await preview(officer, {
      infectiousBefore: 5,
      infectiousAfter: 5,
      incubationMin: 2,
      incubationMax: 9,
      monitoringDays: 9,
      lostAfterDays: 2,
      clusterWindowDays: 3,
      clusterMinimumCases: 5,
      closureDays: 3,
      timeZone: "Asia/Tokyo",
      exposureGrading: { ...DEFAULT_EXPOSURE_GRADING, highMinutes: 1 },
      symptoms: [{ code: "fever", label: "Fever" }],
      caseRules: { ...DEFAULT_CASE_RULES, confirmed: DEFAULT_CASE_RULES.probable },
    });
    expect(answer.moves.length).toBeGreaterThan(18);
    expect(answer.moves.filter((one) => one.before !== 0 || one.after !== 0)).toEqual([]);
    expect(await countRows(app, "setting_change", officer.investigationId)).toBe(before);
    expect((await events()).length).toBe(was);
    const { body } = await officer.client.get(`${officer.base}/settings`);
    expect(body.version).toBe(1);
  });
});
