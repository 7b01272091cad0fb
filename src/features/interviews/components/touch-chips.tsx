import { useRef } from "react";

export interface Chip {
  label: string;
  value: string;
}

export type TouchChipsProps = {
  /** Name of the box they fill, for readers. */
  boxLabel: string;
  chips: readonly Chip[];
  onChoose: (value: string) => void;
  /** Offer the device's own calendar. */
  calendar?: boolean;
};

/**
 * Answers under a box that a thumb gives faster than a keyboard. Shown on small and on touch screens only and
 * left out of the order of Tab, since every one of them can also be typed.
 */
export function TouchChips({ boxLabel, chips, onChoose, calendar = false }: TouchChipsProps) {
  const picker = useRef<HTMLInputElement>(null);
  return (
    <div className="mt-1 flex flex-wrap gap-x-3 gap-y-1 lg:hidden lg:pointer-coarse:flex">
      {chips.map(({ label, value }) => (
        <button
          key={label}
          type="button"
          tabIndex={-1}
          aria-label={`${boxLabel}: ${label}`}
          className="min-h-8 text-sm text-kelp underline decoration-1 underline-offset-4"
          onClick={() => onChoose(value)}
        >
          {label}
        </button>
      ))}
      {calendar ? (
        <span className="relative">
          <button
            type="button"
            tabIndex={-1}
            aria-label={`${boxLabel}: choose in a calendar`}
            className="min-h-8 text-sm text-kelp underline decoration-1 underline-offset-4"
            onClick={() => picker.current?.showPicker()}
          >
            calendar
          </button>
          <input
            ref={picker}
            type="date"
            tabIndex={-1}
            aria-hidden="true"
            className="pointer-events-none absolute inset-0 opacity-0"
            onChange={(event) => {
              if (event.target.value) onChoose(event.target.value);
            }}
          />
        </span>
      ) : null}
    </div>
  );
}
