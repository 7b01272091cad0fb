import { useQuery } from "@tanstack/react-query";
import type { PersonPage } from "../../../../shared/contracts/people.ts";
import { hasDuty } from "../../../../shared/roles.ts";
import { MenuSelect } from "../../../components/ui/menu-select.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { useToast } from "../../../components/ui/use-toast.ts";
import { errorWords } from "../../../lib/api-error.ts";
import { useSession } from "../../../lib/session-context.ts";
import { assignableQuery } from "../api/list-assignable.ts";
import { usePatchPerson } from "../api/patch-person.ts";

export type AssignmentProps = { person: PersonPage; investigationId: string };

/** Whose work a person is; a choice for who may assign. */
export function Assignment({ person, investigationId }: AssignmentProps) {
  const { accountId, actingRole } = useSession();
  const toast = useToast();
  const assigns = hasDuty(actingRole, "assign") && person.can.edit === true;
  const members = useQuery({ ...assignableQuery(investigationId), enabled: assigns });
  const patch = usePatchPerson(investigationId, person.id);
  const current = person.assignedTo ?? "";

  if (!assigns) {
    return (
      <p>
        Assigned to {current === "" ? "nobody" : current === accountId ? "you" : "another member"}.
      </p>
    );
  }
  const known = members.data ?? [];
  const options = [
    { value: "", label: "nobody" },
    ...known.map((member) => ({
      value: member.accountId,
      label: member.team ? `${member.displayName} (${member.team})` : member.displayName,
    })),
  ];
  if (current !== "" && !known.some((member) => member.accountId === current)) {
    options.push({ value: current, label: "a member of before" });
  }
  return (
    <>
      <MenuSelect
        label="Assigned to"
        options={options}
        value={current}
        disabled={patch.isPending}
        onValueChange={(value) =>
          patch.mutate(
            { version: person.version, assignedTo: value === "" ? null : value },
            {
              onSuccess: () =>
                toast({ tone: "done", text: value === "" ? "Assigned to nobody." : "Assigned." }),
            },
          )
        }
      />
      {patch.isError ? (
        <Notice tone="error" title="Not assigned." className="mt-2">
          {errorWords(patch.error)}.
        </Notice>
      ) : null}
    </>
  );
}
