import { useState } from "react";
import { Controller, useForm } from "react-hook-form";
import { type TestInput, testInput } from "../../../../shared/contracts/tests.ts";
import { TEST_RESULTS } from "../../../../shared/vocabulary.ts";
import { PartialDateField } from "../../../components/fields/partial-date-field.tsx";
import { SelectField } from "../../../components/fields/select-field.tsx";
import { TextField } from "../../../components/fields/text-field.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { UnsavedGuard } from "../../../components/ui/unsaved-guard.tsx";
import { errorWords } from "../../../lib/api-error.ts";
import { contractResolver, fieldWords, showFieldErrors } from "../../../lib/form-errors.ts";
import { useRecordTest } from "../api/record-test.ts";

type Values = Record<"specimenDate" | "kind" | "result" | "resultDate", string>;

export type TestFormProps = {
  investigationId: string;
  personId: string;
  today: string;
  onDone: () => void;
};

/** One more test: when the specimen was taken, what it was, and what came of it. */
export function TestForm({ investigationId, personId, today, onDone }: TestFormProps) {
  const [idempotencyKey] = useState(() => crypto.randomUUID());
  const record = useRecordTest(investigationId, personId, idempotencyKey);
  const form = useForm<Values, unknown, TestInput>({
    resolver: contractResolver<Values, TestInput>(testInput),
    defaultValues: { specimenDate: "", kind: "", result: "", resultDate: "" },
  });
  const { errors, isDirty } = form.formState;
  const words = (name: keyof Values) => fieldWords(errors[name]?.message);
  return (
    <form
      noValidate
      className="mt-3 border-t border-rule pt-3"
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
      <div className="grid gap-x-6 gap-y-3 sm:grid-cols-2">
        <Controller
          control={form.control}
          name="specimenDate"
          render={({ field }) => (
            <PartialDateField
              label="Specimen taken"
              today={today}
              error={words("specimenDate")}
              {...field}
            />
          )}
        />
        <TextField
          label="Kind"
          hint="Such as swab, blood, rapid."
          error={words("kind")}
          {...form.register("kind")}
        />
        <SelectField
          label="Result"
          emptyLabel="not known yet"
          options={TEST_RESULTS.map((value) => ({ value, label: value }))}
          error={words("result")}
          {...form.register("result")}
        />
        <Controller
          control={form.control}
          name="resultDate"
          render={({ field }) => (
            <PartialDateField
              label="Day of result"
              today={today}
              error={words("resultDate")}
              {...field}
            />
          )}
        />
      </div>
      <p className="mt-3 flex flex-wrap gap-2">
        <Button variant="primary" type="submit" pending={record.isPending} disabled={!isDirty}>
          Record the test
        </Button>
        <Button onClick={onDone}>Cancel</Button>
      </p>
    </form>
  );
}
