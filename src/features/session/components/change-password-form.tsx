import { useForm } from "react-hook-form";
import type { z } from "zod";
import { passwordChange } from "../../../../shared/contracts/accounts.ts";
import type { Session } from "../../../../shared/contracts/session.ts";
import { TextField } from "../../../components/fields/text-field.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { errorWords } from "../../../lib/api-error.ts";
import { contractResolver, fieldWords, showFieldErrors } from "../../../lib/form-errors.ts";
import { useChangePassword } from "../api/change-password.ts";
import { passwordHint } from "../password-hint.ts";

type Values = z.output<typeof passwordChange>;

export type ChangePasswordFormProps = { email: string; onDone: (session: Session) => void };

/** The old password and a new one. */
export function ChangePasswordForm({ email, onDone }: ChangePasswordFormProps) {
  const change = useChangePassword();
  const form = useForm<Values, unknown, Values>({
    resolver: contractResolver<Values, Values>(passwordChange),
    defaultValues: { current: "", next: "" },
  });
  const { errors } = form.formState;
  return (
    <form
      noValidate
      className="max-w-md space-y-4"
      onSubmit={form.handleSubmit((values) => {
        change.mutate(values, {
          onSuccess: onDone,
          onError: (error) => {
            showFieldErrors(error, form.setError, (path) => path in values);
          },
        });
      })}
    >
      {change.isError ? (
        <Notice tone="error" title="Not changed.">
          {errorWords(change.error)}
        </Notice>
      ) : null}
      {/* For password managers, which keep a password with the name it belongs to. */}
      <input type="email" autoComplete="username" value={email} readOnly hidden />
      <TextField
        label="Password now"
        type="password"
        autoComplete="current-password"
        error={fieldWords(errors.current?.message)}
        {...form.register("current")}
      />
      <TextField
        label="New password"
        type="password"
        autoComplete="new-password"
        hint={passwordHint}
        error={fieldWords(errors.next?.message)}
        {...form.register("next")}
      />
      <Button variant="primary" type="submit" pending={change.isPending}>
        Change the password
      </Button>
    </form>
  );
}
