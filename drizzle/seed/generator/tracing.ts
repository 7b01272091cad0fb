import { type Calendar, dayOf } from "./calendar.ts";
import { type Clinic, createClinic, type Suspect } from "./clinical.ts";
import { findCrossing } from "./crossing.ts";
import { describeEncounter, tellContacts } from "./encounters.ts";
import { tellGroupExposure } from "./group-exposure.ts";
import { type PlannedInterview, planInterviews, remainingWeights } from "./interview-plan.ts";
import { itemAt } from "./item-at.ts";
import { createPairLedger, type ExposureRow } from "./pair-ledger.ts";
import { createRecordBook, type RecordBook } from "./records.ts";
import { createRng } from "./rng.ts";
import type { CaseCourse } from "./spread.ts";
import type { Town } from "./town.ts";
import type { GroupExposure, Interview, OutbreakOptions } from "./types.ts";

export type InterviewRow = Omit<Interview, "at" | "recordedAt"> & { at: number; recorded: number };

export interface Traced {
  book: RecordBook;
  clinic: Clinic;
  interviews: InterviewRow[];
  exposures: ExposureRow[];
  groupExposures: GroupExposure[];
  duplicates: number[];
  lateInterviews: number[];
  /** Position in exposures of the pair that joined the two groups, or -1. */
  joining: number;
  forgotten: number;
}

type TracingOptions = OutbreakOptions & { people: number; pairsPerPerson: number };

type Event =
  | { minute: number; kind: "case"; index: number }
  | { minute: number; kind: "suspect"; suspect: Suspect }
  | { minute: number; kind: "interview"; plan: PlannedInterview; order: number };

/** Plays the work of the tracing team, one recorded event after the other. */
export function traceOutbreak(
  town: Town,
  options: TracingOptions,
  calendar: Calendar,
  cases: readonly CaseCourse[],
  suspects: readonly Suspect[],
): Traced {
  const rng = createRng(options.seed, 8);
  const book = createRecordBook(town, options.seed, calendar);
  const clinic = createClinic(options.seed, calendar, book);
  const plans = planInterviews(options.seed, calendar, cases);
  const rest = remainingWeights(plans);
  const targetPairs = options.people * options.pairsPerPerson;
  const capacity = Math.ceil(options.people * 1.6) + 1000;
  const ledger = createPairLedger(createRng(options.seed, 11), calendar, book, capacity);
  const told = new Map<number, Set<number>>();
  const doubled = new Set<number>();
  const interviews: InterviewRow[] = [];
  const groupExposures: GroupExposure[] = [];
  const lateInterviews: number[] = [];
  const infected: number[][] = cases.map(() => []);
  for (const [index, course] of cases.entries()) {
    if (course.source >= 0) itemAt(infected, course.source).push(index);
  }
  const knownShare = Math.max(targetPairs - options.people * 0.8, options.people * 0.1);
  const doubleRate = Math.min(0.3, (options.people * 0.016) / knownShare);
  // Most cases are named before their form arrives, hardly any suspect is.
  let formsLeft = cases.length * 0.35 + suspects.length;
  let forgotten = 0;
  let joining = -1;

  const events: Event[] = [
    ...cases.map((course, index): Event => {
      const late = rng.chance(0.04) ? rng.between(600, 1400) : 0;
      const minute = Math.min(course.reportMinute + rng.between(4, 40) + late, calendar.end);
      return { minute, kind: "case", index };
    }),
    ...suspects.map(
      (suspect): Event => ({ minute: suspect.reportMinute + 8, kind: "suspect", suspect }),
    ),
    ...plans.map(
      (plan, order): Event => ({ minute: plan.recorded, kind: "interview", plan, order }),
    ),
  ];
  const rank = { case: 0, suspect: 1, interview: 2 };
  events.sort((a, b) => a.minute - b.minute || rank[a.kind] - rank[b.kind]);

  for (const event of events) {
    if (event.kind === "case") admit(event.index, event.minute);
    else if (event.kind === "suspect") {
      formsLeft -= 1;
      const tracer = tracerFor(event.suspect.person);
      const id = book.register(event.suspect.person, event.minute, "form", tracer);
      clinic.admitSuspect(id, event.suspect, event.minute);
    } else interview(event.plan, event.order);
  }

  return {
    book,
    clinic,
    interviews,
    exposures: ledger.exposures,
    groupExposures,
    duplicates: [...doubled],
    lateInterviews,
    joining,
    forgotten,
  };

  function tracerFor(person: number): string {
    return itemAt(options.tracers, itemAt(town.district, person) % options.tracers.length);
  }

  function admit(index: number, minute: number): number {
    const course = itemAt(cases, index);
    const known = book.recordOf(course.person);
    if (known >= 0 && clinic.caseSince.has(known)) return known;
    formsLeft -= 0.35;
    const id = book.register(course.person, minute, "form", tracerFor(course.person));
    const person = itemAt(book.people, id);
    const fresh = dayOf(minute) === calendar.days - 1 && rng.chance(0.6);
    person.assignedTracer = fresh ? null : tracerFor(course.person);
    clinic.admitCase(id, course, minute, itemAt(town.age, course.person));
    const source = course.source < 0 ? -1 : book.recordOf(itemAt(cases, course.source).person);
    if (source >= 0 && rng.chance(0.08)) {
      const span = tellingFor(index, course.infectionDay, 1);
      const named = itemAt(book.townPerson, source);
      const met = describeEncounter(town, rng, span, named, course.infectionDay);
      ledger.expose(met, { teller: id, other: source, interviewId: null, minute });
    }
    return id;
  }

  function tellingFor(index: number, interviewDay: number, names: number) {
    const course = itemAt(cases, index);
    const from = Math.max(0, course.onsetDay - options.infectiousBefore);
    const until = Math.min(
      course.isolationDay,
      course.onsetDay + options.infectiousAfter,
      interviewDay,
    );
    const ties = itemAt(infected, index)
      .map((other) => itemAt(cases, other))
      .filter((other) => other.infectionDay <= interviewDay)
      .map((other) => ({ person: other.person, day: other.infectionDay, recall: 0.78 }));
    if (course.source >= 0) {
      const { person } = itemAt(cases, course.source);
      ties.push({ person, day: course.infectionDay, recall: 0.6 });
    }
    return {
      course,
      from: Math.min(from, until),
      until,
      interviewDay,
      names,
      newShare: 1,
      onRecord: (person: number) => book.recordOf(person) >= 0,
      ties,
      told: told.get(index) ?? new Set<number>(),
    };
  }

  function interview(plan: PlannedInterview, order: number): void {
    const course = itemAt(cases, plan.caseIndex);
    // A conversation can be entered before the form is: then the case is registered with it.
    const personId = admit(plan.caseIndex, Math.min(plan.recorded, calendar.end));
    const tracer = rng.chance(0.85) ? tracerFor(course.person) : rng.pick(options.tracers);
    const { at, recorded, outcome, channel } = plan;
    const id = interviews.length;
    interviews.push({ id, personId, at, recorded, tracer, outcome, channel });
    const interviewee = itemAt(book.people, personId);
    interviewee.assignedTracer ??= tracer;
    if (plan.late) lateInterviews.push(id);
    if (outcome !== "complete" && outcome !== "partial") return;
    const pairsLeft = Math.max(0, targetPairs - ledger.pairCount());
    const peopleLeft = options.people - book.people.length - formsLeft;
    const share = plan.weight / Math.max(itemAt(rest, order), 1e-9);
    const names = Math.min(
      Math.round(pairsLeft * share),
      Math.ceil((9 * targetPairs) / plans.length),
    );
    const telling = tellingFor(plan.caseIndex, dayOf(at), names);
    telling.newShare = Math.min(0.97, Math.max(0.03, peopleLeft / Math.max(1, pairsLeft)));
    const answer = tellContacts(town, rng, telling);
    forgotten += answer.forgotten;
    const mine = told.get(plan.caseIndex) ?? new Set<number>();
    told.set(plan.caseIndex, mine);
    for (const encounter of answer.encounters) {
      mine.add(encounter.person);
      const other = recordNamed(encounter.person, recorded, tracer);
      ledger.expose(encounter, { teller: personId, other, interviewId: id, minute: recorded });
    }
    // A week before the end one case of the main part names somebody from across the water.
    if (joining < 0 && dayOf(recorded) >= calendar.days - 8) {
      const crossing = findCrossing(town, rng, book, ledger, personId, telling);
      if (crossing) {
        const { other, encounter } = crossing;
        const entry = { teller: personId, other, interviewId: id, minute: recorded, lasting: true };
        joining = ledger.expose(encounter, entry);
      }
    }
    if (rng.chance(0.4)) {
      const teller = { interviewId: id, person: course.person, minute: recorded };
      groupExposures.push(tellGroupExposure(town, rng, calendar, book, teller, telling));
    }
  }

  function recordNamed(person: number, minute: number, tracer: string): number {
    const known = book.recordOf(person);
    if (known < 0) {
      const id = book.register(person, minute, "interview", tracer);
      clinic.classify(id, "contact", minute);
      return id;
    }
    const before = itemAt(book.people, known);
    if (before.phone?.startsWith("+") && !clinic.caseSince.has(known) && rng.chance(doubleRate)) {
      const id = book.registerAgain(known, minute, tracer);
      doubled.add(id);
      clinic.classify(id, "contact", minute);
      return id;
    }
    return known;
  }
}
