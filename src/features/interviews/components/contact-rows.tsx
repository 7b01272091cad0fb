import { type ReactNode, useCallback, useEffect, useLayoutEffect, useRef, useState } from "react";
import { useFieldArray } from "react-hook-form";
import { LIMITS } from "../../../../shared/contracts/common.ts";
import { Section } from "../../../components/layouts/section.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { KeyboardHint } from "../../../components/ui/keyboard-hint.tsx";
import { useToast } from "../../../components/ui/use-toast.ts";
import {
  blankContact,
  carriedKeys,
  contactTextKeys,
  isBlankContact,
} from "../form/interview-values.ts";
import { ContactRow } from "./contact-row.tsx";
import { contactColumns, contactHeads } from "./row-grid.ts";
import { createRowKeys, focusBox } from "./row-keys.ts";
import { useInterviewForm } from "./use-exposure-boxes.ts";

export type ContactRowsProps = {
  /** Something was added or taken away: a good moment to save. */
  onStep: () => void;
  /** The cursor goes into the last row when the page opens. */
  autoFocus: boolean;
  notes?: ReactNode;
};

/** The contacts that a case names, one row each, typed without a pointer. */
export function ContactRows({ onStep, autoFocus, notes }: ContactRowsProps) {
  const form = useInterviewForm();
  const { fields, append, remove, insert } = useFieldArray({
    control: form.control,
    name: "contacts",
  });
  const root = useRef<HTMLDivElement>(null);
  const wanted = useRef<{ row: number; box: string } | null>(
    autoFocus ? { row: fields.length - 1, box: "name" } : null,
  );
  const [active, setActive] = useState<number | null>(null);
  const [, redraw] = useState(0);
  const toast = useToast();

  // After each drawing, because a row has to stand on the page before the cursor can go there; and
  // before the next key can come, or it would land in the box before.
  useLayoutEffect(() => {
    if (!wanted.current || !root.current) return;
    if (focusBox(root.current, "contacts", wanted.current.row, wanted.current.box)) {
      wanted.current = null;
    }
  });

  const focusSoon = useCallback((row: number, box: string) => {
    wanted.current = { row, box };
    redraw((count) => count + 1);
  }, []);

  function openNext() {
    const rows = form.getValues("contacts");
    const last = rows.at(-1);
    if (last && isBlankContact(last)) focusSoon(rows.length - 1, "name");
    else if (rows.length < LIMITS.contacts) {
      wanted.current = { row: rows.length, box: "name" };
      append(blankContact(), { shouldFocus: false });
    }
    onStep();
  }

  function takeAway(row: number) {
    // A copy: the form library empties its own object when the row goes.
    const taken = structuredClone(form.getValues(`contacts.${row}`));
    const only = form.getValues("contacts").length === 1;
    wanted.current = { row: Math.max(0, row - 1), box: "name" };
    remove(row);
    if (only) append(blankContact(), { shouldFocus: false });
    if (!isBlankContact(taken)) {
      toast({
        text: `Row ${row + 1} was taken away`,
        action: {
          label: "Put it back",
          run: () => insert(Math.min(row, form.getValues("contacts").length), taken),
        },
      });
    }
    onStep();
  }

  function carry(row: number) {
    if (row === 0) return;
    const above = form.getValues(`contacts.${row - 1}`);
    for (const key of carriedKeys) {
      form.setValue(`contacts.${row}.${key}`, above[key], { shouldDirty: true });
    }
  }

  const handlers = { takeAway, carry };
  const latest = useRef(handlers);
  useEffect(() => {
    latest.current = handlers;
  });
  const onRemove = useCallback((row: number) => latest.current.takeAway(row), []);
  const onCarry = useCallback((row: number) => latest.current.carry(row), []);

  const onKeyDown = createRowKeys({
    list: "contacts",
    boxes: contactTextKeys,
    rows: () => form.getValues("contacts").length,
    isBlank: (row) => isBlankContact(form.getValues(`contacts.${row}`)),
    openNext,
    remove: takeAway,
    carry,
  });

  return (
    <Section title="Contacts" subLine="people the case can name; each becomes a contact pair">
      <div className="mb-1 hidden flex-wrap gap-x-5 gap-y-1 lg:pointer-fine:flex">
        <KeyboardHint keys={["Enter"]}>next box, at the end next row</KeyboardHint>
        <KeyboardHint keys={["Ctrl", "Enter"]}>next row</KeyboardHint>
        <KeyboardHint keys={["Alt", "↑", "↓"]}>row above, below</KeyboardHint>
        <KeyboardHint keys={["Ctrl", "'"]}>setting, place, days as above</KeyboardHint>
        <KeyboardHint keys={["Ctrl", "⌫"]}>take an empty row away</KeyboardHint>
        <KeyboardHint keys={["u", "r"]}>unknown, refused</KeyboardHint>
      </div>
      {/* biome-ignore lint/a11y/noStaticElementInteractions: keys move between the boxes inside; every box is a control of its own. */}
      <div
        ref={root}
        onKeyDown={onKeyDown}
        onFocus={(event) => {
          const at = event.target.closest<HTMLElement>("[data-contact-row]");
          setActive(at ? Number(at.dataset.contactRow) : null);
        }}
        onBlur={(event) => {
          if (!event.currentTarget.contains(event.relatedTarget)) setActive(null);
        }}
      >
        <div
          aria-hidden="true"
          className={`${contactColumns} hidden border-y border-rule border-t-ink py-1 text-sm
            text-ink-2 min-[85rem]:grid`}
        >
          <span />
          {Object.entries(contactHeads).map(([box, head]) => (
            <span key={box} className="px-1.5">
              {head}
            </span>
          ))}
        </div>
        {fields.map((field, row) => (
          <ContactRow
            key={field.id}
            row={row}
            active={active === row}
            onRemove={onRemove}
            onCarry={onCarry}
            onFocusBox={focusSoon}
          />
        ))}
      </div>
      <div className="mt-2 flex flex-wrap items-baseline gap-x-4 gap-y-1">
        <Button data-add-contact="" onClick={openNext} disabled={fields.length >= LIMITS.contacts}>
          Add a contact
        </Button>
        {notes}
      </div>
    </Section>
  );
}
