import { useEffect, useState } from "react";
import { useForm } from "react-hook-form";
import type { z } from "zod";
import { resetUse } from "../../../../shared/contracts/accounts.ts";
import { TextField } from "../../../components/fields/text-field.tsx";
import { AuthLayout } from "../../../components/layouts/auth-layout.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { LinkButton } from "../../../components/ui/link-button.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { ApiError, errorWords } from "../../../lib/api-error.ts";
import { contractResolver, fieldWords, showFieldErrors } from "../../../lib/form-errors.ts";
import { useReset } from "../api/reset-password.ts";
import { GeneralCaution } from "../components/general-caution.tsx";
import { passwordHint } from "../password-hint.ts";
import { takeToken } from "../take-token.ts";

type Values = z.output<typeof resetUse>;

// Once per page load: a second look would find the address already cleaned.
const tokenOfAddress = takeToken();

/** Chooses a new password with the token of a letter. */
export function Component() {
  const [token] = useState(tokenOfAddress);
  const reset = useReset();
  const form = useForm<Values, unknown, Values>({
    resolver: contractResolver<Values, Values>(resetUse),
    defaultValues: { token, password: "" },
  });
  useEffect(() => {
    document.title = "New password · Strandline";
  }, []);
  const { errors } = form.formState;
  const gone = reset.error instanceof ApiError && reset.error.status === 404;

  if (reset.isSuccess) {
    return (
      <AuthLayout title="The password is changed" footer={<GeneralCaution />}>
        <p className="mb-4">All sessions of the account have ended. Sign in with the new one.</p>
        <LinkButton to="/sign-in" variant="primary" reloadDocument>
          Sign in
        </LinkButton>
      </AuthLayout>
    );
  }
  if (token === "" || gone || errors.token) {
    return (
      <AuthLayout title="New password" footer={<GeneralCaution />}>
        <Notice tone="error" title="This link opens nothing." className="mb-4">
          It was used, is older than 20 minutes, or is not complete.
        </Notice>
        <LinkButton to="/forgotten-password" variant="primary">
          Ask for another
        </LinkButton>
      </AuthLayout>
    );
  }
  return (
    <AuthLayout title="New password" footer={<GeneralCaution />}>
      <form
        noValidate
        className="space-y-4"
        onSubmit={form.handleSubmit((values) => {
          reset.mutate(values, {
            onError: (error) => {
              showFieldErrors(error, form.setError, (path) => path in values);
            },
          });
        })}
      >
        {reset.isError ? (
          <Notice tone="error" title="Not changed.">
            {errorWords(reset.error)}
          </Notice>
        ) : null}
        <TextField
          label="New password"
          type="password"
          autoComplete="new-password"
          hint={passwordHint}
          error={fieldWords(errors.password?.message)}
          {...form.register("password")}
        />
        <Button variant="primary" type="submit" pending={reset.isPending}>
          Change the password
        </Button>
      </form>
    </AuthLayout>
  );
}
