import { useQuery } from "@tanstack/react-query";
import { type ComponentProps, useId } from "react";
import { TextField } from "../../../components/fields/text-field.tsx";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { teamsQuery } from "../api/teams.ts";

type FieldProps = Omit<ComponentProps<typeof TextField>, "label">;

/** The name of a team; those that exist are offered while typing. */
export function TeamField(props: FieldProps) {
  const { id } = useInvestigation();
  const teams = useQuery(teamsQuery(id));
  const listId = useId();
  return (
    <>
      <TextField label="Team" list={listId} {...props} />
      <datalist id={listId}>
        {(teams.data?.items ?? []).map((team) => (
          <option key={team.id} value={team.name} />
        ))}
      </datalist>
    </>
  );
}

/** The last day of a role; an empty box is no end. */
export function RoleEndField(props: FieldProps) {
  const { today } = useInvestigation();
  return (
    <TextField
      label="Last day"
      type="date"
      min={today}
      hint="Access ends by itself when that day is over here. Empty: no end."
      {...props}
    />
  );
}
