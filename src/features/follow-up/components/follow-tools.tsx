import { useEffect, useId, useState } from "react";
import { MenuSelect } from "../../../components/ui/menu-select.tsx";
import type { FollowUpAsk } from "../api/use-follow-up.ts";

const shows: readonly { value: FollowUpAsk["show"]; label: string }[] = [
  { value: "due", label: "due today" },
  { value: "all", label: "all with a day 0" },
  { value: "ended", label: "past their last day, or ended" },
  { value: "without_day_zero", label: "without a day 0" },
];

const sorts = [
  { value: "lastDueDay", label: "ending first" },
  { value: "-lastDueDay", label: "ending last" },
  { value: "studyNumber", label: "study number" },
  { value: "area", label: "area" },
] as const;

export type FollowToolsProps = {
  ask: FollowUpAsk;
  onChange: (change: Partial<FollowUpAsk>) => void;
};

/** On a phone the choices speak for themselves, and both stand on one line. */
const labelFromTablet = "max-sm:[&>span]:sr-only";

const pauseMs = 350;
/**
 * A study number from its third character on, with a digit or the hyphen in it: a name has neither,
 * so none can slip into an address.
 */
const studyNumber = /^(?=.*[-\d])[0-9A-HJKMNP-TV-Z]{3}-?[0-9A-HJKMNP-TV-Z]{0,4}$/i;

/** Which contacts are listed. A search stands in the address, so it takes study numbers only. */
export function FollowTools({ ask, onChange }: FollowToolsProps) {
  const [typed, setTyped] = useState(ask.q);
  const errorId = useId();
  const readable = typed.trim().length < 4 || studyNumber.test(typed.trim());

  useEffect(() => {
    const q = typed.trim().toUpperCase();
    if (q === ask.q || !(q === "" || studyNumber.test(q))) return;
    const timer = setTimeout(() => onChange({ q }), pauseMs);
    return () => clearTimeout(timer);
  }, [typed, ask.q, onChange]);

  return (
    <div className="mb-3 flex flex-wrap items-start gap-x-3 gap-y-2 sm:gap-x-5">
      <MenuSelect
        label="Show"
        className={labelFromTablet}
        options={shows}
        value={ask.show}
        onValueChange={(show) => onChange({ show })}
      />
      <MenuSelect
        label="Order"
        className={labelFromTablet}
        options={sorts}
        value={sorts.find(({ value }) => value === ask.sort)?.value ?? "lastDueDay"}
        onValueChange={(sort) => onChange({ sort })}
      />
      <div>
        <label className="inline-flex items-center gap-2 text-sm">
          <span className="shrink-0 text-ink-2">Study number</span>
          <input
            type="search"
            autoComplete="off"
            spellCheck={false}
            className="field-box w-36!"
            value={typed}
            aria-invalid={readable ? undefined : true}
            aria-describedby={readable ? undefined : errorId}
            onChange={(event) => setTyped(event.target.value)}
          />
        </label>
        {readable ? null : (
          <p id={errorId} className="mt-1 text-sm text-coral">
            Study numbers only; names are looked for in Trace.
          </p>
        )}
      </div>
    </div>
  );
}
