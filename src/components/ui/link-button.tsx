import type { ComponentProps } from "react";
import { Link } from "react-router-dom";
import { type ButtonSize, type ButtonVariant, buttonClass } from "./button-class.ts";

export type LinkButtonProps = ComponentProps<typeof Link> & {
  variant?: ButtonVariant;
  size?: ButtonSize;
};

/** A link to another page of the application that looks like a button. */
export function LinkButton({
  variant = "quiet",
  size = "normal",
  className,
  ...rest
}: LinkButtonProps) {
  return <Link {...rest} className={buttonClass(variant, size, className)} />;
}
