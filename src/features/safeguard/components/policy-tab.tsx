import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import { TextField } from "../../../components/fields/text-field.tsx";
import { Section } from "../../../components/layouts/section.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { EmptyState } from "../../../components/ui/empty-state.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { MenuSelect } from "../../../components/ui/menu-select.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { formatCount, formatInstant } from "../../../lib/formatters.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { fieldPolicyQuery } from "../api/field-policy.ts";
import type { PolicyItem } from "../policy-disagreements.ts";
import { CLASS_ORDER, classWords } from "../safeguard-words.ts";
import { PolicyLegend } from "./policy-legend.tsx";
import { PolicySummary } from "./policy-summary.tsx";
import { PolicyTable } from "./policy-table.tsx";

const SHOWN = {
  people: "about people",
  differing: "where they differ",
  all: "all columns",
} as const;
type Shown = keyof typeof SHOWN;

function matches(item: PolicyItem, shown: Shown, text: string): boolean {
  if (shown === "people" && item.class === "operational" && item.agrees) return false;
  if (shown === "differing" && item.agrees) return false;
  const name = `${item.table}.${item.column} ${item.key ?? ""}`.toLowerCase();
  return name.includes(text.trim().toLowerCase());
}

/** Who may see which field: what the registry says and what the database does, side by side. */
export function PolicyTab() {
  const { id, timeZone } = useInvestigation();
  const policy = useQuery(fieldPolicyQuery(id));
  const [shown, setShown] = useState<Shown>("people");
  const [text, setText] = useState("");
  if (!policy.data) {
    return policy.isError ? (
      <ErrorState kind={errorKind(policy.error)} onRetry={() => void policy.refetch()} />
    ) : (
      <LoadingState label="Asking the database for its rights" rows={8} />
    );
  }
  const items = policy.data.items.filter((item) => matches(item, shown, text));
  return (
    <>
      <PolicySummary policy={policy.data} />
      <div className="mb-4 flex flex-wrap items-end gap-x-5 gap-y-3" data-print="hide">
        <TextField
          label="Find a field or column"
          className="w-64"
          value={text}
          onChange={(event) => setText(event.target.value)}
        />
        <MenuSelect
          label="Show"
          options={(Object.keys(SHOWN) as Shown[]).map((value) => ({ value, label: SHOWN[value] }))}
          value={shown}
          onValueChange={setShown}
        />
        <p className="ms-auto flex flex-wrap items-center gap-3 text-sm text-ink-2">
          Read {formatInstant(new Date(policy.dataUpdatedAt).toISOString(), timeZone)}
          <Button size="small" pending={policy.isFetching} onClick={() => void policy.refetch()}>
            Read again
          </Button>
        </p>
      </div>
      <PolicyLegend />
      {items.length === 0 ? (
        <EmptyState title="No column fits">
          {shown === "differing"
            ? "There is none in which registry and database differ."
            : "Clear the box, or show all columns."}
        </EmptyState>
      ) : null}
      {CLASS_ORDER.map((name) => {
        const rows = items.filter((item) => item.class === name);
        if (rows.length === 0) return null;
        return (
          <Section
            key={name}
            title={classWords[name].title}
            subLine={`${classWords[name].says} ${formatCount(rows.length, "column", "columns")}.`}
          >
            <PolicyTable caption={classWords[name].title} items={rows} />
          </Section>
        );
      })}
    </>
  );
}
