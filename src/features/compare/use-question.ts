import { useMemo } from "react";
import { useSearchParams } from "react-router-dom";
import type { NetworkSummary } from "../../../shared/contracts/network.ts";
import { dayNumber } from "../../lib/calendar-day.ts";
import type { NetworkQuestion } from "../../lib/network-summary-query.ts";

export type Population = NetworkSummary["population"];
export type CountedWindow = NetworkSummary["window"];

/** The question of the page and what is drawn; kept in the address, so that it can be sent on. */
export type CompareQuestion = {
  question: NetworkQuestion;
  drawn: Drawn;
};

/** What the picture draws. */
export type Drawn = {
  population: Population;
  /** Every exposure on record, as groups are counted in Review, or those of the figures above. */
  exposures: "all" | "question";
  /** Also people without a contact pair among what is drawn. */
  unpaired: boolean;
  /** Id of the only group that is drawn. */
  group: string | undefined;
};

const populations: readonly Population[] = ["all", "cases", "interviewed"];

const windows: readonly CountedWindow[] = ["preset", "all", "free"];

/**
 * Reads a question from an address; anything it does not know is left at its default. Interviewed
 * people are the default, because a verdict on everybody on record needs 90 % of them interviewed.
 */
export function readQuestion(search: URLSearchParams): CompareQuestion {
  const day = (name: string) => {
    const value = search.get(name);
    const real = value !== null && value >= "1900-01-01" && dayNumber(value) !== null;
    return real ? value : undefined;
  };
  return {
    question: {
      population: oneOf(populations, search.get("population")) ?? "interviewed",
      window: oneOf(windows, search.get("window")) ?? "preset",
      from: day("from"),
      to: day("to"),
      asOf: day("asOf"),
    },
    drawn: {
      population: oneOf(populations, search.get("drawn")) ?? "all",
      exposures: search.get("drawnExposures") === "question" ? "question" : "all",
      unpaired: search.get("unpaired") === "yes",
      group: search.get("group")?.slice(0, 64) || undefined,
    },
  };
}

/** A range that ends before it begins; it is not asked for. */
export function isReversed({ window, from, to }: NetworkQuestion): boolean {
  return window === "free" && from !== undefined && to !== undefined && from > to;
}

function oneOf<T extends string>(values: readonly T[], text: string | null): T | undefined {
  return values.find((value) => value === text);
}

/** What may be changed; undefined takes a key out of the address. */
export type QuestionChange = Partial<
  Record<
    | "population"
    | "window"
    | "from"
    | "to"
    | "asOf"
    | "drawn"
    | "drawnExposures"
    | "unpaired"
    | "group",
    string | undefined
  >
>;

/** The question in the address, and the way to change it without a step in the history. */
export function useQuestion(): [CompareQuestion, (change: QuestionChange) => void] {
  const [search, setSearch] = useSearchParams();
  const question = useMemo(() => readQuestion(search), [search]);
  function change(changes: QuestionChange) {
    setSearch(
      (current) => {
        const next = new URLSearchParams(current);
        for (const [name, value] of Object.entries(changes)) {
          if (value) next.set(name, value);
          else next.delete(name);
        }
        return next;
      },
      { replace: true, preventScrollReset: true },
    );
  }
  return [question, change];
}
