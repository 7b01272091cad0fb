import { describe, expect, it } from "vitest";
import type { Person, PersonPage } from "../../shared/contracts/people.ts";
import { HIDDEN_AT_FIRST, peopleColumns } from "../../src/features/people/people-columns.tsx";
import { ILLNESS_FACTS, presentFacts, WHO_FACTS } from "../../src/features/people/person-facts.ts";
import { personMarkOf } from "../../src/features/people/person-mark-of.ts";
import { countWords, dayRange, personStrip } from "../../src/features/people/strip-rows.ts";
import { orderQueue } from "../../src/features/people/use-interview-queue.ts";

const today = "2026-05-27";

function person(changes: Partial<Person> = {}): Person {
  return {
    id: "p1",
    studyNumber: "AAA-0001",
    version: 1,
    recordedAt: "2026-05-20T08:00:00Z",
    ageBand: null,
    sex: null,
    area: null,
    householdNumber: null,
    classification: "contact",
    becameCase: false,
    onsetDate: null,
    specimenDate: null,
    resultDate: null,
    result: null,
    reportDate: null,
    interviewDate: null,
    interviewed: null,
    interviewState: null,
    isolationDate: null,
    outcome: null,
    outcomeDate: null,
    diedDate: null,
    can: {},
    ...changes,
  };
}

function page(changes: Partial<PersonPage> = {}): PersonPage {
  return {
    ...person(),
    windows: { infectious: null, source: null },
    monitoring: null,
    classifications: [],
    pairs: [],
    groupExposures: [],
    attempts: [],
    ...changes,
  };
}

const exposure = (
  first: string | null,
  last: string | null,
  setting: string | null = "social",
) => ({
  id: `e ${first} ${last}`,
  firstExposure: first,
  lastExposure: last,
  setting,
  place: null,
  minutes: null,
  distanceM: null,
  physical: null,
  indoors: null,
  recordedAt: "2026-05-20T08:00:00Z",
});

const pair = (id: string, exposures: ReturnType<typeof exposure>[], name?: string) => ({
  pairId: id,
  personId: `of ${id}`,
  studyNumber: `BBB-${id}`,
  ...(name ? { name } : {}),
  classification: "confirmed" as const,
  becameCase: false,
  exposures,
});

describe("days of a stored date", () => {
  it("are the day, the whole month, or none", () => {
    expect(dayRange("2026-05-18")).toEqual({
      from: "2026-05-18",
      to: "2026-05-18",
      partial: false,
    });
    expect(dayRange("2024-02")).toEqual({ from: "2024-02-01", to: "2024-02-29", partial: true });
    for (const none of [null, "unknown", "refused", "2026-02-30", "2026-13"]) {
      expect(dayRange(none), String(none)).toBeNull();
    }
  });
});

describe("the day strip of a person", () => {
  it("is left out where nothing has a day", () => {
    expect(personStrip(page(), today)).toBeNull();
  });

  it("lays windows, contacts and unnamed groups on one scale that holds today", () => {
    const strip = personStrip(
      page({
        classification: "confirmed",
        onsetDate: "2026-05-18",
        windows: {
          infectious: { from: "2026-05-16", to: "2026-05-22", basis: "onset" },
          source: { from: "2026-05-04", to: "2026-05-17" },
        },
        pairs: [pair("1", [exposure("2026-05-17", "2026-05-19", "household")])],
        groupExposures: [
          {
            id: "g",
            setting: "transport",
            place: "ferry",
            firstExposure: "2026-05-20",
            lastExposure: "2026-05-20",
            countMin: 10,
            countMax: 15,
          },
        ],
      }),
      today,
    );
    expect(strip?.rows.map((row) => row.type)).toEqual(["window", "window", "exposure", "group"]);
    expect(strip?.from).toBe("2026-05-02");
    expect(strip?.to).toBe("2026-05-29");
    expect(strip?.rows[1]).toMatchObject({ reference: { day: "2026-05-18", label: "onset" } });
    expect(strip?.rows[2]).toMatchObject({
      label: "BBB-1 · household",
      bars: [{ household: true, partial: false }],
    });
    expect(strip?.rows[3]).toMatchObject({ label: "not named, ferry", count: "10–15" });
  });

  it("draws uncertain days as uncertain and leaves out pairs without any", () => {
    const strip = personStrip(
      page({
        pairs: [
          pair("1", [exposure("2026-05", "2026-05")]),
          pair("2", [exposure("2026-05-20", null)]),
          pair("3", [exposure("unknown", null)]),
        ],
      }),
      today,
    );
    expect(strip?.rows).toHaveLength(2);
    expect(strip?.rows[0]).toMatchObject({
      bars: [{ from: "2026-05-01", to: "2026-05-31", partial: true }],
    });
    expect(strip?.rows[1]).toMatchObject({
      bars: [{ from: "2026-05-20", to: "2026-05-20", partial: true }],
    });
  });

  const monitoring = {
    dayZero: "2026-05-24",
    lastDueDay: "2026-05-28",
    dueDays: ["2026-05-25", "2026-05-26", "2026-05-27", "2026-05-28"],
    expectedFrom: "2026-05-25",
    state: "under_follow_up",
    outcomes: [{ day: "2026-05-25", outcome: "spoken" }],
  } as const;
  const copy = (over: object) =>
    ({ ...structuredClone(monitoring), ...over }) as unknown as PersonPage["monitoring"];
  const dueOf = (person: PersonPage) =>
    personStrip(person, today)?.rows.find((row) => row.type === "due");

  it("shows each due day with what is known of it and counts from day 0", () => {
    expect(dueOf(page({ monitoring: copy({}) }))).toMatchObject({
      label: "day 3 of 4",
      days: [
        { day: "2026-05-25", state: "seen" },
        { day: "2026-05-26", state: "missed" },
        { day: "2026-05-27", state: "due" },
        { day: "2026-05-28", state: "to_come" },
      ],
    });
  });

  it("keeps the checks of a contact who became a case, and no days to come", () => {
    const person = page({
      classification: "confirmed",
      becameCase: true,
      monitoring: copy({ state: "became_case" }),
    });
    expect(dueOf(person)).toMatchObject({
      label: "due days",
      days: [{ day: "2026-05-25", state: "seen" }],
    });
    expect(personMarkOf(person)).toEqual({ classification: "confirmed", wasContact: true });
  });

  it("draws the share of due days done in the mark, and says when it is broken", () => {
    const mark = (over: object) =>
      personMarkOf(page({ classification: "contact", monitoring: copy(over) }))?.followUp;
    expect(mark({})).toEqual({ share: 0.25, state: "active" });
    expect(mark({ state: "lost" })?.state).toBe("lost");
    expect(mark({ state: "completed" })?.state).toBe("completed");
  });

  it("names a neighbour only where the answer does", () => {
    const days = [exposure("2026-05-20", "2026-05-20")];
    const strip = personStrip(page({ pairs: [pair("1", days), pair("2", days, "Ada")] }), today);
    expect(strip?.rows.map((row) => row.label)).toEqual(["BBB-1 · social", "Ada · social"]);
  });

  it("says how many pairs it left out", () => {
    const many = Array.from({ length: 30 }, (_, i) =>
      pair(String(i), [exposure("2026-05-20", "2026-05-20")]),
    );
    expect(personStrip(page({ pairs: many }), today)?.leftOut).toBe(6);
  });
});

describe("numbers of people who could not be named", () => {
  it("are exact, a range, one-sided or unknown, and 0 is a number", () => {
    expect(countWords(12, 12)).toBe("12");
    expect(countWords(0, 5)).toBe("0–5");
    expect(countWords(10, null)).toBe("at least 10");
    expect(countWords(null, 20)).toBe("at most 20");
    expect(countWords(null, null)).toBe("unknown number");
  });
});

describe("facts and columns", () => {
  it("are those that the answer holds, whoever reads it", () => {
    const tracer = page({ name: "Ada", phone: null, household: "Shore 4", householdNumber: 7 });
    expect(presentFacts(WHO_FACTS, tracer).map(({ key }) => key)).toEqual([
      "name",
      "phone",
      "ageBand",
      "sex",
      "area",
      "household",
    ]);
    const masked = page({ nameMasked: "A. L.", phoneLast2: "42" });
    const keys = presentFacts(WHO_FACTS, masked).map(({ key }) => key);
    expect(keys).toContain("nameMasked");
    expect(keys).toContain("householdNumber");
    expect(keys).not.toContain("name");
    expect(presentFacts(ILLNESS_FACTS, masked)).toHaveLength(ILLNESS_FACTS.length);
  });

  it("sort by nothing that says who a person is", () => {
    const keys = new Set([
      ...Object.keys(person({ name: "A", phone: "1", ref: "R" })),
      "assignedTo",
    ]);
    const columns = peopleColumns({ keys, accountId: "me", timeZone: "UTC", names: new Map() });
    const sortable = columns.flatMap((column) => column.sortKey ?? []);
    for (const identity of ["name", "phone", "ref", "email", "birthDate"]) {
      expect(sortable).not.toContain(identity);
    }
    const ids = columns.map((column) => column.id);
    expect(ids).toContain("name");
    expect(HIDDEN_AT_FIRST.filter((id) => id === "name" || id === "studyNumber")).toEqual([]);
  });

  it("leave out what the answer does not hold", () => {
    const keys = new Set(Object.keys(person()));
    const ids = peopleColumns({ keys, accountId: "me", timeZone: "UTC", names: new Map() }).map(
      ({ id }) => id,
    );
    expect(ids).not.toContain("name");
    expect(ids).not.toContain("assignedTo");
    expect(ids).toContain("onsetDate");
  });
});

describe("the interview queue", () => {
  it("puts mine first, keeps the server's order and shows nobody twice", () => {
    const mine = [person({ id: "m", assignedTo: "me" })];
    const all = [
      person({ id: "a", assignedTo: "other" }),
      person({ id: "m", assignedTo: "me" }),
      person({ id: "n", assignedTo: "me" }),
      person({ id: "b", assignedTo: null }),
    ];
    expect(orderQueue(mine, all, "me").map((row) => [row.person.id, row.mine])).toEqual([
      ["m", true],
      ["n", true],
      ["a", false],
      ["b", false],
    ]);
  });
});
