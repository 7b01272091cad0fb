import { useId, useState } from "react";
import { TextField } from "../../../components/fields/text-field.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { Dialog } from "../../../components/ui/dialog.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { ApiError, errorWords } from "../../../lib/api-error.ts";
import { fieldWords } from "../../../lib/field-words.ts";
import { useConfirmPassword } from "../api/request-export.ts";

export type ConfirmPasswordProps = { onClose: () => void; onConfirmed: () => void };

/** Asks for the password again: a screen left open takes nothing out. */
export function ConfirmPassword({ onClose, onConfirmed }: ConfirmPasswordProps) {
  const formId = useId();
  const confirm = useConfirmPassword();
  const [password, setPassword] = useState("");
  const [blank, setBlank] = useState(false);
  const code = confirm.error instanceof ApiError ? confirm.error.errors[0]?.code : undefined;
  const error = blank ? "required" : code;
  return (
    <Dialog
      open
      onOpenChange={(open) => {
        if (!open) onClose();
      }}
      title="Your password, once more"
      description="You gave it more than five minutes ago. Files leave only with whoever signed in."
      actions={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button type="submit" form={formId} variant="primary" pending={confirm.isPending}>
            Go on
          </Button>
        </>
      }
    >
      <form
        id={formId}
        noValidate
        onSubmit={(event) => {
          event.preventDefault();
          if (confirm.isPending) return;
          setBlank(password === "");
          if (password !== "") confirm.mutate(password, { onSuccess: onConfirmed });
        }}
      >
        {confirm.isError && code === undefined ? (
          <Notice tone="error" title="Not confirmed." className="mb-3">
            {errorWords(confirm.error)}.
          </Notice>
        ) : null}
        <TextField
          label="Password"
          type="password"
          autoComplete="current-password"
          value={password}
          error={fieldWords(error)}
          onChange={(event) => {
            setPassword(event.target.value);
            setBlank(false);
          }}
        />
      </form>
    </Dialog>
  );
}
