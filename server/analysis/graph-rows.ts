import { dayNumber, MISSING_DAY } from "../../shared/core/index.ts";
import {
  classificationCode,
  type GraphStore,
  INTERVIEWED_ANSWER,
  NAMED_BY,
  type PersonColumns,
} from "./graph-store.ts";
import type { TextRow } from "./stream-rows.ts";

// Instants leave the database as whole milliseconds: cheaper to read than time stamps.
const ms = (expression: string) => `floor(date_part('epoch', ${expression}) * 1000)`;

/** Queries of the analysis on `core`; each is completed with a condition. */
export const GRAPH_SQL = {
  people: `select p.id, p.study_number, p.classification, p.interviewed, p.became_case,
      ${ms("p.recorded_at")}, ${ms("p.withdrawn_at")}
    from core.person p`,
  classified: `select c.person_id, c.classification, ${ms("c.recorded_at")}
    from core.classification c`,
  interviews: `select i.person_id, i.outcome, ${ms("i.recorded_at")}, ${ms("i.withdrawn_at")}
    from core.interview i`,
  groupExposures: `select g.person_id, g.first_exposure, g.last_exposure,
      ${ms("g.recorded_at")}, ${ms("g.withdrawn_at")}
    from core.group_exposure g`,
  exposures: `select cp.person_a, cp.person_b,
      case e.named_by when cp.person_a then 'a' when cp.person_b then 'b' end,
      e.first_exposure, e.last_exposure,
      ${ms("e.recorded_at")}, ${ms("least(e.withdrawn_at, cp.withdrawn_at)")}
    from core.exposure e join core.contact_pair cp on cp.id = e.pair_id`,
} as const;

const days = new Map<string, number>();

/** Number of a stored day; partial days and the words for "missing" are no day. */
export function storedDay(text: string | null | undefined): number {
  if (!text) return MISSING_DAY;
  const known = days.get(text);
  if (known !== undefined) return known;
  const day = dayNumber(text) ?? MISSING_DAY;
  // Some tens of thousands of different days at most can be written at all; the bound is a net.
  if (days.size < 50_000) days.set(text, day);
  return day;
}

const instant = (text: string | null | undefined) =>
  text == null ? Number.POSITIVE_INFINITY : Number(text);

function personOf(store: GraphStore, id: string | null | undefined): number {
  const person = id ? store.indexOf(id) : undefined;
  if (person === undefined) throw new Error("a row of the graph names nobody on record");
  return person;
}

/** A `people` row: number in the store, columns. */
export function readPerson(row: TextRow): [id: string, studyNumber: string, PersonColumns] {
  const [id, studyNumber, classification, interviewed, becameCase, recorded, withdrawn] = row;
  return [
    id ?? "",
    studyNumber ?? "",
    {
      recordedAt: instant(recorded),
      withdrawnAt: instant(withdrawn),
      classification: classificationCode(classification ?? null),
      interviewedAnswer:
        interviewed == null
          ? INTERVIEWED_ANSWER.blank
          : interviewed === "yes"
            ? INTERVIEWED_ANSWER.yes
            : INTERVIEWED_ANSWER.other,
      becameCase: becameCase === "t" ? 1 : 0,
    },
  ];
}

export function readClassified(store: GraphStore, row: TextRow) {
  const [person, classification, recorded] = row;
  return {
    person: personOf(store, person),
    code: classificationCode(classification ?? null),
    recordedAt: instant(recorded),
  };
}

export function readInterview(store: GraphStore, row: TextRow) {
  const [person, outcome, recorded, withdrawn] = row;
  return {
    person: personOf(store, person),
    complete: outcome === "complete" ? 1 : 0,
    recordedAt: instant(recorded),
    withdrawnAt: instant(withdrawn),
  };
}

export function readGroupExposure(store: GraphStore, row: TextRow) {
  const [person, first, last, recorded, withdrawn] = row;
  return {
    person: personOf(store, person),
    firstDay: storedDay(first),
    lastDay: storedDay(last),
    recordedAt: instant(recorded),
    withdrawnAt: instant(withdrawn),
  };
}

/** An `exposures` row; the pair is made when new. */
export function readExposure(store: GraphStore, row: TextRow) {
  const [idA, idB, namedBy, first, last, recorded, withdrawn] = row;
  const a = personOf(store, idA);
  const b = personOf(store, idB);
  // The database orders a pair by id, the store by number of entry.
  const low = (namedBy === "a") === a < b ? NAMED_BY.low : NAMED_BY.high;
  return {
    pair: store.pairs.findOrAdd(a, b),
    namedBy: namedBy == null ? NAMED_BY.unknown : low,
    firstDay: storedDay(first),
    lastDay: storedDay(last),
    recordedAt: instant(recorded),
    withdrawnAt: instant(withdrawn),
  };
}
