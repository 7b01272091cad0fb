import { Controller, type UseFormReturn } from "react-hook-form";
import type { PersonInput } from "../../../../shared/contracts/people.ts";
import { PartialDateField } from "../../../components/fields/partial-date-field.tsx";
import { PhoneField } from "../../../components/fields/phone-field.tsx";
import { SelectField } from "../../../components/fields/select-field.tsx";
import { TextField } from "../../../components/fields/text-field.tsx";
import { TextareaField } from "../../../components/fields/textarea-field.tsx";
import { fieldWords } from "../../../lib/form-errors.ts";
import type { PersonField, PersonValues } from "../person-fields.ts";

export type PersonForm = UseFormReturn<PersonValues, unknown, PersonInput>;

export type PersonFieldInputProps = { field: PersonField; form: PersonForm; today: string };

/** The box that fits a field. Blank always means "not asked". */
export function PersonFieldInput({ field, form, today }: PersonFieldInputProps) {
  const { key, label, hint } = field;
  const error = fieldWords(form.formState.errors[key]?.message);
  const className = field.wide ? "sm:col-span-2" : undefined;
  const shared = { label, hint, error, className };
  switch (field.kind) {
    case "date":
      return (
        <Controller
          control={form.control}
          name={key}
          render={({ field: box }) => <PartialDateField {...shared} {...box} today={today} />}
        />
      );
    case "phone":
      return (
        <Controller
          control={form.control}
          name={key}
          render={({ field: box }) => <PhoneField {...shared} {...box} />}
        />
      );
    case "choice":
      return (
        <SelectField
          {...shared}
          emptyLabel="not asked"
          options={field.options ?? []}
          {...form.register(key)}
        />
      );
    case "note":
      return <TextareaField {...shared} {...form.register(key)} />;
    case "email":
      return <TextField {...shared} inputMode="email" spellCheck={false} {...form.register(key)} />;
    case "text":
      return <TextField {...shared} spellCheck={false} {...form.register(key)} />;
  }
}
