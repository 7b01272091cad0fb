import { useQueryClient } from "@tanstack/react-query";
import { useState } from "react";
import { useForm } from "react-hook-form";
import {
  type PersonInput,
  type PersonPage,
  personInput,
} from "../../../../shared/contracts/people.ts";
import { Button } from "../../../components/ui/button.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { UnsavedGuard } from "../../../components/ui/unsaved-guard.tsx";
import { useToast } from "../../../components/ui/use-toast.ts";
import { ApiError, errorWords } from "../../../lib/api-error.ts";
import { contractResolver, showFieldErrors } from "../../../lib/form-errors.ts";
import { personQuery } from "../api/get-person.ts";
import { type PersonChange, usePatchPerson } from "../api/patch-person.ts";
import {
  blankPerson,
  fieldsIn,
  type PersonKey,
  type PersonSection,
  type PersonValues,
} from "../person-fields.ts";
import { ConflictTable } from "./conflict-table.tsx";
import { PersonFieldInput } from "./person-field-input.tsx";

export type EditPersonFormProps = {
  investigationId: string;
  /** As it is saved now; may be newer than what the form began with. */
  person: PersonPage;
  section: PersonSection;
  today: string;
  onDone: () => void;
};

function valuesOf(person: PersonPage): PersonValues {
  const values = blankPerson();
  for (const key of Object.keys(values) as PersonKey[]) {
    const stored = (person as unknown as Record<string, unknown>)[key];
    values[key] = typeof stored === "string" ? stored : "";
  }
  return values;
}

/**
 * Changes one part of a record in place. The form keeps the version it began with, so that a save
 * by somebody else in between is noticed; both values are then shown, and nothing typed is lost.
 */
export function EditPersonForm(props: EditPersonFormProps) {
  const { investigationId, person, section, today, onDone } = props;
  const [begun] = useState(person);
  const queryClient = useQueryClient();
  const toast = useToast();
  const patch = usePatchPerson(investigationId, person.id);
  const form = useForm<PersonValues, unknown, PersonInput>({
    resolver: contractResolver<PersonValues, PersonInput>(personInput),
    defaultValues: valuesOf(begun),
  });
  const { dirtyFields, isDirty } = form.formState;
  const fields = fieldsIn(section).filter(({ key }) => key in begun);
  const changed = fields.filter(({ key }) => dirtyFields[key]);
  const stale = patch.error instanceof ApiError && patch.error.code === "stale_version";

  const save = (version: number) =>
    form.handleSubmit((parsed) => {
      const body: PersonChange = { version };
      for (const { key } of changed) body[key] = parsed[key] ?? null;
      patch.mutate(body, {
        onSuccess() {
          toast({ tone: "done", text: "Saved." });
          onDone();
        },
        onError(error) {
          showFieldErrors(error, form.setError, (path) => path in parsed);
          if (error instanceof ApiError && error.status === 409) {
            void queryClient.invalidateQueries(personQuery(investigationId, person.id));
          }
        },
      });
    });

  return (
    <form noValidate onSubmit={(event) => void save(begun.version)(event)}>
      <UnsavedGuard unsaved={isDirty && !patch.isSuccess} />
      {stale ? (
        <ConflictTable
          fields={changed}
          begun={valuesOf(begun)}
          saved={valuesOf(person)}
          yours={form.getValues()}
          pending={patch.isPending}
          onKeepSaved={onDone}
          onSaveMine={() => void save(person.version)()}
        />
      ) : patch.isError ? (
        <Notice tone="error" title="Not saved." className="mb-3">
          {errorWords(patch.error)}. What you typed is still here.
        </Notice>
      ) : null}
      <div className="grid gap-x-6 gap-y-3 sm:grid-cols-2">
        {fields.map((field) => (
          <PersonFieldInput key={field.key} {...{ field, form, today }} />
        ))}
      </div>
      {stale ? null : (
        <p className="mt-4 flex flex-wrap gap-2">
          <Button variant="primary" type="submit" pending={patch.isPending} disabled={!isDirty}>
            Save
          </Button>
          <Button onClick={onDone}>Cancel</Button>
        </p>
      )}
    </form>
  );
}
