import { useState } from "react";
import { useForm } from "react-hook-form";
import { invitationInput } from "../../../../shared/contracts/accounts.ts";
import { memberInput } from "../../../../shared/contracts/investigations.ts";
import { ROLE_NAMES, ROLES } from "../../../../shared/roles.ts";
import { SelectField } from "../../../components/fields/select-field.tsx";
import { TextField } from "../../../components/fields/text-field.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { UnsavedGuard } from "../../../components/ui/unsaved-guard.tsx";
import { errorWords } from "../../../lib/api-error.ts";
import { contractResolver, fieldWords, showFieldErrors } from "../../../lib/form-errors.ts";
import { useInvite } from "../api/invitations.ts";
import { type MemberInput, useAddMember } from "../api/members.ts";
import { RoleEndField, TeamField } from "./role-fields.tsx";

type Values = Record<"email" | "role" | "team" | "endsOn", string>;

/** Who has an account is added at once; anybody else gets a letter first. */
export type NewMemberBy = "account" | "invitation";

export type AddMemberFormProps = {
  by: NewMemberBy;
  investigationId: string;
  /** Called with the words of what was done; without them nothing was. */
  onDone: (done?: string) => void;
};

/** Gives an account a role in this investigation, or invites somebody by e-mail to take one. */
export function AddMemberForm({ by, investigationId, onDone }: AddMemberFormProps) {
  const [idempotencyKey, renewKey] = useState(() => crypto.randomUUID());
  const inviting = by === "invitation";
  const byAccount = useAddMember(investigationId, idempotencyKey);
  const byLetter = useInvite(investigationId, idempotencyKey);
  const add = inviting ? byLetter : byAccount;
  const form = useForm<Values, unknown, MemberInput>({
    resolver: contractResolver<Values, MemberInput>(inviting ? invitationInput : memberInput),
    defaultValues: { email: "", role: "", team: "", endsOn: "" },
  });
  const { errors, isDirty } = form.formState;
  return (
    <form
      noValidate
      className="max-w-4xl"
      onSubmit={form.handleSubmit((body) => {
        add.mutate(body, {
          onSuccess: () => onDone(`${ROLE_NAMES[body.role]} ${inviting ? "invited" : "added"}`),
          onError: (error) => {
            showFieldErrors(error, form.setError, (path) => path in body);
            // What is sent next is another request.
            renewKey(crypto.randomUUID());
          },
        });
      })}
    >
      <UnsavedGuard unsaved={isDirty && !add.isSuccess} />
      {add.isError ? (
        <Notice tone="error" title={inviting ? "Not invited." : "Not added."} className="mb-3">
          {errorWords(add.error)}.
        </Notice>
      ) : null}
      <div className="grid gap-4 sm:grid-cols-2">
        <TextField
          label={inviting ? "E-mail" : "E-mail of the account"}
          type="email"
          hint={
            inviting
              ? "They get a link that works once, for 72 hours."
              : "The account must exist already."
          }
          error={fieldWords(errors.email?.message)}
          {...form.register("email")}
        />
        <SelectField
          label="Role here"
          emptyLabel="choose"
          options={ROLES.map((value) => ({ value, label: ROLE_NAMES[value] }))}
          error={fieldWords(errors.role?.message)}
          {...form.register("role")}
        />
        <TeamField
          hint="If they work in one; a new name makes a new team."
          error={fieldWords(errors.team?.message)}
          {...form.register("team")}
        />
        <RoleEndField error={fieldWords(errors.endsOn?.message)} {...form.register("endsOn")} />
      </div>
      <p className="mt-3 flex flex-wrap gap-2">
        <Button variant="primary" type="submit" pending={add.isPending} disabled={!isDirty}>
          {inviting ? "Send the invitation" : "Add the member"}
        </Button>
        <Button onClick={() => onDone()}>Cancel</Button>
      </p>
    </form>
  );
}
