import { useState } from "react";
import { useForm } from "react-hook-form";
import { type Team, teamInput } from "../../../../shared/contracts/investigations.ts";
import { TextField } from "../../../components/fields/text-field.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { errorWords } from "../../../lib/api-error.ts";
import { contractResolver, fieldWords, showFieldErrors } from "../../../lib/form-errors.ts";
import { useMakeTeam, useRenameTeam } from "../api/teams.ts";

type Values = { name: string };

export type TeamFormProps = {
  investigationId: string;
  /** The team to be renamed; none: a new one. */
  team: Team | null;
  /** Called with the words of what was done; without them nothing was. */
  onDone: (done?: string) => void;
};

/** Names a new team, or gives one another name. */
export function TeamForm({ investigationId, team, onDone }: TeamFormProps) {
  const [idempotencyKey, renewKey] = useState(() => crypto.randomUUID());
  const make = useMakeTeam(investigationId, idempotencyKey);
  const rename = useRenameTeam(investigationId);
  const form = useForm<Values, unknown, Values>({
    resolver: contractResolver<Values, Values>(teamInput),
    defaultValues: { name: team?.name ?? "" },
  });
  const { errors, isDirty } = form.formState;
  const failed = team ? rename.error : make.error;
  const onError = (error: unknown) => {
    showFieldErrors(error, form.setError, (path) => path === "name");
    renewKey(crypto.randomUUID());
  };
  return (
    <form
      noValidate
      className="mb-4 max-w-xl"
      onSubmit={form.handleSubmit(({ name }) => {
        if (team) {
          rename.mutate(
            { id: team.id, version: team.version, name },
            { onSuccess: () => onDone("Team renamed"), onError },
          );
        } else {
          make.mutate({ name }, { onSuccess: () => onDone("Team made"), onError });
        }
      })}
    >
      {failed ? (
        <Notice tone="error" title={team ? "Not renamed." : "Not made."} className="mb-3">
          {errorWords(failed)}.
        </Notice>
      ) : null}
      <TextField
        label={team ? `New name of ${team.name}` : "Name of the new team"}
        error={fieldWords(errors.name?.message)}
        {...form.register("name")}
      />
      <p className="mt-3 flex flex-wrap gap-2">
        <Button
          variant="primary"
          type="submit"
          pending={make.isPending || rename.isPending}
          disabled={!isDirty}
        >
          {team ? "Rename the team" : "Make the team"}
        </Button>
        <Button onClick={() => onDone()}>Cancel</Button>
      </p>
    </form>
  );
}
