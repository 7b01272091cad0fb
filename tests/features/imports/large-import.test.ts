import pg from "pg";
import { afterAll, beforeAll, expect, it } from "vitest";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInAs } from "../../support/factories.ts";
import { commit, stage } from "../../support/imports.ts";

const PEOPLE = 8_000;
const PAIRS = 24_000;

let app: TestApp;
let admin: pg.Client;
let supervisor: Member;
let id: string;

beforeAll(async () => {
  app = await startTestApp();
  admin = new pg.Client({ connectionString: app.adminUrl });
  await admin.connect();
  id = await buildInvestigation(app);
  supervisor = await signInAs(app, "supervisor", id);
});

afterAll(async () => {
  await admin.end();
  await app.close();
});

/** Whole numbers below `n`, the same ones each run (a linear congruence). */
function* numbers(n: number): Generator<number> {
  for (let state = 1; ; ) {
    state = (Math.imul(state, 1_664_525) + 1_013_904_223) >>> 0;
    yield Math.floor((state / 2 ** 32) * n);
  }
}

function peopleFile(): string {
  const rows = ["ref,name,phone,birth_date,household,classification,onset_date,result,interviewed"];
  for (let at = 0; at < PEOPLE; at++) {
    const phone = `07700 9${String(at % 100_000).padStart(5, "0")}`;
    const day = String((at % 28) + 1).padStart(2, "0");
    rows.push(
      at % 5 === 0
        ? `R${at},Given${at} Family${at % 900},${phone},19${10 + (at % 90)}-03-${day},Home ${at % 3000},confirmed,2026-01-${day},positive,yes`
        : `R${at},Given${at} Family${at % 900},${phone},19${10 + (at % 90)}-07,Home ${at % 3000},contact,,,`,
    );
  }
  return rows.join("\n");
}

function pairsFile(): { text: string; pairs: number } {
  const rows = ["ref_a,ref_b,first_exposure,setting,place,minutes"];
  const draw = numbers(PEOPLE);
  const next = () => draw.next().value as number;
  const pairs = new Set<number>();
  while (pairs.size < PAIRS) {
    const [a, b] = [next(), next()];
    const key = Math.min(a, b) * PEOPLE + Math.max(a, b);
    if (a === b || pairs.has(key)) continue;
    pairs.add(key);
    rows.push(
      `R${a},R${b},2026-01-${String((a % 28) + 1).padStart(2, "0")},social,Hall ${b % 300},15`,
    );
  }
  return { text: rows.join("\n"), pairs: pairs.size };
}

async function count(table: string): Promise<number> {
  const found = await admin.query(`select count(*)::int as n from ${table}`);
  return found.rows[0].n;
}

it("brings in 8,000 people and 24,000 pairs while others are served", async () => {
  const staged = await stage(supervisor, "people", peopleFile());
  expect(staged).toMatchObject({
    rows: PEOPLE,
    problemCount: 0,
    counts: { good: PEOPLE, new: PEOPLE },
  });
  const waits: number[] = [];
  let running = true;
  const asking = (async () => {
    while (running) {
      const started = performance.now();
      await fetch(`${app.origin}/healthz`);
      waits.push(performance.now() - started);
      await new Promise((resolve) => setTimeout(resolve, 5));
    }
  })();
  const { text, pairs } = pairsFile();
  const bring = async () => {
    const people = await commit(supervisor, staged.id);
    const stagedPairs = await stage(supervisor, "pairs", text);
    return { people, done: await commit(supervisor, stagedPairs.id) };
  };
  const { people, done } = await bring().finally(() => {
    running = false;
  });
  await asking;
  expect(people).toMatchObject({
    state: "committed",
    counts: {
      addedPeople: PEOPLE,
      addedTests: PEOPLE / 5,
      addedInterviews: PEOPLE / 5,
      addedPlaces: 3000,
    },
  });
  expect(done).toMatchObject({
    state: "committed",
    counts: { addedPairs: pairs, addedExposures: PAIRS, addedPlaces: 300, repeated: 0 },
  });
  expect(await count("core.person")).toBe(PEOPLE);
  expect(await count("identity.person")).toBe(PEOPLE);
  expect(await count("core.classification")).toBe(PEOPLE);
  expect(await count("core.contact_pair")).toBe(pairs);
  expect(await count("core.exposure")).toBe(PAIRS);
  expect(await count("identity.import_stage")).toBe(0);
  // Not a timing test: a held event loop would show as waits of many seconds.
  waits.sort((a, b) => a - b);
  expect(waits[Math.floor(waits.length * 0.95)]).toBeLessThan(3000);
}, 120_000);
