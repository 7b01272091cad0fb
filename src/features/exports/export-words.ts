import type { Export, ExportFilter, ExportPurpose } from "../../../shared/contracts/exports.ts";
import { exportedIdentity, namesHouseholds } from "../../../shared/export-columns.ts";
import { accessTo } from "../../../shared/fields.ts";
import type { Role } from "../../../shared/roles.ts";
import { formatDay, formatNumber } from "../../lib/formatters.ts";
import { interviewWords } from "../../lib/words.ts";

export const kindWords: Readonly<Record<Export["kind"], string>> = {
  people: "line list",
  pairs: "contact pairs",
};

export const purposeWords: Readonly<Record<ExportPurpose, string>> = {
  analysis: "analysis elsewhere",
  handover: "hand-over to another team",
  laboratory: "matching with a laboratory",
  authority: "asked for by an authority",
  correction: "checking and correcting",
  other: "something else",
};

export const stateWords: Readonly<Record<Export["state"], string>> = {
  building: "being made",
  ready: "ready",
  cancelled: "cancelled",
  failed: "not made",
  deleted: "deleted",
  expired: "deleted after a day",
};

const keyWords: Readonly<Record<string, string>> = {
  ref: "references",
  name: "names",
  phone: "telephone numbers",
  email: "e-mail addresses",
  birthDate: "birth dates",
  address: "addresses",
};

function listed(words: readonly string[]): string {
  if (words.length < 2) return words.join("");
  return `${words.slice(0, -1).join(", ")} and ${words.at(-1)}`;
}

/** What a file with or without identity holds for a role, in one sentence. */
export function holdsWords(kind: Export["kind"], role: Role, identified: boolean): string {
  const households = namesHouseholds(role, identified) ? "by name" : "by number";
  const keys = kind === "pairs" ? exportedIdentity(role).slice(0, 1) : exportedIdentity(role);
  const who = identified
    ? `Holds ${listed(keys.map((key) => keyWords[key] ?? key))}`
    : "People stand by study number";
  const hidden =
    kind === "people" && accessTo("occupation", role) !== "full"
      ? " Columns your role may not read are there and blank."
      : identified || kind === "pairs"
        ? ""
        : " Columns that say who somebody is are there and blank.";
  return `${who}; households ${households}.${hidden}`;
}

const filterWords: Readonly<Record<string, string>> = {
  case: "cases",
  confirmed: "confirmed cases",
  probable: "probable cases",
  suspected: "suspected cases",
  not_a_case: "people who are no case",
  contact: "contacts",
};

const assignedWords: Readonly<Record<string, string>> = {
  me: "assigned to you",
  team: "assigned to your team",
  none: "assigned to nobody",
};

function spanWords(what: string, from?: string, to?: string): string {
  if (!from && !to) return "";
  const parts = [from ? `from ${formatDay(from)}` : "", to ? `to ${formatDay(to)}` : ""];
  return `${what} ${parts.filter(Boolean).join(" ")}`;
}

/** A filter in words; empty without one. */
export function narrowedWords(filter: ExportFilter): string {
  const { classification, interviewed, interviewState, assigned, followUp } = filter;
  const state =
    interviewState === "none" ? "not begun" : interviewState && interviewWords[interviewState];
  return [
    classification ? filterWords[classification] : "",
    interviewed === "yes" ? "interviewed" : interviewed === "no" ? "not interviewed" : "",
    state ? `interview ${state}` : "",
    assigned ? (assignedWords[assigned] ?? "assigned to one member") : "",
    followUp ? `${followUp === "yes" ? "with a" : "without any"} check of follow-up` : "",
    filter.needs ? "waiting for an interview" : "",
    filter.area ? "of one area" : "",
    spanWords("onset", filter.onsetFrom, filter.onsetTo),
    spanWords("reported", filter.reportFrom, filter.reportTo),
  ]
    .filter(Boolean)
    .join(", ");
}

/** What a file is, as the list says it. */
export function fileWords(one: Export): string {
  const narrowed = narrowedWords(one.filter);
  return `${kindWords[one.kind]}, ${one.identified ? "with identity" : "by study number"}${narrowed ? `; only ${narrowed}` : ""}`;
}

/** "12 KB", "3.4 MB". */
export function sizeWords(bytes: number): string {
  if (bytes < 1_000_000) return `${formatNumber(Math.max(1, Math.round(bytes / 1000)))} KB`;
  return `${formatNumber(bytes / 1_000_000, { decimals: 1 })} MB`;
}
