import { clsx } from "clsx";

/** How much a button asks for attention: one primary a page, danger only for what cannot be undone. */
export type ButtonVariant = "primary" | "quiet" | "danger" | "plain";
export type ButtonSize = "normal" | "small";

const base =
  "inline-flex items-center justify-center gap-2 rounded-[2px] border text-center font-normal " +
  "no-underline transition-colors disabled:cursor-not-allowed aria-disabled:cursor-not-allowed";

const variants: Record<ButtonVariant, string> = {
  primary:
    "border-ink bg-ink font-bold text-paper hover:border-kelp hover:bg-kelp " +
    "disabled:border-ink-2 disabled:bg-ink-2",
  quiet:
    "border-ink-2 bg-paper text-ink hover:border-ink hover:bg-paper-2 " +
    "disabled:border-dashed disabled:border-rule disabled:bg-paper disabled:text-ink-2",
  danger:
    "border-coral bg-paper text-coral hover:bg-coral hover:text-paper " +
    "disabled:border-dashed disabled:bg-paper disabled:text-ink-2",
  plain:
    "border-transparent bg-transparent text-kelp underline decoration-1 underline-offset-4 " +
    "hover:decoration-2 disabled:text-ink-2 disabled:no-underline",
};

const sizes: Record<ButtonSize, string> = {
  normal: "min-h-9 px-3.5 py-1 pointer-coarse:min-h-11",
  small: "min-h-7 px-2 py-0.5 text-sm pointer-coarse:min-h-9",
};

/** Classes shared by buttons and links that look like buttons. */
export function buttonClass(variant: ButtonVariant, size: ButtonSize, extra?: string): string {
  return clsx(base, variants[variant], sizes[size], extra);
}
