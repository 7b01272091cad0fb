import { type ComponentProps, type ReactNode, useId } from "react";
import { describedBy, FieldFrame, type FieldProps } from "./field-frame.tsx";

export type NumberFieldProps = FieldProps &
  Omit<ComponentProps<"input">, "type"> & {
    /** Unit after the box, read out with the label: "minutes". */
    unit?: ReactNode;
    /** Whole numbers get the digit pad of a phone, others the one with a decimal point. */
    whole?: boolean;
  };

/**
 * A figure, typed as text: a browser number box changes its value when a wheel passes over it and
 * swallows what it cannot read. The form's schema coerces and checks.
 */
export function NumberField({
  label,
  hideLabel,
  hint,
  error,
  unit,
  whole = false,
  className,
  id: givenId,
  ...rest
}: NumberFieldProps) {
  const ownId = useId();
  const id = givenId ?? ownId;
  return (
    <FieldFrame
      {...{ id, hideLabel, hint, error, className }}
      label={
        <>
          {label}
          {unit ? " " : null}
          {unit ? <span className="sr-only">({unit})</span> : null}
        </>
      }
      required={rest.required || rest["aria-required"] === true}
    >
      <span className="flex items-center gap-2">
        <input
          autoComplete="off"
          {...rest}
          id={id}
          type="text"
          inputMode={whole ? "numeric" : "decimal"}
          aria-invalid={error ? true : undefined}
          aria-describedby={describedBy(id, { label, hint, error })}
          className="field-box min-w-14 max-w-36 text-end"
        />
        {unit ? (
          <span className="shrink-0 text-sm text-ink-2" aria-hidden="true">
            {unit}
          </span>
        ) : null}
      </span>
    </FieldFrame>
  );
}
