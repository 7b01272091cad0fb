import { useState } from "react";
import { useForm } from "react-hook-form";
import {
  type CompareRunInput,
  MIXING_ATTRIBUTES,
  REPLICATE_CHOICES,
} from "../../../../shared/contracts/compare.ts";
import { NumberField } from "../../../components/fields/number-field.tsx";
import { RadioRow } from "../../../components/fields/radio-row.tsx";
import { SelectField } from "../../../components/fields/select-field.tsx";
import { TextField } from "../../../components/fields/text-field.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { Caution } from "../../../components/ui/caution.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { ApiError, errorWords } from "../../../lib/api-error.ts";
import { contractResolver, fieldWords, showFieldErrors } from "../../../lib/form-errors.ts";
import { formatCount } from "../../../lib/formatters.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import type { NetworkQuestion } from "../../../lib/network-summary-query.ts";
import { useAskCompareRun } from "../api/ask-compare-run.ts";
import { type RunValues, runForm, startValues } from "../run-form-values.ts";
import { attributeWords, replicateWords } from "../run-words.ts";
import { populationOptions } from "./question-controls.tsx";

const attributeOptions = MIXING_ATTRIBUTES.map((value) => ({
  value,
  label: attributeWords[value],
}));
const replicateOptions = REPLICATE_CHOICES.map((value) => ({
  value: String(value),
  label: replicateWords[value],
}));

export type RunFormProps = {
  investigationId: string;
  question: NetworkQuestion;
  onClose: () => void;
  onAsked: (runId: string) => void;
};

/** Asks for a comparison: whom, which exposures, as of when, how many random networks. */
export function RunForm({ investigationId, question, onClose, onAsked }: RunFormProps) {
  const { infectiousBefore, infectiousAfter, today } = useInvestigation();
  const [idempotencyKey, renewKey] = useState(() => crypto.randomUUID());
  const ask = useAskCompareRun(investigationId);
  const form = useForm<RunValues, unknown, CompareRunInput>({
    resolver: contractResolver<RunValues, CompareRunInput>(runForm),
    defaultValues: startValues(question),
  });
  const { errors } = form.formState;
  const free = form.watch("window") === "free";
  const presetDays = infectiousBefore + infectiousAfter + 1;

  function send(body: CompareRunInput) {
    ask.mutate(
      { body, idempotencyKey },
      {
        onSuccess: ({ id }) => onAsked(id),
        onError: (error) => {
          showFieldErrors(error, form.setError, (path) => path in form.getValues());
          renewKey(crypto.randomUUID());
        },
      },
    );
  }

  return (
    <form
      noValidate
      aria-label="New comparison"
      className="mb-6 border-y border-rule py-4"
      onSubmit={form.handleSubmit(send)}
    >
      {ask.isError ? (
        <Notice tone="error" title="Not asked for." className="mb-3">
          {ask.error instanceof ApiError && ask.error.code === "conflict"
            ? "Other comparisons are being worked out already; wait for one, or cancel it"
            : errorWords(ask.error)}
          .
        </Notice>
      ) : null}
      <div className="grid max-w-4xl gap-4 sm:grid-cols-2 lg:grid-cols-3">
        <TextField
          label="Name"
          hint="By which the team finds it again. No names of people."
          aria-required
          autoFocus
          error={fieldWords(errors.name?.message)}
          {...form.register("name")}
        />
        <SelectField
          label="People"
          options={populationOptions}
          hint="Random mixing seen through the same interviews needs all on record."
          error={fieldWords(errors.population?.message)}
          {...form.register("population")}
        />
        <SelectField
          label="Mixing by"
          emptyLabel="no attribute"
          options={attributeOptions}
          hint="Adds a baseline that keeps who mixes with whom by it."
          error={fieldWords(errors.attribute?.message)}
          {...form.register("attribute")}
        />
        <SelectField
          label="Exposures"
          options={[
            {
              value: "preset",
              label: `one infectious window (${formatCount(presetDays, "day", "days")})`,
            },
            { value: "all", label: "all, dated or not" },
            { value: "free", label: "from – to" },
          ]}
          hint={
            free ? "A freely chosen range gets numbers, but no verdict on the threshold." : null
          }
          error={fieldWords(errors.window?.message)}
          {...form.register("window")}
        />
        {free ? (
          <>
            <TextField
              label="First exposure day"
              type="date"
              error={fieldWords(errors.from?.message)}
              {...form.register("from")}
            />
            <TextField
              label="Last exposure day"
              type="date"
              error={fieldWords(errors.to?.message)}
              {...form.register("to")}
            />
          </>
        ) : null}
        <TextField
          label="As of the end of"
          type="date"
          max={today}
          hint="Left empty: the record as it stands now."
          error={fieldWords(errors.asOf?.message)}
          {...form.register("asOf")}
        />
        <NumberField
          label="Seed"
          whole
          hint="The same seed on the same record gives the same figures."
          error={fieldWords(errors.seed?.message)}
          {...form.register("seed")}
        />
      </div>
      <RadioRow
        label="Random networks of each kind"
        className="mt-4"
        options={replicateOptions}
        hint="The smallest p they can show is 0.005, 0.001 and 0.0001."
        error={fieldWords(errors.replicates?.message)}
        {...form.register("replicates")}
      />
      <Caution className="mt-4">
        A difference from random mixing can come from how people were traced. What may not be
        compared on this record is greyed or refused on the page of the comparison, with its reason.
      </Caution>
      <div className="mt-4 flex flex-wrap gap-2">
        <Button
          type="submit"
          variant="primary"
          pending={ask.isPending}
          pendingLabel="Asking for it"
        >
          Compare
        </Button>
        <Button onClick={onClose}>Close the form</Button>
      </div>
    </form>
  );
}
