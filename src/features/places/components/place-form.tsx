import { useState } from "react";
import { useForm } from "react-hook-form";
import { type PlaceInput, placeInput } from "../../../../shared/contracts/places.ts";
import { SETTINGS } from "../../../../shared/vocabulary.ts";
import { SelectField } from "../../../components/fields/select-field.tsx";
import { TextField } from "../../../components/fields/text-field.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { UnsavedGuard } from "../../../components/ui/unsaved-guard.tsx";
import { errorWords } from "../../../lib/api-error.ts";
import { contractResolver, fieldWords, showFieldErrors } from "../../../lib/form-errors.ts";
import { settingWords } from "../../../lib/words.ts";
import { useRecordPlace } from "../api/record-place.ts";

type Values = Record<"name" | "setting" | "area", string>;

export type PlaceFormProps = { investigationId: string; onDone: () => void };

/** Records a place; a household's name is kept with the identities, others see its number. */
export function PlaceForm({ investigationId, onDone }: PlaceFormProps) {
  const [idempotencyKey] = useState(() => crypto.randomUUID());
  const record = useRecordPlace(investigationId, idempotencyKey);
  const form = useForm<Values, unknown, PlaceInput>({
    resolver: contractResolver<Values, PlaceInput>(placeInput),
    defaultValues: { name: "", setting: "", area: "" },
  });
  const { errors, isDirty } = form.formState;
  return (
    <form
      noValidate
      className="mb-6 max-w-3xl"
      onSubmit={form.handleSubmit((body) => {
        record.mutate(body, {
          onSuccess: onDone,
          onError: (error) => {
            showFieldErrors(error, form.setError, (path) => path in body);
          },
        });
      })}
    >
      <UnsavedGuard unsaved={isDirty && !record.isSuccess} />
      {record.isError ? (
        <Notice tone="error" title="Not saved." className="mb-3">
          {errorWords(record.error)}.
        </Notice>
      ) : null}
      <div className="grid gap-4 sm:grid-cols-3">
        <TextField
          label="Name"
          hint="A household’s name is read by few; no person’s name for other places."
          error={fieldWords(errors.name?.message)}
          {...form.register("name")}
        />
        <SelectField
          label="Setting"
          emptyLabel="choose"
          options={SETTINGS.map((value) => ({ value, label: settingWords[value] }))}
          error={fieldWords(errors.setting?.message)}
          {...form.register("setting")}
        />
        <TextField
          label="Area"
          error={fieldWords(errors.area?.message)}
          {...form.register("area")}
        />
      </div>
      <p className="mt-3 flex flex-wrap gap-2">
        <Button variant="primary" type="submit" pending={record.isPending} disabled={!isDirty}>
          Record the place
        </Button>
        <Button onClick={onDone}>Cancel</Button>
      </p>
    </form>
  );
}
