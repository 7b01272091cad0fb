import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import type { SettingChange } from "../../../../shared/contracts/settings.ts";
import { EmptyState } from "../../../components/ui/empty-state.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { Pagination } from "../../../components/ui/pagination.tsx";
import { ScrollRegion } from "../../../components/ui/scroll-region.tsx";
import { Cell, HeadCell, Table } from "../../../components/ui/table.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { formatInstant, formatNumber } from "../../../lib/formatters.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { settingChangesQuery } from "../api/list-setting-changes.ts";
import { listDifferences } from "../list-differences.ts";
import { settingLabel } from "../setting-notes.ts";
import { ChangeValue } from "./change-value.tsx";

const pageSize = 20;

/** Who changed which setting, when, from what, to what; the newest first. */
export function ChangeHistory() {
  const { id, timeZone } = useInvestigation();
  const [page, setPage] = useState(1);
  const changes = useQuery(settingChangesQuery(id, page, pageSize));
  if (changes.isPending) return <LoadingState label="Loading the changes" rows={3} />;
  if (changes.isError) {
    return <ErrorState kind={errorKind(changes.error)} onRetry={() => void changes.refetch()} />;
  }
  const { items, total } = changes.data;
  if (total === 0) {
    return (
      <EmptyState title="Nothing was changed yet">
        The settings are as they were when the investigation was opened.
      </EmptyState>
    );
  }
  return (
    <>
      <ScrollRegion label="History of changes, table">
        <Table caption="Changes of the settings, newest first">
          <thead>
            <tr>
              <HeadCell>when</HeadCell>
              <HeadCell>who</HeadCell>
              <HeadCell>setting</HeadCell>
              <HeadCell>from</HeadCell>
              <HeadCell>to</HeadCell>
            </tr>
          </thead>
          <tbody>
            {items.map((one) => (
              <ChangeRows key={one.id} change={one} zone={timeZone} />
            ))}
          </tbody>
        </Table>
      </ScrollRegion>
      {total > pageSize ? (
        <Pagination {...{ page, pageSize, total }} noun="changes" onPageChange={setPage} />
      ) : null}
    </>
  );
}

function ChangeRows({ change, zone }: { change: SettingChange; zone: string }) {
  const span = change.changes.length;
  return change.changes.map(({ setting, from, to }, index) => {
    const lines = listDifferences(setting, from, to);
    return (
      <tr key={setting}>
        {index === 0 ? (
          <>
            <HeadCell scope={span > 1 ? "rowgroup" : "row"} rowSpan={span} className="align-top">
              <span className="block whitespace-nowrap">
                {formatInstant(change.recordedAt, zone)}
              </span>
              <span className="block text-sm text-ink-2">
                version {formatNumber(change.version)}
              </span>
            </HeadCell>
            <Cell rowSpan={span} className="align-top">
              {change.by ?? <span className="whitespace-nowrap text-ink-2 italic">not shown</span>}
            </Cell>
          </>
        ) : null}
        <Cell className={`min-w-36 ${index > 0 ? "ps-2!" : ""}`}>{settingLabel(setting)}</Cell>
        {lines && lines.length > 0 ? (
          <Cell colSpan={2} className="min-w-56">
            {lines.join("; ")}
          </Cell>
        ) : (
          <>
            <Cell className="min-w-40 text-ink-2 wrap-anywhere">
              <ChangeValue setting={setting} value={from} />
            </Cell>
            <Cell className="min-w-40 wrap-anywhere">
              <ChangeValue setting={setting} value={to} />
            </Cell>
          </>
        )}
      </tr>
    );
  });
}
