import { useQuery } from "@tanstack/react-query";
import { CheckboxField } from "../../../components/fields/checkbox-field.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { symptomListQuery } from "../api/symptom-list.ts";

export type SymptomBoxesProps = {
  investigationId: string;
  value: readonly string[];
  onChange: (value: readonly string[]) => void;
};

/** The symptoms of this investigation's settings, to be ticked. */
export function SymptomBoxes({ investigationId, value, onChange }: SymptomBoxesProps) {
  const symptoms = useQuery(symptomListQuery(investigationId));
  return (
    <fieldset className="mt-1">
      <legend className="text-sm font-bold">Which symptoms</legend>
      {symptoms.isPending ? <LoadingState label="Loading the list of symptoms" rows={2} /> : null}
      {symptoms.isError ? (
        <ErrorState kind={errorKind(symptoms.error)} onRetry={() => void symptoms.refetch()} />
      ) : null}
      <div className="flex flex-wrap gap-x-4">
        {symptoms.data?.map(({ code, label }) => (
          <CheckboxField
            key={code}
            label={label}
            checked={value.includes(code)}
            onChange={(event) =>
              onChange(
                event.target.checked ? [...value, code] : value.filter((one) => one !== code),
              )
            }
          />
        ))}
      </div>
    </fieldset>
  );
}
