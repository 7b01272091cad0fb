import type {
  HeadingsAnswer,
  Import,
  ImportReading,
  MatchedOn,
} from "../../../shared/contracts/imports.ts";
import { formatCount, formatNumber } from "../../lib/formatters.ts";

export const kindWords: Readonly<Record<Import["kind"], string>> = {
  people: "people",
  pairs: "contact pairs",
};

export const stateWords: Readonly<Record<Import["state"], string>> = {
  checking: "being checked",
  ready: "checked, not on record yet",
  refused: "refused",
  committing: "being put on record",
  committed: "on record",
  failed: "not finished",
};

/** A count of the import; one that it does not have is 0. */
export function countOf(one: Pick<Import, "counts">, key: string): number {
  return one.counts[key] ?? 0;
}

const rows = (count: number) => formatCount(count, "row", "rows");
const values = (count: number) => formatCount(count, "value", "values");
const people = (count: number) => formatCount(count, "person", "people");
const are = (count: number) => (count === 1 ? "is" : "are");

function peoplePreview(one: Import): string[] {
  const [fresh, known, filled, conflicts] = ["new", "known", "filled", "conflicts"].map((key) =>
    countOf(one, key),
  ) as [number, number, number, number];
  const out = [`${people(fresh)} would be added.`];
  if (known > 0) {
    out.push(
      `${people(known)} ${are(known)} on record already; blanks would be filled for ${formatNumber(filled)}.`,
    );
  }
  if (conflicts > 0) {
    out.push(
      `${values(conflicts)} ${conflicts === 1 ? "differs" : "differ"} from the record; the record stays as it is.`,
    );
  }
  return out;
}

function pairsPreview(one: Import): string[] {
  const good = countOf(one, "good");
  const repeated = countOf(one, "repeated");
  const unknown = countOf(one, "unknownRows");
  const refs = countOf(one, "unknownRefs");
  const out = [
    `${rows(good)} ${good === 1 ? "tells" : "tell"} of contacts between people on record.`,
  ];
  if (repeated > 0) out.push(`${rows(repeated)} of the file repeat another and add nothing.`);
  if (unknown > 0) {
    out.push(
      `${rows(unknown)} ${unknown === 1 ? "names" : "name"} ${formatCount(refs, "reference", "references")} not on record.`,
    );
  }
  return out;
}

/** What a checked file would do, in sentences. */
export function previewSentences(one: Import): string[] {
  const bad = countOf(one, "bad") - countOf(one, "unknownRows");
  const out = [`${rows(one.rows)} in the file.`];
  out.push(...(one.kind === "people" ? peoplePreview(one) : pairsPreview(one)));
  if (bad > 0)
    out.push(`${rows(bad)} ${bad === 1 ? "has an error" : "have errors"} and would be left out.`);
  const [aside, formulas] = [countOf(one, "setAside"), countOf(one, "formulas")];
  if (aside > 0) {
    out.push(
      `${rows(aside)} may be somebody on record or an earlier row; set aside, to be decided once the file is on record.`,
    );
  }
  if (formulas > 0) {
    out.push(
      `${formatCount(formulas, "cell begins", "cells begin")} like a formula; kept as plain text.`,
    );
  }
  return out;
}

const ADDED: readonly [key: string, one: string, many: string][] = [
  ["addedPeople", "person", "people"],
  ["addedPairs", "contact pair", "contact pairs"],
  ["addedExposures", "telling of a contact", "tellings of contacts"],
  ["addedTests", "test", "tests"],
  ["addedInterviews", "interview", "interviews"],
  ["addedPlaces", "place", "places"],
];

/** What a finished import did, in sentences. */
export function doneSentences(one: Import): string[] {
  const added = ADDED.flatMap(([key, single, many]) => {
    const count = countOf(one, key);
    return count > 0 ? [formatCount(count, single, many)] : [];
  });
  const out = [added.length > 0 ? `Added: ${added.join(", ")}.` : "Nothing was added."];
  const [filled, conflicts, repeated, skipped] = [
    "filledPeople",
    "conflicts",
    "repeated",
    "skipped",
  ].map((key) => countOf(one, key)) as [number, number, number, number];
  if (filled > 0) out.push(`Blanks were filled for ${people(filled)}.`);
  if (conflicts > 0) {
    out.push(
      `${values(conflicts)} ${conflicts === 1 ? "differs" : "differ"} from the record and ${conflicts === 1 ? "was" : "were"} not stored.`,
    );
  }
  if (repeated > 0) out.push(`${rows(repeated)} told what was on record already.`);
  if (skipped > 0)
    out.push(`${rows(skipped)} ${skipped === 1 ? "was" : "were"} left out because of errors.`);
  const [aside, same, other] = ["setAside", "same", "other"].map((key) => countOf(one, key)) as [
    number,
    number,
    number,
  ];
  if (aside > 0) {
    out.push(
      `${rows(aside)} ${aside === 1 ? "was" : "were"} set aside: ${formatNumber(same)} joined since, ${formatNumber(other)} added since, ${formatNumber(aside - same - other)} to decide.`,
    );
  }
  return out;
}

/** Rows that can be put on record, with or without people who are not on record yet. */
export function rowsToCommit(one: Import, createMissing: boolean): number {
  return countOf(one, "good") + (createMissing ? countOf(one, "unknownRows") : 0);
}

/** Where a refusal of a whole file points to, in words. */
export function placeOfError(path: string): string {
  const line = /^file\.line\.(\d+)$/.exec(path);
  if (line) return `Line ${line[1]}`;
  const byte = /^file\.line\.(\d+)\.byte\.(\d+)$/.exec(path);
  if (byte) return `Line ${byte[1]}, byte ${byte[2]} of the file`;
  if (path === "file.columns" || path === "columns") return "The columns";
  const choice = /^columns\.(\d+)$/.exec(path);
  if (choice) return `Column ${Number(choice[1]) + 1} of the first line`;
  const column = /^file\.columns\.(.+)$/.exec(path);
  if (!column) return "The file";
  return /^\d+$/.test(column[1] ?? "")
    ? `Column ${column[1]} of the first line`
    : `Column “${column[1]}”`;
}

const encodingWords: Readonly<Record<ImportReading["encoding"], string>> = {
  "utf-8": "UTF-8",
  "utf-16le": "UTF-16 (little end first)",
  "utf-16be": "UTF-16 (big end first)",
};

const delimiterWords: Readonly<Record<ImportReading["delimiter"], string>> = {
  comma: "commas",
  semicolon: "semicolons",
  tab: "tabs",
};

/** Encoding and separator of a file in a sentence. */
export function formWords(form: Pick<ImportReading, "encoding" | "mark" | "delimiter">): string {
  const mark = form.mark ? "with" : "without";
  return `Read as ${encodingWords[form.encoding]} ${mark} a byte-order mark, cells separated by ${delimiterWords[form.delimiter]}.`;
}

/** How a heading came to be taken for a column. */
export const howWords: Readonly<
  Record<ImportReading["columns"][number]["how"] | "unknown", string>
> = {
  exact: "as written",
  alike: "by a like word",
  chosen: "chosen by hand",
  left_out: "left out",
  unknown: "not known",
};

/** By position the column each column of a file is, or null for one that is left out. */
export type Mapping = readonly (string | null)[];

const requiredColumns: Readonly<Record<Import["kind"], readonly string[]>> = {
  people: ["ref"],
  pairs: ["ref_a", "ref_b"],
};

/** What keeps a choice of columns from being used: columns chosen twice, and ones nobody chose. */
export function mappingErrors(kind: Import["kind"], mapping: Mapping) {
  const twice = new Set<number>();
  mapping.forEach((column, at) => {
    if (column !== null && mapping.indexOf(column) < at) twice.add(at);
  });
  return { twice, missing: requiredColumns[kind].filter((column) => !mapping.includes(column)) };
}

/** The choice that the headings suggest. */
export function suggestedMapping(found: HeadingsAnswer): Mapping {
  return found.columns.map(({ column }) => column);
}

/** What makes a row doubtful, in words. */
export const matchedWords: Readonly<Record<MatchedOn, string>> = {
  phone_and_name: "same telephone, names that sound alike",
  name_and_birth_year: "same name, same year of birth",
  phone: "same telephone, a name is blank",
  name: "same name, nothing against it",
};

/** What a decision did. */
export function decidedWords(answer: {
  decided: number;
  waiting: number;
  conflicts: number;
}): string {
  const { decided, waiting, conflicts } = answer;
  const out = [`${rows(decided)} decided.`];
  if (conflicts > 0) {
    out.push(
      `${values(conflicts)} ${conflicts === 1 ? "differs" : "differ"} and ${conflicts === 1 ? "was" : "were"} not stored.`,
    );
  }
  if (waiting > 0) {
    out.push(
      `${rows(waiting)} ${waiting === 1 ? "waits" : "wait"} for an earlier row to be decided.`,
    );
  }
  return out.join(" ");
}
