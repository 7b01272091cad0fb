import { type ComponentProps, useId } from "react";
import { describedBy, FieldFrame, type FieldProps } from "./field-frame.tsx";

export type TextFieldProps = FieldProps & ComponentProps<"input">;

/** One line of text; spread `register(name)` of the form into it. */
export function TextField({
  label,
  hideLabel,
  hint,
  error,
  className,
  id: givenId,
  ...rest
}: TextFieldProps) {
  const ownId = useId();
  const id = givenId ?? ownId;
  return (
    <FieldFrame
      {...{ id, label, hideLabel, hint, error, className }}
      required={rest.required || rest["aria-required"] === true}
    >
      <input
        autoComplete="off"
        {...rest}
        id={id}
        aria-invalid={error ? true : undefined}
        aria-describedby={describedBy(id, { label, hint, error })}
        className="field-box"
      />
    </FieldFrame>
  );
}
