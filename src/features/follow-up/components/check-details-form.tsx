import { LIMITS } from "../../../../shared/contracts/common.ts";
import { RESPONDENTS } from "../../../../shared/vocabulary.ts";
import { RadioRow } from "../../../components/fields/radio-row.tsx";
import { SelectField } from "../../../components/fields/select-field.tsx";
import { TextField } from "../../../components/fields/text-field.tsx";
import { TextareaField } from "../../../components/fields/textarea-field.tsx";
import { Caution } from "../../../components/ui/caution.tsx";
import { wordFor } from "../../../lib/words.ts";
import type { CheckDetails } from "../lib/check-details.ts";
import { SymptomBoxes } from "./symptom-boxes.tsx";

const symptomAnswers = [
  { value: "", label: "not asked" },
  { value: "no", label: "no" },
  { value: "yes", label: "yes" },
  { value: "unknown", label: "unknown" },
  { value: "refused", label: "refused" },
];
const respondents = RESPONDENTS.map((value) => ({ value, label: wordFor({}, value) }));

export type CheckDetailsFormProps = {
  investigationId: string;
  called: string;
  /** Keeps the radio buttons of this contact apart from those of others. */
  name: string;
  value: CheckDetails;
  today: string;
  onChange: (value: CheckDetails) => void;
};

/** Symptoms, who answered, a note and another day; recorded with the press of an outcome below. */
export function CheckDetailsForm({
  investigationId,
  called,
  name,
  value,
  today,
  onChange,
}: CheckDetailsFormProps) {
  const set = (change: Partial<CheckDetails>) => onChange({ ...value, ...change });
  return (
    <fieldset className="mb-2 border-s-2 border-rule ps-3">
      <legend className="sr-only">Details of the check of {called}</legend>
      <RadioRow
        label="Symptoms"
        name={name}
        options={symptomAnswers}
        value={value.symptoms}
        onChange={(event) => set({ symptoms: event.target.value })}
      />
      {value.symptoms === "yes" ? (
        <>
          <SymptomBoxes
            investigationId={investigationId}
            value={value.symptomCodes}
            onChange={(symptomCodes) => set({ symptomCodes })}
          />
          <Caution className="my-2">
            A symptom report needs a person's action now. This system does not watch for
            emergencies; call local emergency services.
          </Caution>
        </>
      ) : null}
      <div className="mt-2 grid gap-x-6 gap-y-2 sm:grid-cols-2">
        <SelectField
          label="Who answered"
          emptyLabel="not asked"
          options={respondents}
          value={value.respondent}
          onChange={(event) => set({ respondent: event.target.value })}
        />
        <TextField
          label="Day of the check"
          type="date"
          max={today}
          value={value.day}
          onChange={(event) => set({ day: event.target.value })}
        />
        <TextareaField
          label="Note"
          rows={2}
          maxLength={LIMITS.note}
          className="sm:col-span-2"
          value={value.note}
          onChange={(event) => set({ note: event.target.value })}
        />
      </div>
      <p className="mt-2 text-sm text-ink-2">Recorded when you press how they were reached:</p>
    </fieldset>
  );
}
