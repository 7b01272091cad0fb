import { type ComponentProps, useId } from "react";
import { describedBy, FieldFrame, type FieldProps } from "./field-frame.tsx";

export type TextareaFieldProps = FieldProps & ComponentProps<"textarea">;

/** Several lines of text; spread `register(name)` of the form into it. */
export function TextareaField({
  label,
  hideLabel,
  hint,
  error,
  className,
  id: givenId,
  rows = 3,
  ...rest
}: TextareaFieldProps) {
  const ownId = useId();
  const id = givenId ?? ownId;
  return (
    <FieldFrame
      {...{ id, label, hideLabel, hint, error, className }}
      required={rest.required || rest["aria-required"] === true}
    >
      <textarea
        {...rest}
        id={id}
        rows={rows}
        aria-invalid={error ? true : undefined}
        aria-describedby={describedBy(id, { label, hint, error })}
        className="field-box"
      />
    </FieldFrame>
  );
}
