import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { Pagination } from "../../../components/ui/pagination.tsx";
import { ScrollRegion } from "../../../components/ui/scroll-region.tsx";
import { Cell, HeadCell, Table } from "../../../components/ui/table.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { formatInstant, formatNumber } from "../../../lib/formatters.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { caseDefinitionsQuery } from "../api/list-case-definitions.ts";
import { settingValueWords } from "../setting-words.ts";

const pageSize = 10;

/** The versions of the case definition, each with its day; classifications name their version. */
export function DefinitionVersions() {
  const { id, timeZone } = useInvestigation();
  const [page, setPage] = useState(1);
  const versions = useQuery(caseDefinitionsQuery(id, page, pageSize));
  if (versions.isPending) return <LoadingState label="Loading the versions" rows={2} />;
  if (versions.isError) {
    return <ErrorState kind={errorKind(versions.error)} onRetry={() => void versions.refetch()} />;
  }
  const { items, total } = versions.data;
  return (
    <div className="pt-4">
      <ScrollRegion label="Versions of the case definition, table">
        <Table caption="Versions of the case definition">
          <thead>
            <tr>
              <HeadCell numeric>version</HeadCell>
              <HeadCell>since</HeadCell>
              <HeadCell>wording</HeadCell>
              <HeadCell>rules</HeadCell>
            </tr>
          </thead>
          <tbody>
            {items.map((one) => (
              <tr key={one.number}>
                <HeadCell scope="row" numeric>
                  {formatNumber(one.number)}
                </HeadCell>
                <Cell className="sm:whitespace-nowrap max-sm:text-sm">
                  {formatInstant(one.recordedAt, timeZone)}
                </Cell>
                <Cell className="min-w-28 whitespace-pre-wrap sm:min-w-56 max-sm:text-sm">
                  {settingValueWords("caseDefinition", one.wording)}
                </Cell>
                <Cell className="min-w-24 whitespace-pre-wrap text-sm sm:min-w-56 text-ink-2">
                  {settingValueWords("caseRules", one.rules)}
                </Cell>
              </tr>
            ))}
          </tbody>
        </Table>
      </ScrollRegion>
      {total > pageSize ? (
        <Pagination {...{ page, pageSize, total }} noun="versions" onPageChange={setPage} />
      ) : null}
    </div>
  );
}
