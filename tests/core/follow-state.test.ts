import { describe, expect, it } from "vitest";
import { expectedSince, type FollowFacts, followState } from "../../shared/follow-state.ts";
import { FOLLOW_ENDS } from "../../shared/vocabulary.ts";

const facts = (over: Partial<FollowFacts>): FollowFacts => ({
  classification: "contact",
  ended: null,
  dayZero: "2026-03-01",
  monitoringDays: 5,
  today: "2026-03-05",
  expectedFrom: "2026-03-02",
  lostAfterDays: 3,
  checks: [],
  ...over,
});
const check = (day: string, outcome: FollowFacts["checks"][number]["outcome"]) => ({
  day,
  outcome,
});

describe("state of a follow-up", () => {
  it.each(FOLLOW_ENDS)("%s stands whatever the checks say", (ended) => {
    for (const checks of [
      [],
      [check("2026-03-06", "seen")],
      [check("2026-03-02", "not_reached")],
    ]) {
      expect(followState(facts({ ended, checks, today: "2026-03-09" }))).toBe(ended);
    }
  });

  it("becoming a case, or being found to be none, goes before a recorded end", () => {
    for (const ended of FOLLOW_ENDS) {
      expect(followState(facts({ ended, classification: "suspected" }))).toBe("became_case");
      expect(followState(facts({ ended, classification: "not_a_case" }))).toBe("not_a_contact");
    }
  });

  it("without a day 0 nobody is completed or lost", () => {
    const undated = { dayZero: null, today: "2026-04-01" };
    expect(followState(facts(undated))).toBe("to_be_notified");
    expect(followState(facts({ ...undated, checks: [check("2026-03-20", "not_reached")] }))).toBe(
      "to_be_notified",
    );
    expect(followState(facts({ ...undated, checks: [check("2026-03-20", "seen")] }))).toBe(
      "under_follow_up",
    );
    expect(followState(facts({ ...undated, ended: "moved" }))).toBe("moved");
  });

  it("the days while it was ended are not missed once it is reopened", () => {
    expect(followState(facts({}))).toBe("lost");
    const expectedFrom = expectedSince("2026-03-01", "2026-03-04");
    expect(expectedFrom).toBe("2026-03-04");
    expect(followState(facts({ expectedFrom }))).toBe("to_be_notified");
    expect(followState(facts({ expectedFrom, today: "2026-03-07" }))).toBe("lost");
  });

  it("reopening before somebody came on record changes nothing", () => {
    expect(expectedSince("2026-03-04", "2026-03-04")).toBe("2026-03-05");
    expect(expectedSince("2026-03-04", null)).toBe("2026-03-05");
  });
});
