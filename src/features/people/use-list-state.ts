import { useQueryClient } from "@tanstack/react-query";
import { useMemo, useState } from "react";
import { useSearchParams } from "react-router-dom";
import type { SavedQuestion } from "../../../shared/contracts/people-filters.ts";
import { parseSortParameter, sortParameter } from "../../components/data-table/data-column.ts";
import { investigationKey } from "../../lib/query-keys.ts";
import { useSettled } from "../../lib/use-settled.ts";
import { type PeopleQuestion, withoutBlanks } from "./api/list-people.ts";

/** Filters that stand in the address; the area is typed, and stays in memory with the search. */
export const CODED = [
  "classification",
  "interviewed",
  "interviewState",
  "assigned",
  "followUp",
  "onsetFrom",
  "onsetTo",
  "reportFrom",
  "reportTo",
] as const;
export type CodedFilter = (typeof CODED)[number];

type Typed = { q: string; area: string };

/** Waited after the last key before the server is asked. */
export const typingPauseMs = 120;

/**
 * What the line list is asked for. Coded filters and order stand in the address; what is typed stays
 * in memory (it may be a name), also while a person's page is open, and so does where the list was
 * left.
 */
export function useListState(investigationId: string) {
  const queryClient = useQueryClient();
  const [params, setParams] = useSearchParams();
  const typedKey = investigationKey(investigationId, "people", "typed");
  const placeKey = investigationKey(investigationId, "people", "place");
  const [typed, setTypedState] = useState<Typed>(
    () => queryClient.getQueryData<Typed>(typedKey) ?? { q: "", area: "" },
  );
  const settled = useSettled(typed, typingPauseMs);

  function set(changes: Record<string, string | undefined>) {
    setParams(
      (current) => {
        const next = new URLSearchParams(current);
        for (const [name, value] of Object.entries(changes)) {
          if (value) next.set(name, value);
          else next.delete(name);
        }
        return next;
      },
      { replace: true },
    );
  }
  function keepTyped(next: Typed) {
    setTypedState(next);
    queryClient.setQueryData(typedKey, next);
  }

  const address = params.toString();
  const question = useMemo((): PeopleQuestion => {
    const given = new URLSearchParams(address);
    return {
      sort: given.get("sort") ?? undefined,
      q: settled.q.trim() || undefined,
      area: settled.area.trim() || undefined,
      ...Object.fromEntries(CODED.map((name) => [name, given.get(name) ?? undefined])),
    };
  }, [address, settled]);
  const { sort: _order, ...filters } = question;
  const key = JSON.stringify(withoutBlanks(question));
  const sort = parseSortParameter(question.sort);

  return {
    question,
    /** Names the question, to tell when it changes. */
    key,
    filters,
    typed,
    sort,
    anyFilter: Object.values(filters).some(Boolean),
    setTyped: keepTyped,
    setFilter: (name: CodedFilter, value: string) => set({ [name]: value }),
    setSort: (next: typeof sort) => set({ sort: sortParameter(next) }),
    clear() {
      keepTyped({ q: "", area: "" });
      set(Object.fromEntries(CODED.map((name) => [name, undefined])));
    },
    /** Asks a saved question instead of the present one; what was typed is not part of either. */
    apply(saved: SavedQuestion) {
      keepTyped({ q: "", area: saved.area ?? "" });
      set({
        ...Object.fromEntries(CODED.map((name) => [name, saved[name]])),
        sort: saved.sort,
      });
    },
    /** The row at the top of the list when it was left, if it asks the same now. */
    firstRow(): number {
      const left = queryClient.getQueryData<{ key: string; row: number }>(placeKey);
      return left?.key === key ? left.row : 0;
    },
    keepFirstRow(row: number) {
      queryClient.setQueryData(placeKey, { key, row });
    },
  };
}
export type ListState = ReturnType<typeof useListState>;
