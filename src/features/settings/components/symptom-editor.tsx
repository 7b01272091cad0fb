import { useEffect, useId, useRef, useState } from "react";
import { useFieldArray, useWatch } from "react-hook-form";
import { TextField } from "../../../components/fields/text-field.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { fieldWords } from "../../../lib/form-errors.ts";
import { listError } from "../form/list-error.ts";
import { useSettings, useSettingsDesk } from "../form/settings-desk.ts";
import { symptomCode } from "../form/symptom-code.ts";
import { SETTING_NOTES } from "../setting-notes.ts";
import { SymptomItem } from "./symptom-item.tsx";

/** The symptoms asked about: added, named anew, put in order, removed. All by keyboard too. */
export function SymptomEditor() {
  const { saved } = useSettingsDesk();
  const { control, formState, getValues } = useSettings();
  const { fields, append, move, remove } = useFieldArray({ control, name: "symptoms" });
  const [label, setLabel] = useState("");
  const [error, setError] = useState<string>();
  const [said, setSaid] = useState("");
  const list = useRef<HTMLOListElement>(null);
  const adding = useRef<HTMLInputElement>(null);
  const focusNext = useRef<string | null>(null);
  const id = useId();
  const { label: title, does } = SETTING_NOTES.symptoms;
  const current = useWatch({ control, name: "symptoms" });
  const nameOf = (index: number) => current[index]?.label.trim() || "it";

  // A moved row is put elsewhere in the page, which takes the focus off its button.
  useEffect(() => {
    const wanted = focusNext.current;
    if (wanted === null) return;
    focusNext.current = null;
    const target = list.current?.querySelector<HTMLElement>(`[data-focus="${wanted}"]`);
    (target ?? adding.current)?.focus();
  });

  function add() {
    const wanted = label.trim();
    if (wanted === "") {
      setError("required");
      adding.current?.focus();
      return;
    }
    const now = getValues("symptoms");
    if (now.some((one) => one.label.trim().toLowerCase() === wanted.toLowerCase())) {
      setError("repeated");
      adding.current?.focus();
      return;
    }
    // The same label again is the same symptom again, so that its earlier checks belong to it.
    const known = saved.symptoms.find((one) => one.label.toLowerCase() === wanted.toLowerCase());
    const back = known && now.every(({ code }) => code !== known.code) ? known.code : undefined;
    const taken = new Set([...now, ...saved.symptoms].map(({ code }) => code));
    append({ code: back ?? symptomCode(wanted, taken), label: wanted }, { shouldFocus: false });
    setLabel("");
    setError(undefined);
    setSaid(`${wanted} added at the end.`);
  }

  function moveTo(from: number, to: number, button: "up" | "down") {
    const { code } = getValues(`symptoms.${from}`);
    const atEnd = to === 0 || to === fields.length - 1;
    const other = button === "up" ? "down" : "up";
    focusNext.current = `${code} ${atEnd ? other : button}`;
    setSaid(`${nameOf(from)} is now ${to + 1} of ${fields.length}.`);
    move(from, to);
  }

  function drop(index: number) {
    const next = getValues("symptoms")[index + 1] ?? getValues("symptoms")[index - 1];
    focusNext.current = next ? `${next.code} label` : "add";
    setSaid(`${nameOf(index)} removed.`);
    remove(index);
  }

  const listWords = listError(formState.errors.symptoms);
  return (
    <fieldset aria-describedby={`${id}-does`}>
      <legend className="text-sm font-bold">{title}</legend>
      <p id={`${id}-does`} className="mb-2 text-sm text-ink-2">
        {does}
      </p>
      {listWords ? (
        <p className="mb-2 text-sm text-coral">
          <span className="font-bold">Check: </span>
          {listWords}
        </p>
      ) : null}
      <ol ref={list} className="border-t border-rule">
        {fields.map((field, index) => (
          <SymptomItem
            key={field.id}
            index={index}
            count={fields.length}
            code={field.code}
            name={nameOf(index)}
            onMove={moveTo}
            onRemove={drop}
          />
        ))}
      </ol>
      <div className="mt-3 flex items-end gap-2">
        <TextField
          ref={adding}
          label="New symptom"
          className="flex-1"
          value={label}
          error={fieldWords(error)}
          onChange={(event) => {
            setLabel(event.target.value);
            setError(undefined);
          }}
          onKeyDown={(event) => {
            if (event.key !== "Enter") return;
            // Enter would send the whole form.
            event.preventDefault();
            add();
          }}
        />
        <Button className={error ? "mb-6.5" : undefined} onClick={add}>
          Add
        </Button>
      </div>
      <p role="status" className="sr-only">
        {said}
      </p>
    </fieldset>
  );
}
