import { type Ref, useId } from "react";
import { describedBy, FieldNotes, type FieldProps } from "./field-frame.tsx";

export type RadioOption = { value: string; label: string };

export type RadioRowProps = FieldProps & {
  name: string;
  options: readonly RadioOption[];
  /** Controlled use (Controller); leave out when `register(name)` is spread in. */
  value?: string;
  /** Takes the change event, as `register` and Controller's `field.onChange` do. */
  onChange?: (event: React.ChangeEvent<HTMLInputElement>) => void;
  onBlur?: (event: React.FocusEvent<HTMLInputElement>) => void;
  ref?: Ref<HTMLInputElement>;
  disabled?: boolean;
  className?: string;
};

/** A few choices side by side; arrow keys move, the label is part of the target. */
export function RadioRow({
  label,
  hideLabel = false,
  hint,
  error,
  name,
  options,
  value,
  onChange,
  onBlur,
  ref,
  disabled,
  className,
}: RadioRowProps) {
  const id = useId();
  return (
    <fieldset
      className={className}
      disabled={disabled}
      aria-describedby={describedBy(id, { label, hint, error })}
    >
      <legend className={hideLabel ? "sr-only" : "mb-1 text-sm font-bold"}>{label}</legend>
      <div className="flex flex-wrap gap-x-5 gap-y-1">
        {options.map((option) => (
          <label key={option.value} className="inline-flex min-h-9 items-center gap-2">
            <input
              type="radio"
              name={name}
              ref={ref}
              value={option.value}
              checked={value === undefined ? undefined : value === option.value}
              onChange={onChange}
              onBlur={onBlur}
            />
            {option.label}
          </label>
        ))}
      </div>
      <FieldNotes id={id} hint={hint} error={error} />
    </fieldset>
  );
}
