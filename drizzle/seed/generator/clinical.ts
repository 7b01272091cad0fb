import { type Calendar, DAY_MINUTES, dayOf } from "./calendar.ts";
import { itemAt } from "./item-at.ts";
import type { RecordBook } from "./records.ts";
import { createRng, type Rng } from "./rng.ts";
import type { CaseCourse } from "./spread.ts";
import { type Classification, type Person, REFUSED, type TestEntry, UNKNOWN } from "./types.ts";

/** A person tested on suspicion who turned out not to be a case. */
export interface Suspect {
  person: number;
  onsetDay: number;
  reportMinute: number;
  resultMinute: number;
  /** A first quick test said positive. */
  falseAlarm: boolean;
}

export interface ClassificationRow {
  personId: number;
  classification: Classification;
  minute: number;
}

export type TestRow = Omit<TestEntry, "recordedAt"> & { minute: number };

/** Classifications, tests, dates and outcomes of cases and suspects, as they come to be known. */
export interface Clinic {
  classifications: ClassificationRow[];
  tests: TestRow[];
  /** Minute from which a record is held as a case (or suspect), by person id. */
  caseSince: Map<number, number>;
  /** Records that ended as "not a case". */
  discarded: number[];
  classify(personId: number, classification: Classification, minute: number): void;
  admitCase(personId: number, course: CaseCourse, minute: number, age: number): void;
  admitSuspect(personId: number, suspect: Suspect, minute: number): void;
}

function tellOnset(rng: Rng, day: string): string {
  const roll = rng.next();
  if (roll < 0.03) return UNKNOWN;
  if (roll < 0.055) return day.slice(0, 7);
  return roll < 0.062 ? REFUSED : day;
}

/** The clinical side of the record book; rows later than the end of the story are left out. */
export function createClinic(seed: number, calendar: Calendar, book: RecordBook): Clinic {
  const rng = createRng(seed, 7);
  const classifications: ClassificationRow[] = [];
  const tests: TestRow[] = [];
  const caseSince = new Map<number, number>();
  const discarded: number[] = [];
  const lastDay = calendar.days - 1;

  function classify(personId: number, classification: Classification, minute: number) {
    if (minute <= calendar.end) classifications.push({ personId, classification, minute });
  }

  /** Records a test: with its result when that is in by the end, as pending otherwise. */
  function test(
    personId: number,
    specimenDay: number,
    kind: TestEntry["kind"],
    result: TestEntry["result"],
    resultMinute: number,
    entered: number,
  ) {
    if (entered > calendar.end) return;
    const known = resultMinute <= calendar.end;
    tests.push({
      personId,
      specimenDate: calendar.day(specimenDay),
      kind,
      result: known ? result : "pending",
      resultDate: known ? calendar.day(dayOf(resultMinute)) : null,
      minute: known ? Math.max(entered, resultMinute) : entered,
    });
  }

  function report(person: Person, reportMinute: number, isolationDay: number | null) {
    person.reportedAt = calendar.instant(reportMinute);
    person.reportDate = calendar.day(dayOf(reportMinute));
    if (isolationDay !== null && isolationDay <= lastDay && !rng.chance(0.05)) {
      person.isolationDate = calendar.day(isolationDay);
    }
  }

  function settleOutcome(person: Person, onsetDay: number, age: number) {
    const dies = rng.chance(age > 70 ? 0.12 : 0.004);
    const day = onsetDay + (dies ? rng.between(6, 15) : rng.between(10, 19));
    if (day >= lastDay) return;
    const roll = rng.next();
    if (!dies && roll < 0.12) return;
    person.outcome = dies ? "died" : roll < 0.17 ? "unknown" : "recovered";
    if (person.outcome !== "unknown") person.outcomeDate = calendar.day(day);
  }

  return {
    classifications,
    tests,
    caseSince,
    discarded,
    classify,
    admitCase(personId, course, minute, age) {
      const person = itemAt(book.people, personId);
      caseSince.set(personId, minute);
      report(person, course.reportMinute, course.isolationDay);
      person.onsetDate = course.symptomatic ? tellOnset(rng, calendar.day(course.onsetDay)) : null;
      settleOutcome(person, course.onsetDay, age);
      const { specimenDay } = course;
      // Somebody reported on a result has that result before the report.
      const resultMinute = course.reportedAsSuspected
        ? Math.max(course.resultDay * DAY_MINUTES + rng.between(9 * 60, 17 * 60), minute + 25)
        : course.reportMinute - 30;
      if (course.reportedAsSuspected) classify(personId, "suspected", minute);
      if (course.verdict === "confirmed") {
        const kind = rng.chance(0.7) ? "pcr" : "antigen";
        if (rng.chance(0.12) && specimenDay > course.onsetDay) {
          test(personId, specimenDay - 1, "antigen", "negative", resultMinute - 40, minute);
        }
        test(personId, specimenDay, kind, "positive", resultMinute, minute);
        classify(personId, "confirmed", course.reportedAsSuspected ? resultMinute : minute);
        return;
      }
      if (course.verdict === "open") {
        if (rng.chance(0.6))
          test(personId, specimenDay, "pcr", "inconclusive", resultMinute, minute);
        return;
      }
      const probable = minute + rng.between(300, 1800);
      classify(personId, "probable", probable);
      if (rng.chance(0.5)) test(personId, specimenDay, "pcr", "inconclusive", resultMinute, minute);
      if (rng.chance(0.3)) {
        const again = Math.max(probable, resultMinute) + rng.between(2, 4) * DAY_MINUTES;
        test(personId, dayOf(again) - 1, "pcr", "positive", again, again);
        classify(personId, "confirmed", again);
      }
    },
    admitSuspect(personId, suspect, minute) {
      const person = itemAt(book.people, personId);
      caseSince.set(personId, minute);
      const day = dayOf(suspect.reportMinute);
      report(person, suspect.reportMinute, rng.chance(0.4) ? day : null);
      person.onsetDate = tellOnset(rng, calendar.day(suspect.onsetDay));
      const result = Math.max(suspect.resultMinute, minute + 60);
      classify(personId, "suspected", minute);
      if (suspect.falseAlarm) {
        test(personId, day, "antigen", "positive", minute, minute);
        classify(personId, "confirmed", minute + 15);
      }
      test(personId, day, "pcr", "negative", result, minute);
      classify(personId, "not_a_case", result + 10);
      if (result + 10 <= calendar.end) discarded.push(personId);
    },
  };
}
