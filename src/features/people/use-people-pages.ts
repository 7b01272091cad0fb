import { type UseQueryResult, useQueries, useQuery, useQueryClient } from "@tanstack/react-query";
import { useCallback, useMemo, useState } from "react";
import type { Person } from "../../../shared/contracts/people.ts";
import { investigationKey } from "../../lib/query-keys.ts";
import { useSettled } from "../../lib/use-settled.ts";
import {
  type PeopleList,
  type PeopleQuestion,
  peoplePageQuery,
  peopleQuery,
} from "./api/list-people.ts";

/** Rows asked for at once: about twice what a screen shows. */
export const pageSize = 50;
/** How long a page must stay in view before it is asked for, so that flying past asks for nothing. */
const stayMs = 90;

interface Range {
  first: number;
  last: number;
}

/** Numbers of the pages that a range of rows lies on, without the first, which is always asked for. */
export function pagesIn({ first, last }: Range, total: number): number[] {
  const from = Math.floor(first / pageSize) + 1;
  const to = Math.floor(Math.min(last, Math.max(0, total - 1)) / pageSize) + 1;
  const pages = Array.from({ length: Math.max(0, to - from + 1) }, (_, index) => from + index);
  return pages.filter((page) => page > 1).slice(0, 6);
}

/** What there is of several pages; the same object as long as the same is there. */
function together(results: readonly UseQueryResult<PeopleList>[]) {
  return {
    pages: results.flatMap((one) => one.data ?? []),
    error: results.find((one) => one.isError)?.error ?? null,
  };
}

/**
 * The answers to one question to the line list: its total, and its rows as far as their pages have
 * come into view. While the answer to a new question comes, the first rows of the last one stay.
 */
export function usePeoplePages(investigationId: string, question: PeopleQuestion) {
  const queryClient = useQueryClient();
  const [range, setRange] = useState<Range>({ first: 0, last: 0 });
  const settled = useSettled(range, stayMs);
  const head = useQuery(peopleQuery(investigationId, { page: 1, pageSize, ...question }));
  const total = head.data?.total ?? 0;
  const asked = head.isPlaceholderData ? [] : pagesIn(settled, total);
  const others = useQueries({
    queries: asked.map((page) => peoplePageQuery(investigationId, { page, pageSize, ...question })),
    combine: together,
  });

  const onRange = useCallback((first: number, last: number) => setRange({ first, last }), []);
  const head1 = head.data;
  function pageOf(page: number): PeopleList | undefined {
    if (page === 1) return head1;
    const { queryKey } = peoplePageQuery(investigationId, { page, pageSize, ...question });
    return head.isPlaceholderData ? undefined : queryClient.getQueryData(queryKey);
  }
  const rowAt = (index: number): Person | undefined =>
    pageOf(Math.floor(index / pageSize) + 1)?.items[index % pageSize];

  const rows = useMemo(
    () => [head1, ...others.pages].flatMap((page) => page?.items ?? []),
    [head1, others.pages],
  );
  return {
    total,
    rowAt,
    rows,
    onRange,
    state: head.data
      ? ("ready" as const)
      : head.isError
        ? ("error" as const)
        : ("loading" as const),
    updating: head.isPlaceholderData,
    error: head.error,
    /** A page further down that could not be read. */
    pageError: others.error,
    retry() {
      void head.refetch();
      void queryClient.refetchQueries({
        queryKey: investigationKey(investigationId, "people", "list"),
        predicate: (query) => query.state.status === "error",
      });
    },
  };
}
