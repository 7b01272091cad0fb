import type { Import } from "../../../shared/contracts/imports.ts";
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
  const column = /^file\.columns\.(.+)$/.exec(path);
  if (!column) return "The file";
  return /^\d+$/.test(column[1] ?? "")
    ? `Column ${column[1]} of the first line`
    : `Column “${column[1]}”`;
}
