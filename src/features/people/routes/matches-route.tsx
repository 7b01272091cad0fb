import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import { Link } from "react-router-dom";
import { paths } from "../../../app/paths.ts";
import { RoomPage } from "../../../components/layouts/room-page.tsx";
import { EmptyState } from "../../../components/ui/empty-state.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { LinkButton } from "../../../components/ui/link-button.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { Pagination } from "../../../components/ui/pagination.tsx";
import { ScrollRegion } from "../../../components/ui/scroll-region.tsx";
import { Cell, HeadCell, Table } from "../../../components/ui/table.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { formatInstant } from "../../../lib/formatters.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { wordFor } from "../../../lib/words.ts";
import { matchReviewsQuery } from "../api/list-match-reviews.ts";

const matchWords = { phone: "telephone", name: "name", sound: "sound of the name" };
const pageSize = 50;

/** New people who may be on record already; the tracer who entered them could not be shown that. */
export function Component() {
  const { id, timeZone } = useInvestigation();
  const [page, setPage] = useState(1);
  const reviews = useQuery(matchReviewsQuery(id, page, pageSize));
  return (
    <RoomPage
      title="Possible duplicates"
      subLine="Entered by someone who may not see the other record."
      actions={<LinkButton to={paths.trace(id)}>Trace</LinkButton>}
    >
      {reviews.isPending ? <LoadingState label="Loading possible duplicates" rows={4} /> : null}
      {reviews.isError ? (
        <ErrorState kind={errorKind(reviews.error)} onRetry={() => void reviews.refetch()} />
      ) : null}
      {reviews.data?.items.length === 0 ? (
        <EmptyState title="No possible duplicates are waiting">
          When a tracer names somebody who looks like a person outside their sight, the two are
          listed here.
        </EmptyState>
      ) : null}
      {reviews.data && reviews.data.items.length > 0 ? (
        <>
          <ScrollRegion label="Table of possible duplicates">
            <Table caption="Two records that may be one person" hideCaption>
              <thead>
                <tr>
                  <HeadCell>entered now</HeadCell>
                  <HeadCell>on record already</HeadCell>
                  <HeadCell>alike in</HeadCell>
                  <HeadCell>since</HeadCell>
                </tr>
              </thead>
              <tbody>
                {reviews.data.items.map((one) => (
                  <tr key={one.id}>
                    <HeadCell scope="row">
                      <Link to={paths.person(id, one.personId)}>{one.studyNumber}</Link>
                    </HeadCell>
                    <Cell>
                      <Link to={paths.person(id, one.otherId)}>{one.otherStudyNumber}</Link>
                    </Cell>
                    <Cell>{one.matchedOn.map((what) => wordFor(matchWords, what)).join(", ")}</Cell>
                    <Cell>{formatInstant(one.recordedAt, timeZone)}</Cell>
                  </tr>
                ))}
              </tbody>
            </Table>
          </ScrollRegion>
          <Pagination
            page={page}
            pageSize={pageSize}
            total={reviews.data.total}
            onPageChange={setPage}
            noun="possible duplicates"
          />
        </>
      ) : null}
    </RoomPage>
  );
}
