import { useState } from "react";
import { useForm } from "react-hook-form";
import {
  EXPORT_PURPOSES,
  type ExportFilter,
  type ExportInput,
  exportInput,
} from "../../../../shared/contracts/exports.ts";
import { exportedIdentity, mayIdentify } from "../../../../shared/export-columns.ts";
import type { Role } from "../../../../shared/roles.ts";
import { CheckboxField } from "../../../components/fields/checkbox-field.tsx";
import { RadioRow } from "../../../components/fields/radio-row.tsx";
import { SelectField } from "../../../components/fields/select-field.tsx";
import { TextField } from "../../../components/fields/text-field.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { Caution } from "../../../components/ui/caution.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { ApiError, errorWords } from "../../../lib/api-error.ts";
import { contractResolver, fieldWords, showFieldErrors } from "../../../lib/form-errors.ts";
import { useRequestExport } from "../api/request-export.ts";
import { holdsWords, narrowedWords, purposeWords } from "../export-words.ts";
import { ConfirmPassword } from "./confirm-password.tsx";

type Values = {
  kind: "people" | "pairs";
  identified: boolean;
  purpose: string;
  reason: string;
};

const purposes = EXPORT_PURPOSES.map((value) => ({ value, label: purposeWords[value] }));

export type ExportFormProps = {
  investigationId: string;
  role: Role;
  /** What the line list was narrowed down to; a list of people can be taken out the same way. */
  filter: ExportFilter;
  onEverybody: () => void;
};

/** Asks for a file: of what, with or without identity, and what for. */
export function ExportForm({ investigationId, role, filter, onEverybody }: ExportFormProps) {
  const [idempotencyKey, renewKey] = useState(() => crypto.randomUUID());
  const [waiting, setWaiting] = useState<ExportInput | null>(null);
  const request = useRequestExport(investigationId);
  const form = useForm<Values, unknown, ExportInput>({
    resolver: contractResolver<Values, ExportInput>(exportInput),
    defaultValues: { kind: "people", identified: false, purpose: "", reason: "" },
  });
  const { errors } = form.formState;
  const [kind, identified] = [form.watch("kind"), form.watch("identified")];
  const narrowed = kind === "people" ? narrowedWords(filter) : "";

  function send(asked: ExportInput) {
    const body = narrowed === "" ? asked : { ...asked, filter };
    request.mutate(
      { body, idempotencyKey },
      {
        onSuccess: () => {
          renewKey(crypto.randomUUID());
          form.reset();
        },
        onError: (error) => {
          if (error instanceof ApiError && error.code === "confirm_needed") {
            setWaiting(asked);
            return;
          }
          showFieldErrors(error, form.setError, (path) => path in form.getValues());
          renewKey(crypto.randomUUID());
        },
      },
    );
  }

  const asksPassword = request.error instanceof ApiError && request.error.code === "confirm_needed";
  return (
    <>
      <form noValidate className="max-w-3xl" onSubmit={form.handleSubmit(send)}>
        {request.isError && !asksPassword ? (
          <Notice tone="error" title="Not asked for." className="mb-3">
            {request.error instanceof ApiError && request.error.code === "conflict"
              ? "Five of your files are being made already; wait for one of them"
              : errorWords(request.error)}
            .
          </Notice>
        ) : null}
        <RadioRow
          label="What to take out"
          options={[
            { value: "people", label: "Line list" },
            { value: "pairs", label: "Contact pairs" },
          ]}
          className="mb-3"
          {...form.register("kind")}
        />
        {narrowed ? (
          <p className="mb-3 flex flex-wrap items-baseline gap-x-3 gap-y-1">
            <span>
              Only {narrowed}, as the line list was. What you searched for, and an area, do not
              narrow the file.
            </span>
            <Button size="small" onClick={onEverybody}>
              Take everybody
            </Button>
          </p>
        ) : null}
        {mayIdentify(role) ? (
          <CheckboxField
            label={exportedIdentity(role).length > 1 ? "With identity" : "With references"}
            error={fieldWords(errors.identified?.message)}
            {...form.register("identified")}
          />
        ) : null}
        <p className="mb-4 max-w-[70ch] text-sm text-ink-2" aria-live="polite">
          {holdsWords(kind, role, identified)}
        </p>
        <div className="grid gap-4 sm:grid-cols-2">
          <SelectField
            label="What for"
            emptyLabel="choose"
            options={purposes}
            aria-required
            error={fieldWords(errors.purpose?.message)}
            {...form.register("purpose")}
          />
          <TextField
            label="In a few words"
            hint="Needed for something else. No names: a data officer reads it."
            error={fieldWords(errors.reason?.message)}
            {...form.register("reason")}
          />
        </div>
        <Caution className="mt-4 max-w-[75ch]">
          Contains person-level health data, for outbreak control only. Removing names does not make
          a contact network anonymous. That you took it out, and why, goes on record.
        </Caution>
        <p className="mt-4 flex flex-wrap items-center gap-x-4 gap-y-2">
          <Button
            type="submit"
            variant="primary"
            pending={request.isPending}
            pendingLabel="Asking for it"
          >
            Make the file
          </Button>
          <span className="max-w-[60ch] text-sm text-ink-2">
            A CSV file with the columns of the import. Groups that could not be named, follow-up
            checks and notes are not in it.
          </span>
        </p>
      </form>
      {waiting ? (
        <ConfirmPassword
          onClose={() => setWaiting(null)}
          onConfirmed={() => {
            setWaiting(null);
            send(waiting);
          }}
        />
      ) : null}
    </>
  );
}
