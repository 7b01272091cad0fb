import { clsx } from "clsx";
import type { ReactNode } from "react";

/** What every field takes beside the attributes of its own input. */
export type FieldProps = {
  label: ReactNode;
  /** Label for readers only; for fields in a row whose column is already headed. */
  hideLabel?: boolean;
  /** What to write and why it is asked, under the box. */
  hint?: ReactNode;
  /** The error of this field, in words; undefined when there is none. */
  error?: string;
};

export type FieldFrameProps = FieldProps & {
  /** Id of the input; hint and error get it with `-hint` and `-error`. */
  id: string;
  required?: boolean;
  children: ReactNode;
  className?: string;
};

/** The value of aria-describedby for an input inside a FieldFrame. */
export function describedBy(id: string, { hint, error }: FieldProps): string | undefined {
  const ids = [error ? `${id}-error` : "", hint ? `${id}-hint` : ""].filter(Boolean).join(" ");
  return ids === "" ? undefined : ids;
}

/** Label above, box, then the error and the hint beside it. */
export function FieldFrame({
  id,
  label,
  hideLabel = false,
  hint,
  error,
  required = false,
  children,
  className,
}: FieldFrameProps) {
  return (
    <div className={clsx("min-w-0", className)}>
      <label htmlFor={id} className={hideLabel ? "sr-only" : "mb-1 block text-sm font-bold"}>
        {label}
        {required ? <span className="font-normal text-ink-2"> required</span> : null}
      </label>
      {children}
      <FieldNotes id={id} hint={hint} error={error} />
    </div>
  );
}

/** Error and hint of a field, with the ids its input points to. */
export function FieldNotes({
  id,
  hint,
  error,
}: Pick<FieldProps, "hint" | "error"> & { id: string }) {
  return (
    <>
      {error ? (
        <p id={`${id}-error`} className="mt-1 text-sm text-coral">
          <span className="font-bold">Check: </span>
          {error}
        </p>
      ) : null}
      {hint ? (
        <p id={`${id}-hint`} className="mt-1 text-sm text-ink-2">
          {hint}
        </p>
      ) : null}
    </>
  );
}
