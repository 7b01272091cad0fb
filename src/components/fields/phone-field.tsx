import { type Ref, useId } from "react";
import { AnswerButtons } from "./answer-buttons.tsx";
import { describedBy, FieldFrame, type FieldProps } from "./field-frame.tsx";

export type PhoneFieldProps = FieldProps & {
  name?: string;
  /** As typed; "" = not asked, or the words unknown and refused. */
  value: string;
  onChange: (value: string) => void;
  onBlur?: () => void;
  ref?: Ref<HTMLInputElement>;
  id?: string;
  required?: boolean;
  disabled?: boolean;
  className?: string;
  /** Offer "unknown" and "refused" (default). */
  answers?: boolean;
};

const words = new Set(["unknown", "refused"]);

/** A telephone number, kept as typed; made for Controller. No browser suggestions: shared screens. */
export function PhoneField({
  label,
  hideLabel,
  hint,
  error,
  value,
  onChange,
  onBlur,
  ref,
  id: givenId,
  name,
  required,
  disabled,
  className,
  answers = true,
}: PhoneFieldProps) {
  const ownId = useId();
  const id = givenId ?? ownId;
  return (
    <FieldFrame {...{ id, label, hideLabel, hint, error, required, className }}>
      <span className="flex">
        <input
          ref={ref}
          id={id}
          name={name}
          type="tel"
          inputMode="tel"
          autoComplete="off"
          disabled={disabled}
          aria-required={required || undefined}
          aria-invalid={error ? true : undefined}
          aria-describedby={describedBy(id, { label, hint, error })}
          className={`field-box min-w-0 flex-1 ${words.has(value) ? "italic" : ""}`}
          value={value}
          onBlur={onBlur}
          onChange={(event) => onChange(event.target.value)}
        />
        {answers ? (
          <AnswerButtons
            fieldLabel={typeof label === "string" ? label : "phone"}
            value={value}
            disabled={disabled}
            onChoose={onChange}
          />
        ) : null}
      </span>
    </FieldFrame>
  );
}
