import type { UseQueryResult } from "@tanstack/react-query";
import { useState } from "react";
import { errorKind } from "../../lib/api-error.ts";

/** Which page of a list is shown, and how long a page is. */
export function usePages() {
  const [page, setPage] = useState(1);
  const [pageSize, setPageSize] = useState(50);
  return {
    page,
    pageSize,
    onPageChange: setPage,
    onPageSizeChange(size: number) {
      setPageSize(size);
      setPage(1);
    },
  };
}

/** What a table in the server's own order is given of its list and its pages. */
export function pagedTable<T>(
  list: UseQueryResult<{ items: T[]; total: number }>,
  pages: ReturnType<typeof usePages>,
) {
  const state: "ready" | "error" | "loading" = list.data
    ? "ready"
    : list.isError
      ? "error"
      : "loading";
  return {
    ...pages,
    rows: list.data?.items ?? [],
    total: list.data?.total ?? 0,
    sort: null,
    onSortChange: () => {},
    state,
    updating: list.isPlaceholderData,
    errorKind: errorKind(list.error),
    onRetry: () => void list.refetch(),
  };
}
