import { useState } from "react";
import type {
  AssignAnswer,
  Assignees,
  AssignInput,
} from "../../../../shared/contracts/people-filters.ts";
import { Button } from "../../../components/ui/button.tsx";
import { MenuSelect } from "../../../components/ui/menu-select.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { ApiError, errorWords } from "../../../lib/api-error.ts";
import { formatCount, formatNumber } from "../../../lib/formatters.ts";
import { useAssignPeople } from "../api/assign-people.ts";
import { type PeopleQuestion, withoutBlanks } from "../api/list-people.ts";
import type { PickedPeople } from "../use-picked.ts";

export type SelectionBarProps = {
  investigationId: string;
  picked: PickedPeople;
  question: PeopleQuestion;
  total: number;
  assignees: Assignees;
};

/** An option's value as the server takes it: `member:ID`, `team:ID` or `nobody`. */
function targetOf(value: string): AssignInput["to"] {
  const [kind, id = ""] = value.split(":");
  if (kind === "member") return { kind: "member", accountId: id };
  if (kind === "team") return { kind: "team", teamId: id };
  return { kind: "nobody" };
}

function failure(error: Error): string {
  if (error instanceof ApiError && error.code === "stale_version") {
    return "The list is no longer the one you saw. It has been read again; look at the number and assign once more.";
  }
  return `${errorWords(error)}.`;
}

/** What can be done with those selected, and how it went. */
export function SelectionBar(props: SelectionBarProps) {
  const { investigationId, picked, question, total, assignees } = props;
  const [to, setTo] = useState("");
  const [done, setDone] = useState<{ answer: AssignAnswer; skipped: string[] } | null>(null);
  const assign = useAssignPeople(investigationId);
  const options = [
    { value: "", label: "choose" },
    ...assignees.members.map((member) => ({
      value: `member:${member.accountId}`,
      label: member.team ? `${member.displayName} (${member.team})` : member.displayName,
    })),
    ...assignees.teams.map((team) => ({ value: `team:${team.id}`, label: `team ${team.name}` })),
    { value: "nobody", label: "nobody" },
  ];

  function run() {
    const { sort: _order, ...filter } = question;
    const numbers = new Map(picked.people.map((person) => [person.id, person.studyNumber]));
    const who = picked.all
      ? { filter: withoutBlanks(filter) as AssignInput["filter"], expected: total }
      : { people: picked.people.map(({ id, version }) => ({ id, version })) };
    assign.mutate(
      { to: targetOf(to), ...who },
      {
        onSuccess(answer) {
          setDone({ answer, skipped: answer.skipped.flatMap((id) => numbers.get(id) ?? []) });
          picked.clear();
        },
      },
    );
  }

  return (
    <div aria-live="polite" data-print="hide">
      {picked.count > 0 ? (
        <div className="flex flex-wrap items-center gap-x-3 gap-y-2 border-y border-ink bg-paper-2 px-3 py-2">
          <p className="font-bold">{formatCount(picked.count, "person", "people")} selected</p>
          <MenuSelect label="Assign to" options={options} value={to} onValueChange={setTo} />
          <Button
            variant="primary"
            disabled={to === "" || picked.tooMany}
            pending={assign.isPending}
            pendingLabel="Assigning"
            onClick={run}
          >
            Assign
          </Button>
          {picked.all ? null : (
            <Button onClick={picked.selection.selectAll}>Select all {formatNumber(total)}</Button>
          )}
          <Button variant="plain" onClick={picked.clear}>
            Select nobody
          </Button>
          {picked.tooMany ? (
            <p className="w-full text-sm text-coral">
              At most {formatNumber(picked.most)} at once; narrow the filter first.
            </p>
          ) : null}
        </div>
      ) : null}
      {assign.isError ? (
        <Notice tone="error" title="Nobody was assigned." className="mt-2">
          {failure(assign.error)}
        </Notice>
      ) : done && picked.count === 0 ? (
        <Notice
          tone={done.answer.skipped.length > 0 ? "warn" : "done"}
          title={resultWords(done.answer)}
          className="mt-2"
          actions={
            <Button size="small" onClick={() => setDone(null)}>
              Close
            </Button>
          }
        >
          {done.answer.skipped.length > 0
            ? `Changed by somebody else meanwhile, or gone from sight, and left as they are: ${
                done.skipped.length > 0
                  ? done.skipped.join(", ")
                  : formatCount(done.answer.skipped.length, "person", "people")
              }.`
            : null}
        </Notice>
      ) : null}
    </div>
  );
}

function resultWords({ changed, unchanged }: AssignAnswer): string {
  const before = unchanged > 0 ? `; ${formatNumber(unchanged)} were so already` : "";
  return `${formatCount(changed, "person", "people")} assigned${before}.`;
}
