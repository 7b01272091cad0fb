import { type ComponentProps, useId } from "react";
import { describedBy, FieldFrame, type FieldProps } from "./field-frame.tsx";

export type SelectOption = { value: string; label: string; disabled?: boolean };

export type SelectFieldProps = FieldProps &
  Omit<ComponentProps<"select">, "children"> & {
    options: readonly SelectOption[];
    /** First, empty choice, such as "not asked"; none when undefined. */
    emptyLabel?: string;
  };

/** A choice from a list by the browser's own select, so that typing the first letters works. */
export function SelectField({
  label,
  hideLabel,
  hint,
  error,
  options,
  emptyLabel,
  className,
  id: givenId,
  ...rest
}: SelectFieldProps) {
  const ownId = useId();
  const id = givenId ?? ownId;
  return (
    <FieldFrame
      {...{ id, label, hideLabel, hint, error, className }}
      required={rest.required || rest["aria-required"] === true}
    >
      <select
        {...rest}
        id={id}
        aria-invalid={error ? true : undefined}
        aria-describedby={describedBy(id, { label, hint, error })}
        className="field-box"
      >
        {emptyLabel === undefined ? null : <option value="">{emptyLabel}</option>}
        {options.map((option) => (
          <option key={option.value} value={option.value} disabled={option.disabled}>
            {option.label}
          </option>
        ))}
      </select>
    </FieldFrame>
  );
}
