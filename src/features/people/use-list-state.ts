import { useQueryClient } from "@tanstack/react-query";
import { useState } from "react";
import { useSearchParams } from "react-router-dom";
import { parseSortParameter, sortParameter } from "../../components/data-table/data-column.ts";
import { investigationKey } from "../../lib/query-keys.ts";
import { useSettled } from "../../lib/use-settled.ts";
import type { PeopleAsk } from "./api/list-people.ts";

export type CodedFilter = "classification" | "interviewed" | "assigned";
const coded: readonly CodedFilter[] = ["classification", "interviewed", "assigned"];

type Typed = { q: string; area: string };

/**
 * What the line list is asked for. Coded filters, order and page stand in the address; what is
 * typed stays in memory (it may be a name), also while a person's page is open.
 */
export function useListState(investigationId: string) {
  const queryClient = useQueryClient();
  const [params, setParams] = useSearchParams();
  const typedKey = investigationKey(investigationId, "people", "typed");
  const [typed, setTypedState] = useState<Typed>(
    () => queryClient.getQueryData<Typed>(typedKey) ?? { q: "", area: "" },
  );
  const settled = useSettled(typed);

  function set(changes: Record<string, string | undefined>) {
    setParams(
      (current) => {
        const next = new URLSearchParams(current);
        // Another question begins at its first page.
        if (!("page" in changes)) next.delete("page");
        for (const [name, value] of Object.entries(changes)) {
          if (value) next.set(name, value);
          else next.delete(name);
        }
        return next;
      },
      { replace: true },
    );
  }

  const filters = Object.fromEntries(
    coded.map((name) => [name, params.get(name) ?? undefined]),
  ) as Partial<Record<CodedFilter, string>>;
  const pageSize = Math.min(200, Number(params.get("pageSize")) || 50);
  const ask: PeopleAsk = {
    page: Math.max(1, Number(params.get("page")) || 1),
    pageSize,
    sort: params.get("sort") ?? undefined,
    q: settled.q.trim() || undefined,
    area: settled.area.trim() || undefined,
    ...filters,
  };
  const sort = parseSortParameter(params.get("sort"));

  return {
    ask,
    filters,
    typed,
    sort,
    anyFilter: Boolean(ask.q || ask.area || Object.values(filters).some(Boolean)),
    setTyped(next: Typed) {
      setTypedState(next);
      queryClient.setQueryData(typedKey, next);
      if (params.has("page")) set({});
    },
    setFilter: (name: CodedFilter, value: string) => set({ [name]: value }),
    setSort: (next: typeof sort) => set({ sort: sortParameter(next) }),
    setPage: (page: number) => set({ page: String(page) }),
    setPageSize: (size: number) => set({ pageSize: String(size) }),
    clear() {
      setTypedState({ q: "", area: "" });
      queryClient.removeQueries({ queryKey: typedKey });
      set(Object.fromEntries(coded.map((name) => [name, undefined])));
    },
  };
}
