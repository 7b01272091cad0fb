import { type ComponentProps, useId } from "react";
import { describedBy, FieldNotes, type FieldProps } from "./field-frame.tsx";

export type CheckboxFieldProps = FieldProps & Omit<ComponentProps<"input">, "type">;

/** One yes-or-no box; spread `register(name)` of the form into it. */
export function CheckboxField({
  label,
  hideLabel = false,
  hint,
  error,
  className,
  id: givenId,
  ...rest
}: CheckboxFieldProps) {
  const ownId = useId();
  const id = givenId ?? ownId;
  return (
    <div className={className}>
      <label htmlFor={id} className="inline-flex min-h-9 items-center gap-2">
        <input
          {...rest}
          id={id}
          type="checkbox"
          aria-invalid={error ? true : undefined}
          aria-describedby={describedBy(id, { label, hint, error })}
        />
        <span className={hideLabel ? "sr-only" : undefined}>{label}</span>
      </label>
      <FieldNotes id={id} hint={hint} error={error} />
    </div>
  );
}
