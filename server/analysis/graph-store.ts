import { CLASSIFICATIONS } from "../../shared/vocabulary.ts";
import { type ColumnsOf, GrowingTable, type RowOf } from "./growing-table.ts";
import { OwnedRows } from "./owned-rows.ts";
import { PairIndex } from "./pair-index.ts";

const PEOPLE = {
  recordedAt: "float64",
  withdrawnAt: "float64",
  classification: "uint8",
  interviewedAnswer: "uint8",
  becameCase: "uint8",
} as const;
const CLASSIFIED = { person: "int32", code: "uint8", recordedAt: "float64" } as const;
const INTERVIEWS = {
  person: "int32",
  complete: "uint8",
  recordedAt: "float64",
  withdrawnAt: "float64",
} as const;
const GROUP_EXPOSURES = {
  person: "int32",
  firstDay: "int32",
  lastDay: "int32",
  recordedAt: "float64",
  withdrawnAt: "float64",
} as const;
const EXPOSURES = {
  pair: "int32",
  namedBy: "uint8",
  firstDay: "int32",
  lastDay: "int32",
  recordedAt: "float64",
  withdrawnAt: "float64",
} as const;

export type PersonColumns = RowOf<typeof PEOPLE>;
export type ClassifiedRow = RowOf<typeof CLASSIFIED>;
export type InterviewRow = RowOf<typeof INTERVIEWS>;
export type GroupExposureRow = RowOf<typeof GROUP_EXPOSURES>;
export type ExposureRow = RowOf<typeof EXPOSURES>;

/** Who told of a contact: the pair's lower-numbered person, the higher one, or not known. */
export const NAMED_BY = { low: 0, high: 1, unknown: 2 } as const;
/** What a person's own `interviewed` column says: blank, yes, or any other answer. */
export const INTERVIEWED_ANSWER = { blank: 0, yes: 1, other: 2 } as const;

/** Number that stands for a classification in columns; 0 is "not classified". */
export function classificationCode(classification: string | null): number {
  return (CLASSIFICATIONS as readonly (string | null)[]).indexOf(classification) + 1;
}

/** True for the codes of confirmed, probable and suspected cases. */
export function isCaseCode(code: number): boolean {
  return code >= 1 && code <= 3;
}

export const CONTACT_CODE = classificationCode("contact");

/**
 * What a worker reads: copies of a store's columns on shared memory, as they stood at one graph
 * version. Instants are ms since the epoch, `Infinity` = never withdrawn; days are day numbers.
 */
export type GraphSnapshot = {
  readonly version: number;
  readonly people: ColumnsOf<typeof PEOPLE>;
  readonly classified: ColumnsOf<typeof CLASSIFIED>;
  readonly interviews: ColumnsOf<typeof INTERVIEWS>;
  readonly groupExposures: ColumnsOf<typeof GROUP_EXPOSURES>;
  readonly pairs: { readonly a: Int32Array; readonly b: Int32Array };
  readonly exposures: ColumnsOf<typeof EXPOSURES>;
};

/**
 * The pseudonymous record of one investigation as columns of numbers: people in order of entry,
 * contact pairs, and each telling. It holds the past as well (when recorded, when withdrawn), so
 * that any figure can be run as of an instant. No names, no free text.
 */
export class GraphStore {
  /** Graph version that everything up to now belongs to. */
  version = 0;
  /** Zone whose days the investigation counts in. */
  timeZone = "UTC";
  readonly personIds: string[] = [];
  readonly studyNumbers: string[] = [];
  readonly #indexOf = new Map<string, number>();
  readonly people = new GrowingTable(PEOPLE);
  readonly classified = new OwnedRows(CLASSIFIED, "person");
  readonly interviews = new OwnedRows(INTERVIEWS, "person");
  readonly groupExposures = new OwnedRows(GROUP_EXPOSURES, "person");
  readonly pairs = new PairIndex();
  readonly exposures = new OwnedRows(EXPOSURES, "pair");

  /** Number of a person, or undefined when not on record. */
  indexOf(personId: string): number | undefined {
    return this.#indexOf.get(personId);
  }

  /** Adds a person or brings their columns up to date; returns their number. */
  putPerson(id: string, studyNumber: string, row: PersonColumns): number {
    const known = this.#indexOf.get(id);
    if (known !== undefined) {
      this.people.set(known, row);
      return known;
    }
    const person = this.people.push(row);
    this.personIds.push(id);
    this.studyNumbers.push(studyNumber);
    this.#indexOf.set(id, person);
    return person;
  }

  /** True while a person is on record (not withdrawn). */
  isOnRecord(person: number): boolean {
    return this.people.columns.withdrawnAt[person] === Number.POSITIVE_INFINITY;
  }

  /** True when a pair has a telling that stands and both its people are on record. */
  isHeld(pair: number): boolean {
    const { a, b } = this.pairs;
    if (!this.isOnRecord(a[pair] as number) || !this.isOnRecord(b[pair] as number)) return false;
    const { recordedAt, withdrawnAt } = this.exposures.columns;
    for (const k of this.exposures.of(pair)) {
      if (recordedAt[k] !== Number.POSITIVE_INFINITY && withdrawnAt[k] === Number.POSITIVE_INFINITY)
        return true;
    }
    return false;
  }

  /** Copies on shared memory; some 15 MB and 10 ms at 100,000 people with 300,000 pairs. */
  snapshot(): GraphSnapshot {
    return {
      version: this.version,
      people: this.people.shared(),
      classified: this.classified.shared(),
      interviews: this.interviews.shared(),
      groupExposures: this.groupExposures.shared(),
      pairs: this.pairs.shared(),
      exposures: this.exposures.shared(),
    };
  }
}
