import { useFormState } from "react-hook-form";
import { RadioRow } from "../../../components/fields/radio-row.tsx";
import { SelectField } from "../../../components/fields/select-field.tsx";
import { TextField } from "../../../components/fields/text-field.tsx";
import { Section } from "../../../components/layouts/section.tsx";
import { fieldWords } from "../../../lib/form-errors.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { channelChoices, outcomeChoices } from "../form/words.ts";
import { choiceByLetter } from "./choice-box.tsx";
import { useInterviewForm } from "./use-exposure-boxes.ts";

export const outcomeBoxId = "interview-outcome";

/** How the attempt ended, by which way, and when it truly was. */
export function OutcomeSection() {
  const form = useInterviewForm();
  const { timeZone } = useInvestigation();
  const { errors } = useFormState({ control: form.control });
  return (
    <Section title="How it went" subLine="also for an attempt that reached nobody">
      <div className="grid gap-x-8 gap-y-4 lg:grid-cols-[22rem_auto_17rem] lg:justify-start">
        <SelectField
          id={outcomeBoxId}
          label="Outcome"
          emptyLabel="choose"
          required
          options={outcomeChoices}
          error={fieldWords(errors.outcome?.message)}
          {...form.register("outcome")}
          onKeyDown={(event) => {
            if (event.ctrlKey || event.metaKey || event.altKey || !/^[a-z]$/i.test(event.key))
              return;
            const chosen = choiceByLetter(
              outcomeChoices,
              event.currentTarget.value,
              event.key.toLowerCase(),
            );
            if (chosen === undefined) return;
            event.preventDefault();
            form.setValue("outcome", chosen, {
              shouldDirty: true,
              shouldValidate: form.formState.isSubmitted,
            });
          }}
        />
        <RadioRow
          label="By"
          options={channelChoices}
          error={fieldWords(errors.channel?.message)}
          {...form.register("channel")}
        />
        <TextField
          label="Held at"
          placeholder="YYYY-MM-DD HH:MM"
          hint={`The true time, ${timeZone}; the time of entry is kept apart.`}
          error={fieldWords(errors.heldAt?.message)}
          {...form.register("heldAt")}
        />
      </div>
    </Section>
  );
}
