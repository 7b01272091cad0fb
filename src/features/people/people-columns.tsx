import type { ReactNode } from "react";
import type { Person } from "../../../shared/contracts/people.ts";
import type { DataColumn } from "../../components/data-table/data-column.ts";
import { Answer } from "../../components/ui/answer.tsx";
import { formatDay, formatInstant } from "../../lib/formatters.ts";
import { classificationWords, interviewWords, wordFor } from "../../lib/words.ts";
import { PersonLabel } from "./components/person-label.tsx";

type Key = keyof Person;

interface Spec {
  key: Key;
  header: string;
  cell: (person: Person) => ReactNode;
  sortKey?: string;
  numeric?: boolean;
  width?: number;
  pending?: (person: Person) => boolean;
}

const plain = (key: Key) => (person: Person) => <Answer value={person[key] as string | null} />;
const day = (key: Key) => (person: Person) => (
  <Answer value={person[key] as string | null} format={(value) => formatDay(String(value))} />
);
const coded = (key: Key, words: Record<string, string>) => (person: Person) => (
  <Answer value={person[key] as string | null} format={(value) => wordFor(words, String(value))} />
);

/** Every column there can be, in order. Which of them are shown is up to the keys of the answer. */
const SPECS: readonly Spec[] = [
  { key: "name", header: "Name", cell: plain("name"), width: 172 },
  { key: "nameMasked", header: "Name, masked", cell: plain("nameMasked") },
  { key: "phone", header: "Telephone", cell: plain("phone"), width: 148 },
  {
    key: "phoneLast2",
    header: "Telephone, last two",
    cell: (person) => <Answer value={person.phoneLast2} format={(value) => `… ${value}`} />,
  },
  { key: "emailMasked", header: "E-mail, masked", cell: plain("emailMasked") },
  { key: "ref", header: "Reference", cell: plain("ref") },
  {
    key: "classification",
    header: "Classification",
    sortKey: "classification",
    cell: coded("classification", classificationWords),
  },
  { key: "onsetDate", header: "Onset", sortKey: "onsetDate", cell: day("onsetDate"), width: 116 },
  { key: "reportDate", header: "Reported", sortKey: "reportDate", cell: day("reportDate") },
  { key: "birthYear", header: "Birth year", cell: plain("birthYear"), numeric: true },
  { key: "ageBand", header: "Age", sortKey: "ageBand", cell: plain("ageBand"), width: 96 },
  { key: "sex", header: "Sex", sortKey: "sex", cell: plain("sex"), width: 80 },
  { key: "area", header: "Area", sortKey: "area", cell: plain("area"), width: 128 },
  {
    key: "occupation",
    header: "Occupation",
    sortKey: "occupation",
    cell: plain("occupation"),
  },
  { key: "household", header: "Household", cell: plain("household") },
  {
    key: "householdNumber",
    header: "Household no.",
    numeric: true,
    cell: (person) => (
      <Answer kind="figure" reason="no household on record" value={person.householdNumber} />
    ),
  },
  {
    key: "specimenDate",
    header: "Specimen",
    sortKey: "specimenDate",
    cell: day("specimenDate"),
  },
  {
    key: "result",
    header: "Result",
    sortKey: "result",
    cell: coded("result", {}),
    width: 104,
    pending: (person) => person.result === "pending",
  },
  { key: "resultDate", header: "Day of result", sortKey: "resultDate", cell: day("resultDate") },
  {
    key: "interviewState",
    header: "Interview",
    sortKey: "interviewState",
    width: 112,
    cell: (person) =>
      person.interviewState ? (
        wordFor(interviewWords, person.interviewState)
      ) : (
        <span className="text-ink-2">{person.interviewed === "yes" ? "held" : "not begun"}</span>
      ),
  },
  {
    key: "interviewDate",
    header: "Interviewed on",
    sortKey: "interviewDate",
    cell: day("interviewDate"),
  },
  {
    key: "isolationDate",
    header: "Isolated since",
    sortKey: "isolationDate",
    cell: day("isolationDate"),
  },
  { key: "outcome", header: "Outcome", sortKey: "outcome", cell: coded("outcome", {}) },
  {
    key: "outcomeDate",
    header: "Day of outcome",
    sortKey: "outcomeDate",
    cell: day("outcomeDate"),
  },
];

/** Hidden until asked for, so that the first look fits a screen. */
export const HIDDEN_AT_FIRST: readonly string[] = [
  "ref",
  "emailMasked",
  "reportDate",
  "birthYear",
  "occupation",
  "household",
  "householdNumber",
  "specimenDate",
  "resultDate",
  "interviewDate",
  "isolationDate",
  "outcome",
  "outcomeDate",
  "recordedAt",
];

export type PeopleColumnsContext = {
  /** Keys that the answers carry for this role. */
  keys: ReadonlySet<string>;
  accountId: string;
  timeZone: string;
  /** Names of members by account and of teams by id, where the role may read them. */
  names: ReadonlyMap<string, string>;
};

/** Columns of the line list, made from what the answers carry. */
export function peopleColumns(context: PeopleColumnsContext): DataColumn<Person>[] {
  const { keys, accountId, timeZone, names } = context;
  const columns: DataColumn<Person>[] = [
    {
      id: "studyNumber",
      header: "Study number",
      sortKey: "studyNumber",
      hideable: false,
      rowHeader: true,
      width: 144,
      cell: (person) => <PersonLabel person={person} />,
    },
  ];
  for (const { key, ...spec } of SPECS) {
    if (keys.has(key)) columns.push({ id: key, ...spec });
  }
  if (keys.has("assignedTo")) {
    columns.push({
      id: "assignedTo",
      header: "Assigned to",
      width: 120,
      cell: ({ assignedTo, assignedTeam }) => {
        if (assignedTo === accountId) return "you";
        if (assignedTo) return names.get(assignedTo) ?? "a member";
        if (assignedTeam) return names.get(assignedTeam) ?? "a team";
        return <span className="text-ink-2">nobody</span>;
      },
    });
  }
  columns.push({
    id: "recordedAt",
    header: "Recorded",
    sortKey: "recordedAt",
    width: 168,
    cell: (person) => formatInstant(person.recordedAt, timeZone),
  });
  return columns;
}
