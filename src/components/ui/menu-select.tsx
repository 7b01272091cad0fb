import type { ComponentProps, ReactNode } from "react";

export type MenuOption<V extends string> = { value: V; label: string; disabled?: boolean };

export type MenuSelectProps<V extends string> = Omit<
  ComponentProps<"select">,
  "value" | "onChange" | "children" | "size"
> & {
  /** Read out and shown before the box; `hideLabel` keeps it for readers only. */
  label: ReactNode;
  hideLabel?: boolean;
  size?: "normal" | "small";
  options: readonly MenuOption<V>[];
  value: V;
  onValueChange: (value: V) => void;
};

/** A choice in a tool bar (acting role, population, page size): the browser's own select, styled. */
export function MenuSelect<V extends string>({
  label,
  hideLabel = false,
  size = "normal",
  options,
  value,
  onValueChange,
  className,
  ...rest
}: MenuSelectProps<V>) {
  return (
    <label className={`inline-flex min-w-0 items-center gap-2 text-sm ${className ?? ""}`}>
      <span className={hideLabel ? "sr-only" : "shrink-0 text-ink-2"}>{label}</span>
      <select
        {...rest}
        className={`field-box w-auto min-w-0 text-sm ${size === "small" ? "min-h-7 py-0" : ""}`}
        value={value}
        onChange={(event) => {
          const chosen = options.find((option) => option.value === event.target.value);
          if (chosen) onValueChange(chosen.value);
        }}
      >
        {options.map((option) => (
          <option key={option.value} value={option.value} disabled={option.disabled}>
            {option.label}
          </option>
        ))}
      </select>
    </label>
  );
}
