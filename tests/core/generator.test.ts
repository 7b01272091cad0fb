import { createHash } from "node:crypto";
import { describe, expect, it } from "vitest";
import { generateOutbreak } from "../../drizzle/seed/generator/generate-outbreak.ts";
import type {
  Classification,
  Exposure,
  Outbreak,
  OutbreakOptions,
} from "../../drizzle/seed/generator/types.ts";

// Expected ranges are the story of the demo (some hundred cases, a thousand people, two groups that
// join in the last week, one quiet workplace); none is a published value.
const OPTIONS: OutbreakOptions = {
  seed: 9,
  lastDay: "2026-05-20",
  monitoringDays: 14,
  infectiousBefore: 2,
  infectiousAfter: 10,
  incubationMin: 2,
  incubationMax: 10,
  tracers: ["tracer-a", "tracer-b", "tracer-c"],
};
const SEEDS = [9, 1, 2, 3, 4, 5];
const outbreaks = new Map(SEEDS.map((seed) => [seed, generateOutbreak({ ...OPTIONS, seed })]));
const demo = outbreaks.get(9) as Outbreak;

const digest = (outbreak: Outbreak) =>
  createHash("sha256").update(JSON.stringify(outbreak)).digest("hex");
const pairOf = (row: Exposure) =>
  `${Math.min(row.personA, row.personB)}-${Math.max(row.personA, row.personB)}`;
const DAY = /^\d{4}-\d{2}-\d{2}$/;

function latestClassification(outbreak: Outbreak): Map<number, Classification> {
  return new Map(outbreak.classifications.map((row) => [row.personId, row.classification]));
}

/** Groups by plain flooding over neighbour lists, on purpose not the generator's union-find. */
function groupOf(rows: readonly Exposure[], start: number): Set<number> {
  const neighbours = new Map<number, number[]>();
  for (const { personA, personB } of rows) {
    neighbours.set(personA, [...(neighbours.get(personA) ?? []), personB]);
    neighbours.set(personB, [...(neighbours.get(personB) ?? []), personA]);
  }
  const group = new Set([start]);
  for (const person of group) for (const next of neighbours.get(person) ?? []) group.add(next);
  return group;
}

/** Pairs per person seen through the interviews by the end of a day (offset 0: local is UTC). */
function pairsPerPerson(outbreak: Outbreak, day: string): number {
  const { windowDays, populationAtRisk: n } = outbreak.story;
  const end = `${day}T23:59:59.999Z`;
  const from = new Date(Date.parse(day) - (windowDays - 1) * 86_400_000).toISOString().slice(0, 10);
  const interviewed = new Set(
    outbreak.interviews
      .filter((row) => row.outcome === "complete" || row.outcome === "partial")
      .filter((row) => row.recordedAt <= end)
      .map((row) => row.personId),
  );
  const seen = outbreak.exposures.filter(
    (row) =>
      row.recordedAt <= end &&
      (row.withdrawnAt === null || row.withdrawnAt > end) &&
      row.firstDay !== null &&
      row.lastDay !== null &&
      row.firstDay <= day &&
      row.lastDay >= from &&
      (interviewed.has(row.personA) || interviewed.has(row.personB)),
  );
  const i = interviewed.size;
  return ((n - 1) * new Set(seen.map(pairOf)).size) / ((i * (i - 1)) / 2 + i * (n - i));
}

describe("determinism", () => {
  it("gives the same bytes for the same options and others for another seed", () => {
    const again = generateOutbreak({ ...OPTIONS, seed: 9 });
    expect(digest(again)).toBe(digest(demo));
    expect(new Set([...outbreaks.values()].map(digest)).size).toBe(SEEDS.length);
  });

  it("moves every day with the last day and every instant with the time zone", () => {
    const east = generateOutbreak({ ...OPTIONS, timeZoneOffsetMinutes: 840 });
    expect(east.people.map((person) => person.onsetDate)).toEqual(
      demo.people.map((person) => person.onsetDate),
    );
    const [first, shifted] = [demo.people[0], east.people[0]];
    expect(Date.parse(first?.recordedAt ?? "") - Date.parse(shifted?.recordedAt ?? "")).toBe(
      840 * 60_000,
    );
    const later = generateOutbreak({ ...OPTIONS, lastDay: "2026-05-21" });
    expect(later.story.firstDay).toBe("2026-04-17");
    expect(demo.story.firstDay).toBe("2026-04-16");
  });

  it("refuses options the story cannot be told with", () => {
    const bad: Partial<OutbreakOptions>[] = [
      { people: 20 },
      { days: 5 },
      { tracers: [] },
      { lastDay: "20 May" },
      { lastDay: "2026-02-30" },
      { incubationMin: 10, incubationMax: 2 },
      { seed: 0.5 },
    ];
    for (const change of bad) {
      expect(() => generateOutbreak({ ...OPTIONS, ...change }), JSON.stringify(change)).toThrow(
        RangeError,
      );
    }
  });
});

describe.each(SEEDS)("rows of seed %i", (seed) => {
  const outbreak = outbreaks.get(seed) as Outbreak;
  const { people, places, interviews, exposures, story } = outbreak;
  const recorded = (id: number) => people[id]?.recordedAt ?? "9999";

  it("hold together: ids are positions, references exist and come first", () => {
    for (const list of [people, places, interviews, outbreak.districts]) {
      expect(list.every((row, index) => row.id === index)).toBe(true);
    }
    const areas = new Set(outbreak.districts.map((district) => district.name));
    expect(people.every((person) => areas.has(person.area))).toBe(true);
    const known = (placeId: number | null, at: string) =>
      placeId === null || (places[placeId]?.recordedAt ?? "9999") <= at;
    expect(people.every((row) => known(row.householdPlaceId, row.recordedAt))).toBe(true);
    for (const row of exposures) {
      expect(row.personA).not.toBe(row.personB);
      expect([row.personA, row.personB]).toContain(row.namedBy);
      expect(recorded(row.personA) <= row.recordedAt).toBe(true);
      expect(recorded(row.personB) <= row.recordedAt).toBe(true);
      expect(known(row.placeId, row.recordedAt)).toBe(true);
      if (row.interviewId === null) continue;
      const interview = interviews[row.interviewId];
      expect(interview?.personId).toBe(row.namedBy);
      expect(interview?.recordedAt).toBe(row.recordedAt);
      expect(["complete", "partial"]).toContain(interview?.outcome);
    }
    for (const list of [outbreak.classifications, outbreak.tests, outbreak.checks]) {
      expect(list.every((row) => recorded(row.personId) <= row.recordedAt)).toBe(true);
    }
    expect(outbreak.groupExposures.every((row) => interviews[row.interviewId])).toBe(true);
    const classified = latestClassification(outbreak);
    expect(people.every((person) => classified.has(person.id))).toBe(true);
  });

  it("are ordered by the time of recording, which ends with the story", () => {
    const lists = [
      places,
      people,
      outbreak.classifications,
      outbreak.tests,
      interviews,
      exposures,
      outbreak.groupExposures,
      outbreak.checks,
    ];
    for (const list of lists) {
      const times = list.map((row) => row.recordedAt);
      expect(times).toEqual([...times].sort());
      expect((times.at(-1) ?? "") <= "2026-05-20T18:00:00.000Z").toBe(true);
    }
  });

  it("keep the dates in their order and inside the story", () => {
    for (const row of exposures) {
      expect(row.firstDay === null).toBe(row.lastDay === null);
      if (row.firstDay === null || row.lastDay === null) continue;
      expect(row.firstDay >= story.firstDay && row.firstDay <= row.lastDay).toBe(true);
      expect(row.lastDay <= row.recordedAt.slice(0, 10)).toBe(true);
      expect(row.withdrawnAt === null || row.withdrawnAt > row.recordedAt).toBe(true);
    }
    for (const row of outbreak.groupExposures) {
      expect(row.firstDay >= story.firstDay).toBe(true);
      expect(row.lastDay <= row.recordedAt.slice(0, 10)).toBe(true);
      expect((row.countMin ?? 0) <= (row.countMax ?? 0)).toBe(true);
    }
    for (const row of outbreak.tests) {
      expect(row.result === "pending").toBe(row.resultDate === null);
      expect(row.resultDate === null || row.specimenDate <= row.resultDate).toBe(true);
    }
    for (const person of people) {
      if (person.onsetDate && DAY.test(person.onsetDate) && person.reportDate) {
        expect(person.onsetDate <= person.reportDate).toBe(true);
      }
      expect((person.isolationDate ?? "") <= story.lastDay).toBe(true);
      expect((person.outcomeDate ?? "") <= story.lastDay).toBe(true);
    }
    expect(interviews.every((row) => row.at < row.recordedAt)).toBe(true);
  });

  it("follow contacts only while they are due, once a day", () => {
    const seen = new Set<string>();
    const caseFrom = new Map<number, string>();
    for (const row of outbreak.classifications) {
      if (row.classification !== "contact" && !caseFrom.has(row.personId)) {
        caseFrom.set(row.personId, row.recordedAt.slice(0, 10));
      }
    }
    const lastExposure = new Map<number, string>();
    for (const row of exposures) {
      for (const id of [row.personA, row.personB]) {
        const day = row.lastDay ?? row.recordedAt.slice(0, 10);
        if (day > (lastExposure.get(id) ?? "")) lastExposure.set(id, day);
      }
    }
    for (const row of outbreak.checks) {
      const key = `${row.personId} ${row.day}`;
      expect(seen.has(key)).toBe(false);
      seen.add(key);
      expect(row.day > recorded(row.personId).slice(0, 10)).toBe(true);
      expect(row.day < (caseFrom.get(row.personId) ?? "9999")).toBe(true);
      const days = Date.parse(row.day) - Date.parse(lastExposure.get(row.personId) ?? "");
      expect(days).toBeLessThanOrEqual(14 * 86_400_000);
      expect(row.symptoms && row.result === "missed").toBe(false);
    }
  });

  it("tell the story in numbers", () => {
    const counts = [...latestClassification(outbreak).values()];
    const cases = counts.filter((c) => ["confirmed", "probable", "suspected"].includes(c)).length;
    expect(cases).toBe(story.casesOnRecord);
    expect(cases).toBeGreaterThanOrEqual(90);
    expect(cases).toBeLessThanOrEqual(160);
    expect(people.length).toBeGreaterThanOrEqual(930);
    expect(people.length).toBeLessThanOrEqual(1070);
    expect(story.populationAtRisk).toBeGreaterThan(people.length);
    const told = interviews.filter((row) => ["complete", "partial"].includes(row.outcome));
    expect(new Set(told.map((row) => row.personId)).size).toBeGreaterThanOrEqual(30);
    for (const outcome of ["refused", "unreachable", "attempted", "partial"] as const) {
      expect(interviews.some((row) => row.outcome === outcome)).toBe(true);
    }
    expect(outbreak.groupExposures.length).toBeGreaterThan(10);
    expect(story.lostContacts.length).toBeGreaterThan(3);
    expect(story.becameCases.length).toBeGreaterThan(20);
    expect(story.lateInterviews.length).toBeGreaterThan(0);
    expect(story.reclassified.length).toBeGreaterThan(10);
    expect(story.forgotten).toBeGreaterThan(50);
    expect(exposures.some((row) => row.withdrawnAt !== null)).toBe(true);
  });

  it("join two groups in the last week by one pair", () => {
    const { join } = story;
    expect(join).not.toBeNull();
    if (!join) return;
    expect(join.day >= "2026-05-13" && join.day <= "2026-05-19").toBe(true);
    const standing = exposures.filter(
      (row) =>
        row.recordedAt <= join.recordedAt &&
        (row.withdrawnAt === null || row.withdrawnAt > join.recordedAt),
    );
    const joinKey = `${Math.min(join.personA, join.personB)}-${Math.max(join.personA, join.personB)}`;
    const without = standing.filter((row) => pairOf(row) !== joinKey);
    expect(standing.length - without.length).toBe(1);
    const one = groupOf(without, join.personA);
    const other = groupOf(without, join.personB);
    expect(one.has(join.personB)).toBe(false);
    expect([one.size, other.size]).toEqual(join.sizes);
    expect(Math.min(one.size, other.size)).toBeGreaterThanOrEqual(20);
    expect(groupOf(standing, join.personA).size).toBe(one.size + other.size);
    expect(places[standing.at(-1)?.placeId ?? -1]?.name ?? "").not.toBe("");
  });

  it("leave one workplace quiet for more than two incubation periods, ready to be closed", () => {
    const { quiet } = story;
    expect(quiet).not.toBeNull();
    if (!quiet) return;
    expect(places[quiet.placeId]?.setting).toBe("workplace");
    expect(quiet.cases.length).toBeGreaterThanOrEqual(4);
    const group = groupOf(exposures, quiet.cases[0] ?? -1);
    const area = places[quiet.placeId]?.area;
    const there = new Set(people.filter((row) => row.area === area).map((row) => row.id));
    expect([...group].every((id) => there.has(id))).toBe(true);
    const closeBy = "2026-04-29"; // more than 20 days before the last day
    const latest = latestClassification(outbreak);
    for (const id of there) {
      if (latest.get(id) === "contact") continue;
      expect(quiet.cases).toContain(id);
      const onset = people[id]?.onsetDate ?? "";
      if (DAY.test(onset)) expect(onset <= closeBy).toBe(true);
      expect((people[id]?.reportDate ?? "") <= closeBy).toBe(true);
    }
    expect(quiet.lastCaseDay <= closeBy).toBe(true);
    expect(outbreak.tests.some((row) => there.has(row.personId) && row.result === "pending")).toBe(
      false,
    );
    const due = exposures.filter((row) => there.has(row.personA));
    expect(due.every((row) => (row.lastDay ?? "") <= "2026-05-05")).toBe(true);
    expect(story.lostContacts.some((id) => there.has(id))).toBe(false);
  });

  it("cross the threshold in the last week, as seen through the interviews", () => {
    for (const point of story.trail.slice(-8)) {
      expect(point.pairsPerPerson).toBeCloseTo(pairsPerPerson(outbreak, point.day), 10);
    }
    const last = story.trail.at(-1);
    expect(last?.day).toBe(story.lastDay);
    expect(last?.pairsPerPerson ?? 0).toBeGreaterThan(1);
    expect(last?.pairsPerPerson ?? 9).toBeLessThan(3);
    expect(story.crossingDay).not.toBeNull();
    const lowest = Math.min(...story.trail.slice(-8, -1).map((p) => p.pairsPerPerson ?? 9));
    expect(lowest).toBeLessThan(1);
  });
});

describe("other sizes", () => {
  it("makes 20,000 people and three pairs a person", () => {
    const load = generateOutbreak({ ...OPTIONS, people: 20_000 });
    expect(load.people.length).toBeGreaterThan(19_000);
    expect(load.people.length).toBeLessThan(21_000);
    const pairs = new Set(load.exposures.map(pairOf)).size;
    expect(pairs).toBeGreaterThan(57_000);
    expect(pairs).toBeLessThan(63_000);
    expect(load.story.join).not.toBeNull();
    expect(load.story.quiet).not.toBeNull();
  });

  it("honours the number of pairs, the length, the last minute and leaving checks out", () => {
    const wide = generateOutbreak({
      ...OPTIONS,
      people: 2000,
      pairsPerPerson: 2,
      days: 49,
      lastMinute: 600,
      followUpChecks: false,
    });
    expect(wide.checks).toEqual([]);
    expect(wide.story.firstDay).toBe("2026-04-02");
    expect(wide.people.every((row) => row.recordedAt <= "2026-05-20T10:00:00.000Z")).toBe(true);
    const pairs = new Set(wide.exposures.map(pairOf)).size;
    expect(pairs / wide.people.length).toBeGreaterThan(1.8);
    expect(pairs / wide.people.length).toBeLessThan(2.25);
  });
});
