import type { ComponentProps } from "react";
import { type ButtonSize, type ButtonVariant, buttonClass } from "./button-class.ts";

export type ButtonProps = ComponentProps<"button"> & {
  variant?: ButtonVariant;
  size?: ButtonSize;
  /** Work is under way: the button stays focusable, says so, and ignores clicks. */
  pending?: boolean;
  /** Text while pending; the ordinary text by default. */
  pendingLabel?: string;
};

/** A button; `type="button"` unless told otherwise, so none submits a form by accident. */
export function Button({
  variant = "quiet",
  size = "normal",
  pending = false,
  pendingLabel,
  className,
  children,
  onClick,
  type = "button",
  ...rest
}: ButtonProps) {
  return (
    <button
      {...rest}
      type={type}
      aria-busy={pending || undefined}
      aria-disabled={pending || undefined}
      className={buttonClass(variant, size, className)}
      onClick={(event) => {
        // Not `disabled`: that would drop the keyboard focus in the middle of a task.
        if (pending) event.preventDefault();
        else onClick?.(event);
      }}
    >
      {pending ? (pendingLabel ?? children) : children}
      {pending ? <span aria-hidden="true">…</span> : null}
    </button>
  );
}
