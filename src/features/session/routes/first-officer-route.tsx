import { useEffect } from "react";
import { useForm } from "react-hook-form";
import type { z } from "zod";
import { firstOfficerInput } from "../../../../shared/contracts/session.ts";
import { TextField } from "../../../components/fields/text-field.tsx";
import { AuthLayout } from "../../../components/layouts/auth-layout.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { LinkButton } from "../../../components/ui/link-button.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { errorWords } from "../../../lib/api-error.ts";
import { contractResolver, fieldWords, showFieldErrors } from "../../../lib/form-errors.ts";
import { useMakeFirstOfficer } from "../api/make-first-officer.ts";
import { GeneralCaution } from "../components/general-caution.tsx";
import { takeToken } from "../take-token.ts";

type Values = z.output<typeof firstOfficerInput>;

// Once per page load: a second look would find the address already cleaned.
const tokenOfAddress = takeToken();

/** Makes the first data officer and the first investigation of an empty installation. */
export function Component() {
  const make = useMakeFirstOfficer();
  const form = useForm<Values, unknown, Values>({
    resolver: contractResolver<Values, Values>(firstOfficerInput),
    defaultValues: {
      token: tokenOfAddress,
      displayName: "",
      email: "",
      password: "",
      investigationName: "",
      timeZone: Intl.DateTimeFormat().resolvedOptions().timeZone,
    },
  });
  useEffect(() => {
    document.title = "First data officer · Strandline";
  }, []);
  const { errors } = form.formState;
  const words = (name: keyof Values) => fieldWords(errors[name]?.message);

  if (make.isSuccess) {
    return (
      <AuthLayout title="The first data officer is made" footer={<GeneralCaution />}>
        <p className="mb-4">
          The link is used up. Sign in, then invite the members of the team in Safeguard.
        </p>
        <LinkButton to="/sign-in" variant="primary" reloadDocument>
          Sign in
        </LinkButton>
      </AuthLayout>
    );
  }
  return (
    <AuthLayout title="First data officer" footer={<GeneralCaution />}>
      <form
        noValidate
        className="space-y-4"
        onSubmit={form.handleSubmit((values) => {
          make.mutate(values, {
            onError: (error) => {
              showFieldErrors(error, form.setError, (path) => path in values);
            },
          });
        })}
      >
        {make.isError ? (
          <Notice tone="error" title="Not made.">
            {errorWords(make.error)}
          </Notice>
        ) : null}
        {errors.token ? (
          <Notice tone="error" title="The link is not complete.">
            Open the whole address that the start printed, with all after the #.
          </Notice>
        ) : null}
        <TextField
          label="Your name"
          autoComplete="name"
          error={words("displayName")}
          {...form.register("displayName")}
        />
        <TextField
          label="E-mail"
          type="email"
          autoComplete="username"
          error={words("email")}
          {...form.register("email")}
        />
        <TextField
          label="Password"
          type="password"
          autoComplete="new-password"
          hint="At least 15 characters; a few words are fine."
          error={words("password")}
          {...form.register("password")}
        />
        <TextField
          label="Name of the investigation"
          error={words("investigationName")}
          {...form.register("investigationName")}
        />
        <TextField
          label="Time zone"
          hint="Days are counted in this zone, such as Europe/London."
          error={words("timeZone")}
          {...form.register("timeZone")}
        />
        <Button variant="primary" type="submit" pending={make.isPending}>
          Make the account
        </Button>
      </form>
    </AuthLayout>
  );
}
