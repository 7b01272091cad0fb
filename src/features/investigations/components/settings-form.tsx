import { useForm } from "react-hook-form";
import { z } from "zod";
import {
  type Investigation,
  investigationPatch,
} from "../../../../shared/contracts/investigations.ts";
import { NumberField } from "../../../components/fields/number-field.tsx";
import { TextField } from "../../../components/fields/text-field.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { UnsavedGuard } from "../../../components/ui/unsaved-guard.tsx";
import { useToast } from "../../../components/ui/use-toast.ts";
import { ApiError, errorWords } from "../../../lib/api-error.ts";
import { contractResolver, fieldWords, showFieldErrors } from "../../../lib/form-errors.ts";
import { usePatchInvestigation } from "../api/patch-investigation.ts";
import { SETTING_FIELDS, type SettingKey, typedNumber } from "../setting-fields.ts";

type Values = Record<SettingKey | "name", string>;
type Patch = z.output<typeof investigationPatch>;

export type SettingsFormProps = {
  investigation: Investigation;
  /** Asks for the settings anew after somebody else changed them. */
  onReload: () => void;
};

function valuesOf(investigation: Investigation): Values {
  const text = (value: number | null) => (value === null ? "" : String(value));
  return {
    name: investigation.name,
    populationAtRisk: text(investigation.populationAtRisk),
    infectiousBefore: text(investigation.infectiousBefore),
    infectiousAfter: text(investigation.infectiousAfter),
    monitoringDays: text(investigation.monitoringDays),
  };
}

/** Settings that windows, due days and the report stand on. */
export function SettingsForm({ investigation, onReload }: SettingsFormProps) {
  const toast = useToast();
  const patch = usePatchInvestigation(investigation.id);
  const schema = z.preprocess((typed) => {
    const values = typed as Values;
    const numbers = SETTING_FIELDS.map(({ key }) => [key, typedNumber(values[key])]);
    return { version: investigation.version, name: values.name, ...Object.fromEntries(numbers) };
  }, investigationPatch);
  const form = useForm<Values, unknown, Patch>({
    resolver: contractResolver<Values, Patch>(schema),
    values: valuesOf(investigation),
    resetOptions: { keepDirtyValues: true },
  });
  const { errors, isDirty } = form.formState;
  const stale = patch.error instanceof ApiError && patch.error.code === "stale_version";

  return (
    <form
      noValidate
      className="max-w-3xl"
      onSubmit={form.handleSubmit((body) => {
        patch.mutate(body, {
          onSuccess(saved) {
            form.reset(valuesOf(saved));
            toast({ tone: "done", text: "Settings saved." });
          },
          onError: (error) => {
            showFieldErrors(error, form.setError, (path) => path in form.getValues());
          },
        });
      })}
    >
      <UnsavedGuard unsaved={isDirty} />
      {patch.isError ? (
        <Notice
          tone="error"
          title="Not saved."
          className="mb-3"
          actions={
            stale ? (
              <Button size="small" onClick={onReload}>
                Read the saved settings
              </Button>
            ) : null
          }
        >
          {errorWords(patch.error)}.{" "}
          {stale ? "Boxes you did not touch show the saved values then; yours stay." : ""}
        </Notice>
      ) : null}
      <div className="grid gap-4 sm:grid-cols-2">
        <TextField
          label="Name"
          className="sm:col-span-2"
          error={fieldWords(errors.name?.message)}
          {...form.register("name")}
        />
        {SETTING_FIELDS.map(({ key, label, unit, hint }) => (
          <NumberField
            key={key}
            label={label}
            unit={unit}
            hint={hint}
            whole
            error={fieldWords(errors[key]?.message)}
            {...form.register(key)}
          />
        ))}
      </div>
      <p className="mt-4 flex flex-wrap gap-2">
        <Button variant="primary" type="submit" pending={patch.isPending} disabled={!isDirty}>
          Save settings
        </Button>
        {isDirty ? (
          <Button onClick={() => form.reset(valuesOf(investigation))}>Put back</Button>
        ) : null}
      </p>
    </form>
  );
}
