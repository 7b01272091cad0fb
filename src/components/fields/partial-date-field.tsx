import { type Ref, useId, useState } from "react";
import { formatDay, formatRelativeDay } from "../../lib/formatters.ts";
import { parsePartialDate } from "../../lib/partial-date.ts";
import { AnswerButtons } from "./answer-buttons.tsx";
import { describedBy, FieldFrame, type FieldProps } from "./field-frame.tsx";

export type PartialDateFieldProps = FieldProps & {
  name?: string;
  /** "" (not asked), YYYY-MM-DD, YYYY-MM, "unknown", "refused"; text still being typed otherwise. */
  value: string;
  onChange: (value: string) => void;
  onBlur?: () => void;
  ref?: Ref<HTMLInputElement>;
  /** The investigation's day: "today", "yesterday" and "-3" count from it. */
  today?: string;
  /** Whether a month alone will do (default). */
  allowMonth?: boolean;
  /** Offer "unknown" and "refused" (default). */
  answers?: boolean;
  id?: string;
  required?: boolean;
  disabled?: boolean;
  className?: string;
};

/**
 * A date that may be known to the month only, unknown, refused, or not asked: four things that are
 * never turned into one another. Typed: 2026-05-18, 20260518, 2026-05, u, r, today, -3.
 */
export function PartialDateField({
  label,
  hideLabel,
  hint,
  error,
  name,
  value,
  onChange,
  onBlur,
  ref,
  today,
  allowMonth = true,
  answers = true,
  id: givenId,
  required,
  disabled,
  className,
}: PartialDateFieldProps) {
  const ownId = useId();
  const id = givenId ?? ownId;
  const [left, setLeft] = useState(false);
  const parsed = parsePartialDate(value, { today, allowMonth, answers });
  const ownError = left && parsed.kind === "invalid" ? parsed.reason : undefined;
  const shownError = error ?? ownError;
  const read = reading(parsed, today);

  function settle() {
    setLeft(true);
    if (parsed.kind !== "invalid" && parsed.value !== value) onChange(parsed.value);
    onBlur?.();
  }

  return (
    <FieldFrame {...{ id, label, hideLabel, hint, required, className }} error={shownError}>
      <span className="flex">
        <input
          ref={ref}
          id={id}
          name={name}
          type="text"
          autoComplete="off"
          spellCheck={false}
          disabled={disabled}
          placeholder={allowMonth ? "YYYY-MM-DD or YYYY-MM" : "YYYY-MM-DD"}
          aria-required={required || undefined}
          aria-invalid={shownError ? true : undefined}
          aria-describedby={[
            read ? `${id}-read` : "",
            describedBy(id, { label, hint, error: shownError }),
          ]
            .filter(Boolean)
            .join(" ")}
          className={`field-box min-w-0 flex-1 ${
            parsed.kind === "unknown" || parsed.kind === "refused" ? "italic" : ""
          }`}
          value={value}
          onChange={(event) => {
            setLeft(false);
            onChange(event.target.value);
          }}
          onBlur={settle}
          onKeyDown={(event) => {
            if (event.key === "Enter") settle();
          }}
        />
        {answers ? (
          <AnswerButtons
            fieldLabel={typeof label === "string" ? label : "date"}
            value={parsed.kind === "invalid" ? "" : parsed.value}
            disabled={disabled}
            onChoose={onChange}
          />
        ) : null}
      </span>
      {/* Keeps its line while something is being typed, so that the form does not jump. */}
      {shownError && !read ? null : (
        <p id={`${id}-read`} className="mt-0.5 min-h-5 text-sm leading-5 text-ink-2">
          {read}
        </p>
      )}
    </FieldFrame>
  );
}

function reading(parsed: ReturnType<typeof parsePartialDate>, today: string | undefined): string {
  switch (parsed.kind) {
    case "blank":
      return "not asked";
    case "day": {
      const day = formatDay(parsed.value, { style: "long" });
      return today ? `${day} · ${formatRelativeDay(parsed.value, today)}` : day;
    }
    case "month":
      return `${formatDay(parsed.value)}, day not known`;
    case "unknown":
      return "asked, not known";
    case "refused":
      return "asked, not told";
    case "invalid":
      return "";
  }
}
