import { useForm } from "react-hook-form";
import type { z } from "zod";
import {
  acceptInput,
  type InvitationSeen,
  newPassword,
} from "../../../../shared/contracts/accounts.ts";
import { LIMITS, text } from "../../../../shared/contracts/common.ts";
import { TextField } from "../../../components/fields/text-field.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { errorWords } from "../../../lib/api-error.ts";
import { contractResolver, fieldWords, showFieldErrors } from "../../../lib/form-errors.ts";
import { useAcceptInvitation } from "../api/invitation.ts";
import { passwordHint } from "../password-hint.ts";

/** What the contract leaves open for those who have an account is needed from all others. */
const newAccount = acceptInput.extend({
  displayName: text(LIMITS.name, 1),
  password: newPassword,
});
type Values = z.output<typeof newAccount>;

export type AcceptFormProps = {
  token: string;
  invitation: InvitationSeen;
  onJoined: () => void;
};

/** Name and password of a new account; one button where there is an account. */
export function AcceptForm({ token, invitation, onJoined }: AcceptFormProps) {
  const accept = useAcceptInvitation();
  const form = useForm<Values, unknown, Values>({
    resolver: contractResolver<Values, Values>(newAccount),
    defaultValues: { token, displayName: "", password: "" },
  });
  const { errors } = form.formState;
  const failed = accept.isError ? (
    <Notice tone="error" title="Not joined.">
      {errorWords(accept.error)}
    </Notice>
  ) : null;

  if (invitation.hasAccount) {
    return (
      <div className="space-y-4">
        {failed}
        <p>
          <span className="break-all">{invitation.email}</span> has an account. It keeps its name
          and password and holds this role besides.
        </p>
        <Button
          variant="primary"
          pending={accept.isPending}
          onClick={() => accept.mutate({ token }, { onSuccess: onJoined })}
        >
          Join
        </Button>
      </div>
    );
  }
  return (
    <form
      noValidate
      className="space-y-4"
      onSubmit={form.handleSubmit((values) => {
        accept.mutate(values, {
          onSuccess: onJoined,
          onError: (error) => {
            showFieldErrors(error, form.setError, (path) => path in values);
          },
        });
      })}
    >
      {failed}
      <TextField
        label="E-mail"
        type="email"
        autoComplete="username"
        readOnly
        value={invitation.email}
        hint="You sign in with it."
      />
      <TextField
        label="Your name"
        autoComplete="name"
        error={fieldWords(errors.displayName?.message)}
        {...form.register("displayName")}
      />
      <TextField
        label="Password"
        type="password"
        autoComplete="new-password"
        hint={passwordHint}
        error={fieldWords(errors.password?.message)}
        {...form.register("password")}
      />
      <Button variant="primary" type="submit" pending={accept.isPending}>
        Make the account and join
      </Button>
    </form>
  );
}
