import { useQuery } from "@tanstack/react-query";
import { useMemo, useState } from "react";
import { useSearchParams } from "react-router-dom";
import type { Export } from "../../../../shared/contracts/exports.ts";
import { DataTable } from "../../../components/data-table/data-table.tsx";
import { Section } from "../../../components/layouts/section.tsx";
import { ConfirmDialog } from "../../../components/ui/confirm-dialog.tsx";
import { EmptyState } from "../../../components/ui/empty-state.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { errorKind, errorWords } from "../../../lib/api-error.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { useSession } from "../../../lib/session-context.ts";
import { exportsQuery } from "../api/list-exports.ts";
import { useRemoveExport } from "../api/remove-export.ts";
import { exportColumns } from "../export-columns.tsx";
import { filterFromAddress } from "../filter-from-address.ts";
import { ExportForm } from "./export-form.tsx";
import { OwnFiles } from "./own-files.tsx";

const pageSize = 25;

/** Files taken out: asking for one, one's own, and the record of all that one may see. */
export function ExportsPanel() {
  const { id, timeZone } = useInvestigation();
  const { actingRole, accountId } = useSession();
  const [params, setParams] = useSearchParams();
  const [page, setPage] = useState(1);
  const [asked, setAsked] = useState<Export | null>(null);
  const remove = useRemoveExport(id);
  const newest = useQuery(exportsQuery(id, 1, pageSize));
  const shown = useQuery(exportsQuery(id, page, pageSize));
  const filter = useMemo(() => filterFromAddress(params), [params]);
  const columns = useMemo(
    () => exportColumns(timeZone, accountId, setAsked),
    [timeZone, accountId],
  );
  const mine = (newest.data?.items ?? []).filter(
    (one, at) =>
      one.accountId === accountId &&
      (one.can.download || one.state === "building" || (one.state === "failed" && at === 0)),
  );
  if (!actingRole || actingRole === "tracer") return <ErrorState kind="no-permission" />;

  function everybody() {
    const tab = params.get("tab");
    setParams(tab ? { tab } : {}, { replace: true });
  }
  // A file being made is stopped at a word; one that is there is asked about first.
  const end = (one: Export) => (one.state === "building" ? remove.mutate(one.id) : setAsked(one));
  return (
    <>
      <Section title="A new file">
        <ExportForm
          investigationId={id}
          role={actingRole}
          filter={filter}
          onEverybody={everybody}
        />
      </Section>
      {remove.isError && !asked ? (
        <Notice tone="error" title="Not ended." className="mb-4 max-w-3xl">
          {errorWords(remove.error)}.
        </Notice>
      ) : null}
      {mine.length > 0 ? (
        <Section title="Your files">
          <OwnFiles
            investigationId={id}
            timeZone={timeZone}
            files={mine}
            removing={remove.isPending ? remove.variables : undefined}
            onRemove={end}
          />
        </Section>
      ) : null}
      <Section
        title="Taken out so far"
        subLine={
          actingRole === "officer" ? "By everybody here." : "By you; a data officer sees all."
        }
      >
        <DataTable<Export>
          caption="Files taken out, newest first"
          hideCaption
          noun="files"
          columns={columns}
          rows={shown.data?.items ?? []}
          rowId={(one) => one.id}
          total={shown.data?.total ?? 0}
          page={page}
          pageSize={pageSize}
          onPageChange={setPage}
          sort={null}
          onSortChange={() => {}}
          state={shown.data ? "ready" : shown.isError ? "error" : "loading"}
          updating={shown.isPlaceholderData}
          errorKind={errorKind(shown.error)}
          onRetry={() => void shown.refetch()}
          empty={
            <EmptyState title="Nothing was taken out yet">
              Files can be fetched for a day; their entries stay here.
            </EmptyState>
          }
        />
      </Section>
      {asked ? (
        <ConfirmDialog
          open
          onOpenChange={(open) => {
            if (!open) setAsked(null);
          }}
          title={asked.state === "building" ? "Cancel this file?" : "Delete this file?"}
          description={`${asked.fileName} can then no longer be fetched. Copies that were fetched are not reached by this; the entry stays.`}
          confirmLabel={asked.state === "building" ? "Cancel the file" : "Delete the file"}
          danger
          pending={remove.isPending}
          onConfirm={() => remove.mutate(asked.id, { onSuccess: () => setAsked(null) })}
        >
          {remove.isError ? (
            <Notice tone="error" title="Not ended.">
              {errorWords(remove.error)}.
            </Notice>
          ) : null}
        </ConfirmDialog>
      ) : null}
    </>
  );
}
