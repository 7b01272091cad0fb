import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import type { Import } from "../../../../shared/contracts/imports.ts";
import { paths } from "../../../app/paths.ts";
import type { DataColumn } from "../../../components/data-table/data-column.ts";
import { DataTable } from "../../../components/data-table/data-table.tsx";
import { EmptyState } from "../../../components/ui/empty-state.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { formatInstant, formatNumber } from "../../../lib/formatters.ts";
import { importsQuery } from "../api/list-imports.ts";
import { kindWords, stateWords } from "../import-words.ts";

const pageSize = 25;

function columnsIn(timeZone: string): DataColumn<Import>[] {
  return [
    {
      id: "recordedAt",
      header: "Brought",
      rowHeader: true,
      cell: (one) => formatInstant(one.recordedAt, timeZone),
    },
    { id: "state", header: "State", cell: (one) => stateWords[one.state] },
    { id: "kind", header: "Lists", cell: (one) => kindWords[one.kind] },
    { id: "rows", header: "Rows", numeric: true, cell: (one) => formatNumber(one.rows) },
    {
      id: "problems",
      header: "Problems",
      numeric: true,
      cell: (one) => formatNumber(one.problemCount),
    },
  ];
}

export type ImportListProps = { investigationId: string; timeZone: string };

/** Files brought in so far; each opens on its own page. */
export function ImportList({ investigationId, timeZone }: ImportListProps) {
  const [page, setPage] = useState(1);
  const [columns] = useState(() => columnsIn(timeZone));
  const imports = useQuery(importsQuery(investigationId, page, pageSize));
  return (
    <DataTable<Import>
      caption="Files brought in, newest first"
      hideCaption
      noun="files"
      columns={columns}
      rows={imports.data?.items ?? []}
      rowId={(one) => one.id}
      rowTo={(one) => paths.oneImport(investigationId, one.id)}
      total={imports.data?.total ?? 0}
      page={page}
      pageSize={pageSize}
      onPageChange={setPage}
      sort={null}
      onSortChange={() => {}}
      state={imports.data ? "ready" : imports.isError ? "error" : "loading"}
      updating={imports.isPlaceholderData}
      errorKind={errorKind(imports.error)}
      onRetry={() => void imports.refetch()}
      empty={
        <EmptyState title="No file was brought in yet">
          Checked files wait here for a day until they are put on record.
        </EmptyState>
      }
    />
  );
}
