import { useEffect } from "react";
import { useForm } from "react-hook-form";
import { Link } from "react-router-dom";
import type { z } from "zod";
import { resetRequest } from "../../../../shared/contracts/accounts.ts";
import { TextField } from "../../../components/fields/text-field.tsx";
import { AuthLayout } from "../../../components/layouts/auth-layout.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { errorWords } from "../../../lib/api-error.ts";
import { contractResolver, fieldWords, showFieldErrors } from "../../../lib/form-errors.ts";
import { useAskReset } from "../api/reset-password.ts";
import { GeneralCaution } from "../components/general-caution.tsx";

type Values = z.output<typeof resetRequest>;

/** Asks for a letter that lets one choose a new password. */
export function Component() {
  const ask = useAskReset();
  const form = useForm<Values, unknown, Values>({
    resolver: contractResolver<Values, Values>(resetRequest),
    defaultValues: { email: "" },
  });
  useEffect(() => {
    document.title = "Forgotten password · Strandline";
  }, []);
  return (
    <AuthLayout title="Forgotten password" footer={<GeneralCaution />}>
      {ask.isSuccess ? (
        <Notice tone="info" title="Asked for.">
          If an account has this address, a letter with a link is on its way. The link works once,
          for 20 minutes.
        </Notice>
      ) : (
        <form
          noValidate
          className="space-y-4"
          onSubmit={form.handleSubmit((values) => {
            ask.mutate(values, {
              onError: (error) => {
                showFieldErrors(error, form.setError, (path) => path in values);
              },
            });
          })}
        >
          {ask.isError ? (
            <Notice tone="error" title="Not asked for.">
              {errorWords(ask.error)}
            </Notice>
          ) : null}
          <TextField
            label="E-mail"
            type="email"
            autoComplete="username"
            spellCheck={false}
            error={fieldWords(form.formState.errors.email?.message)}
            {...form.register("email")}
          />
          <Button variant="primary" type="submit" pending={ask.isPending}>
            Send a link
          </Button>
        </form>
      )}
      <p className="mt-4">
        <Link to="/sign-in" className="text-kelp underline underline-offset-4">
          Back to sign-in
        </Link>
      </p>
    </AuthLayout>
  );
}
