import { useCallback } from "react";
import { useSearchParams } from "react-router-dom";
import { FOLLOW_SHOWS } from "../../../../shared/contracts/follow-up.ts";
import { RoomPage } from "../../../components/layouts/room-page.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { Caution } from "../../../components/ui/caution.tsx";
import { EmptyState } from "../../../components/ui/empty-state.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { Pagination } from "../../../components/ui/pagination.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { formatCount, formatDay, formatNumber } from "../../../lib/formatters.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { type FollowUpAsk, useFollowUp } from "../api/use-follow-up.ts";
import { FollowList } from "../components/follow-list.tsx";
import { FollowTools } from "../components/follow-tools.tsx";

const sizes = [25, 50, 100];

/** What an address asks for; anything it cannot mean is left at its default. */
function readAsk(search: URLSearchParams): FollowUpAsk {
  const show = FOLLOW_SHOWS.find((one) => one === search.get("show")) ?? "due";
  const page = Math.trunc(Number(search.get("page")));
  const pageSize = Number(search.get("pageSize"));
  return {
    show,
    q: search.get("q") ?? "",
    sort: search.get("sort") ?? undefined,
    page: page >= 1 ? page : 1,
    pageSize: sizes.includes(pageSize) ? pageSize : 50,
  };
}

const empty: Record<FollowUpAsk["show"], string> = {
  due: "No contact is due today",
  all: "No contact with a day 0 is on record",
  ended: "No contact is past the last due day, and no follow-up was ended",
  without_day_zero: "Every contact has a day 0",
};

/** The Follow room: contacts with their due days, `/i/:investigationId/follow`. */
export function Component() {
  const { id: investigationId, monitoringDays } = useInvestigation();
  const [search, setSearch] = useSearchParams();
  const ask = readAsk(search);
  const { data, error, isPlaceholderData, refetch } = useFollowUp(investigationId, ask);

  const onChange = useCallback(
    (change: Partial<FollowUpAsk>) => {
      setSearch(
        (before) => {
          const next = new URLSearchParams(before);
          // Another list begins on its first page.
          if (!("page" in change)) next.delete("page");
          for (const [name, value] of Object.entries(change)) {
            if (value === "" || value === undefined) next.delete(name);
            else next.set(name, String(value));
          }
          return next;
        },
        { replace: true },
      );
    },
    [setSearch],
  );

  return (
    <RoomPage
      title="Follow"
      subLine={
        data
          ? `${formatDay(data.today, { style: "long" })} · due on days 1 to ${monitoringDays} after the last exposure`
          : undefined
      }
    >
      <Caution className="mb-3">
        A symptom report needs a person's action now. This system does not watch for emergencies;
        call local emergency services. Do not tell a contact who the case is.
      </Caution>
      <FollowTools ask={ask} onChange={onChange} />
      {error && !data ? (
        <ErrorState kind={errorKind(error)} onRetry={() => void refetch()} />
      ) : !data ? (
        <LoadingState label="Loading contacts under follow-up" rows={8} />
      ) : (
        <>
          {data.items.length === 0 ? (
            <EmptyState title={ask.q ? "No study number begins so in this list" : empty[ask.show]}>
              {ask.show === "without_day_zero"
                ? "Each last exposure is known to the day."
                : "A contact has due days once a last exposure is known to the day."}
            </EmptyState>
          ) : (
            <>
              <FollowList
                items={data.items}
                today={data.today}
                investigationId={investigationId}
                updating={isPlaceholderData}
              />
              <Pagination
                page={data.page}
                pageSize={data.pageSize}
                total={data.total}
                noun="contacts"
                pageSizes={sizes}
                onPageChange={(page) => onChange({ page })}
                onPageSizeChange={(pageSize) => onChange({ pageSize })}
              />
            </>
          )}
          {data.withoutDayZero > 0 && ask.show !== "without_day_zero" ? (
            <Notice tone="warn" title={`${formatNumber(data.withoutDayZero)} without a day 0:`}>
              {data.withoutDayZero === 1 ? "this contact has" : "these contacts have"} no last
              exposure day known to the day, so no due days. Ask the case again, or complete the
              exposure.{" "}
              <Button
                size="small"
                variant="plain"
                onClick={() => onChange({ show: "without_day_zero", q: "" })}
              >
                show them
              </Button>
            </Notice>
          ) : null}
          <p className="mt-3 text-sm text-ink-2">
            Completed is who was seen or spoken to on the last due day or after it; lost is who was
            not reached on {formatCount(data.lostAfterDays, "due day", "due days")} in a row.
          </p>
        </>
      )}
    </RoomPage>
  );
}
