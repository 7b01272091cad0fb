import { useForm } from "react-hook-form";
import {
  type Session,
  type SignInInput,
  signInInput,
} from "../../../../shared/contracts/session.ts";
import { TextField } from "../../../components/fields/text-field.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { errorWords } from "../../../lib/api-error.ts";
import { contractResolver, fieldWords } from "../../../lib/form-errors.ts";
import { useSignIn } from "../api/sign-in.ts";

export type SignInFormProps = {
  onSignedIn: (session: Session) => void;
  /** Who was signed in before, when the page is locked over their work. */
  email?: string;
};

/** E-mail and password; the same form on the sign-in page and on the lock. */
export function SignInForm({ onSignedIn, email = "" }: SignInFormProps) {
  const signIn = useSignIn();
  const form = useForm<SignInInput, unknown, SignInInput>({
    resolver: contractResolver<SignInInput, SignInInput>(signInInput),
    defaultValues: { email, password: "" },
  });
  const { errors } = form.formState;
  return (
    <form
      noValidate
      className="space-y-4"
      onSubmit={form.handleSubmit((values) => {
        signIn.mutate(values, {
          onSuccess: onSignedIn,
          onError: () => form.resetField("password"),
        });
      })}
    >
      {signIn.isError ? (
        <Notice tone="error" title="Not signed in.">
          {errorWords(signIn.error)}
        </Notice>
      ) : null}
      <TextField
        label="E-mail"
        type="email"
        autoComplete="username"
        spellCheck={false}
        error={fieldWords(errors.email?.message)}
        {...form.register("email")}
      />
      <TextField
        label="Password"
        type="password"
        autoComplete="current-password"
        error={fieldWords(errors.password?.message)}
        {...form.register("password")}
      />
      <Button variant="primary" type="submit" pending={signIn.isPending} pendingLabel="Signing in">
        Sign in
      </Button>
    </form>
  );
}
