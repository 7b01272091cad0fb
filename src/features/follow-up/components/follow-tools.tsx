import { useEffect, useState } from "react";
import { TextField } from "../../../components/fields/text-field.tsx";
import { MenuSelect } from "../../../components/ui/menu-select.tsx";
import type { FollowUpAsk } from "../api/use-follow-up.ts";

const shows: readonly { value: FollowUpAsk["show"]; label: string }[] = [
  { value: "due", label: "due today" },
  { value: "all", label: "all with a day 0" },
  { value: "ended", label: "past their last day" },
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

const pauseMs = 350;
/**
 * A study number from its third character on, with a digit or the hyphen in it: a name has neither,
 * so none can slip into an address.
 */
const studyNumber = /^(?=.*[-\d])[0-9A-HJKMNP-TV-Z]{3}-?[0-9A-HJKMNP-TV-Z]{0,4}$/i;

/** Which contacts are listed. A search stands in the address, so it takes study numbers only. */
export function FollowTools({ ask, onChange }: FollowToolsProps) {
  const [typed, setTyped] = useState(ask.q);
  const readable = typed.trim().length < 4 || studyNumber.test(typed.trim());

  useEffect(() => {
    const q = typed.trim().toUpperCase();
    if (q === ask.q || !(q === "" || studyNumber.test(q))) return;
    const timer = setTimeout(() => onChange({ q }), pauseMs);
    return () => clearTimeout(timer);
  }, [typed, ask.q, onChange]);

  return (
    <div className="mb-3 flex flex-wrap items-end gap-x-5 gap-y-2">
      <MenuSelect
        label="Show"
        options={shows}
        value={ask.show}
        onValueChange={(show) => onChange({ show })}
      />
      <MenuSelect
        label="Order"
        options={sorts}
        value={sorts.find(({ value }) => value === ask.sort)?.value ?? "lastDueDay"}
        onValueChange={(sort) => onChange({ sort })}
      />
      <TextField
        label="Study number"
        className="w-44"
        type="search"
        spellCheck={false}
        value={typed}
        error={readable ? undefined : "study numbers only; names are looked for in Trace"}
        onChange={(event) => setTyped(event.target.value)}
      />
    </div>
  );
}
