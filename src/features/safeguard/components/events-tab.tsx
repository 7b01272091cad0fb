import { useQuery } from "@tanstack/react-query";
import { useEffect, useMemo, useState } from "react";
import type { AccessEvent } from "../../../../shared/contracts/safeguard.ts";
import { EVENTS } from "../../../../shared/events.ts";
import { DataTable } from "../../../components/data-table/data-table.tsx";
import { TextField } from "../../../components/fields/text-field.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { EmptyState } from "../../../components/ui/empty-state.tsx";
import { MenuSelect } from "../../../components/ui/menu-select.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { membersQuery } from "../../../lib/members-query.ts";
import { accessEventsQuery, type EventsAsk } from "../api/access-events.ts";
import { eventColumns } from "../event-columns.tsx";
import { actionWords } from "../safeguard-words.ts";

const settleMs = 350;
const everything: EventsAsk = { page: 1, pageSize: 50, studyNumber: "", action: "", accountId: "" };
const actionOptions = [
  { value: "", label: "anything" },
  ...EVENTS.map((value) => ({ value, label: actionWords[value] })).sort((a, b) =>
    a.label.localeCompare(b.label),
  ),
];

/** Accounts to choose from: members of today, and who stands on the page that is open. */
function useAccounts(investigationId: string, items: readonly AccessEvent[]) {
  const members = useQuery(membersQuery(investigationId, 1, 200));
  return useMemo(() => {
    const names = new Map<string, string>();
    for (const event of items) {
      if (event.accountId && event.displayName) names.set(event.accountId, event.displayName);
    }
    for (const one of members.data?.items ?? []) names.set(one.accountId, one.displayName);
    return [...names]
      .map(([value, label]) => ({ value, label }))
      .sort((a, b) => a.label.localeCompare(b.label));
  }, [members.data, items]);
}

/** The access record: who looked at or changed what, newest first. */
export function EventsTab() {
  const { id, timeZone } = useInvestigation();
  const [ask, setAsk] = useState(everything);
  const [typed, setTyped] = useState("");
  useEffect(() => {
    const timer = setTimeout(() => {
      setAsk((now) => (now.studyNumber === typed ? now : { ...now, studyNumber: typed, page: 1 }));
    }, settleMs);
    return () => clearTimeout(timer);
  }, [typed]);
  const events = useQuery(accessEventsQuery(id, ask));
  const items = events.data?.items ?? [];
  const accounts = useAccounts(id, items);
  const columns = useMemo(() => eventColumns(id, timeZone), [id, timeZone]);
  const filtered = ask.studyNumber.trim() !== "" || ask.action !== "" || ask.accountId !== "";
  const change = (next: Partial<EventsAsk>) => setAsk((now) => ({ ...now, page: 1, ...next }));
  const clear = () => {
    setTyped("");
    setAsk({ ...everything, pageSize: ask.pageSize });
  };
  return (
    <DataTable<AccessEvent>
      caption="Access events, newest first"
      noun="events"
      columns={columns}
      rows={items}
      rowId={(event) => event.id}
      total={events.data?.total ?? 0}
      page={ask.page}
      pageSize={ask.pageSize}
      onPageChange={(page) => change({ page })}
      onPageSizeChange={(pageSize) => change({ pageSize })}
      sort={null}
      onSortChange={() => {}}
      state={events.data ? "ready" : events.isError ? "error" : "loading"}
      updating={events.isPlaceholderData}
      errorKind={errorKind(events.error)}
      onRetry={() => void events.refetch()}
      empty={
        filtered ? (
          <EmptyState
            title="No event fits"
            action={<Button onClick={clear}>Show all events</Button>}
          >
            A study number has to be given whole.
          </EmptyState>
        ) : (
          <EmptyState title="Nothing is on record yet">
            Each command, and each look at an identity, will stand here.
          </EmptyState>
        )
      }
      tools={
        <>
          <TextField
            label="Person"
            placeholder="study number"
            className="w-44"
            value={typed}
            onChange={(event) => setTyped(event.target.value)}
          />
          <MenuSelect
            label="What"
            options={actionOptions}
            value={ask.action}
            onValueChange={(action) => change({ action })}
          />
          <MenuSelect
            label="Who"
            options={[{ value: "", label: "anybody" }, ...accounts]}
            value={ask.accountId}
            onValueChange={(accountId) => change({ accountId })}
          />
          {filtered ? <Button onClick={clear}>Clear</Button> : null}
          <Button pending={events.isFetching} onClick={() => void events.refetch()}>
            Read again
          </Button>
        </>
      }
    />
  );
}
