import { useQueryClient } from "@tanstack/react-query";
import { useState } from "react";
import { useForm } from "react-hook-form";
import { z } from "zod";
import {
  type InvestigationInput,
  investigationInput,
} from "../../../../shared/contracts/investigations.ts";
import { CheckboxField } from "../../../components/fields/checkbox-field.tsx";
import { NumberField } from "../../../components/fields/number-field.tsx";
import { TextField } from "../../../components/fields/text-field.tsx";
import { TextareaField } from "../../../components/fields/textarea-field.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { UnsavedGuard } from "../../../components/ui/unsaved-guard.tsx";
import { errorWords } from "../../../lib/api-error.ts";
import { contractResolver, fieldWords, showFieldErrors } from "../../../lib/form-errors.ts";
import { typedNumber } from "../../../lib/typed-number.ts";
import { useCreateInvestigation } from "../api/create-investigation.ts";
import { SETTING_FIELDS, type SettingKey } from "../setting-fields.ts";

type Values = Record<
  SettingKey | "name" | "timeZone" | "countryCode" | "caseDefinition",
  string
> & {
  invented: boolean;
  practice: boolean;
};

const schema = z.preprocess((typed) => {
  const values = typed as Values;
  const numbers = SETTING_FIELDS.map(({ key }) => [key, typedNumber(values[key])]);
  return {
    ...values,
    invented: values.invented || values.practice,
    countryCode: values.countryCode.trim().toUpperCase(),
    ...Object.fromEntries(numbers),
  };
}, investigationInput);

export type CreateInvestigationFormProps = {
  /** Demo accounts may only open investigations marked invented. */
  demo: boolean;
  /** Whether the acting role may open one to practise with. */
  mayPractise: boolean;
  onCreated: () => void;
  onCancel: () => void;
};

/** Opens a new investigation with its first settings. */
export function CreateInvestigationForm({
  demo,
  mayPractise,
  onCreated,
  onCancel,
}: CreateInvestigationFormProps) {
  const [idempotencyKey] = useState(() => crypto.randomUUID());
  const queryClient = useQueryClient();
  const create = useCreateInvestigation(idempotencyKey);
  const form = useForm<Values, unknown, InvestigationInput>({
    resolver: contractResolver<Values, InvestigationInput>(schema),
    defaultValues: {
      name: "",
      timeZone: Intl.DateTimeFormat().resolvedOptions().timeZone,
      countryCode: "GB",
      caseDefinition: "",
      populationAtRisk: "",
      infectiousBefore: "2",
      infectiousAfter: "10",
      monitoringDays: "14",
      invented: demo,
      practice: false,
    },
  });
  const practice = form.watch("practice");
  const { errors, isDirty } = form.formState;
  const words = (name: keyof Values) => fieldWords(errors[name]?.message);

  return (
    <form
      noValidate
      className="max-w-3xl space-y-4"
      onSubmit={form.handleSubmit((body) => {
        create.mutate(body, {
          onSuccess() {
            form.reset();
            void queryClient.invalidateQueries({ queryKey: ["session"] });
            void queryClient.invalidateQueries({ queryKey: ["investigations"] });
            onCreated();
          },
          onError: (error) => {
            showFieldErrors(error, form.setError, (path) => path in form.getValues());
          },
        });
      })}
    >
      <UnsavedGuard unsaved={isDirty && !create.isSuccess} />
      {create.isError ? (
        <Notice tone="error" title="Not opened.">
          {errorWords(create.error)}.
        </Notice>
      ) : null}
      <div className="grid gap-4 sm:grid-cols-2">
        <TextField
          label="Name"
          required
          className="sm:col-span-2"
          error={words("name")}
          {...form.register("name")}
        />
        <TextField
          label="Time zone"
          hint="Days are counted in this zone."
          error={words("timeZone")}
          {...form.register("timeZone")}
        />
        <TextField
          label="Country of local telephone numbers"
          hint="Two letters, such as GB."
          error={words("countryCode")}
          {...form.register("countryCode")}
        />
        {SETTING_FIELDS.map(({ key, label, unit, hint }) => (
          <NumberField
            key={key}
            label={label}
            unit={unit}
            hint={hint}
            whole
            error={words(key)}
            {...form.register(key)}
          />
        ))}
        <TextareaField
          label="Case definition"
          hint="Kept with a version number; every classification stores the version it was made by."
          className="sm:col-span-2"
          rows={4}
          error={words("caseDefinition")}
          {...form.register("caseDefinition")}
        />
      </div>
      <p className="text-sm text-ink-2">
        All of this can be changed later in the settings, with the incubation, clusters, grades and
        texts; what a change would move is shown before it is saved.
      </p>
      <div>
        {mayPractise ? (
          <CheckboxField
            label="To practise with"
            hint="It opens with invented people, may be emptied and filled anew, sends nothing and counts nowhere. Practice stays practice."
            error={words("practice")}
            {...form.register("practice")}
          />
        ) : null}
        {practice ? (
          <p className="mt-2">Marked as invented and as practice on every page.</p>
        ) : (
          <CheckboxField
            label="Invented data: marked as such on every page"
            disabled={demo}
            hint={demo ? "Demo accounts work with invented data only." : undefined}
            error={words("invented")}
            {...form.register("invented", { disabled: false })}
          />
        )}
      </div>
      <p className="flex flex-wrap gap-2">
        <Button variant="primary" type="submit" pending={create.isPending}>
          Open the investigation
        </Button>
        <Button onClick={onCancel}>Not now</Button>
      </p>
    </form>
  );
}
