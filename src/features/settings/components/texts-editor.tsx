import { useRef, useState } from "react";
import { useFieldArray } from "react-hook-form";
import {
  type SettingTexts,
  settingTexts,
  TEXT_KINDS,
} from "../../../../shared/contracts/settings.ts";
import { SelectField } from "../../../components/fields/select-field.tsx";
import { TextField } from "../../../components/fields/text-field.tsx";
import { TextareaField } from "../../../components/fields/textarea-field.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { fieldWords } from "../../../lib/form-errors.ts";
import { listError } from "../form/list-error.ts";
import { useSettings } from "../form/settings-desk.ts";
import { languageName } from "../language-name.ts";
import { SETTING_NOTES } from "../setting-notes.ts";
import { textKindWords } from "../setting-words.ts";

type Kind = SettingTexts[number]["kind"];

const kinds = TEXT_KINDS.map((kind) => ({ value: kind, label: textKindWords[kind] }));

/** "pt-br" as the tag is written: pt-BR. Null when it is no language tag. */
function readTag(typed: string): string | null {
  try {
    return Intl.getCanonicalLocales(typed.trim())[0] ?? null;
  } catch {
    return null;
  }
}

/** Advice and consent by language: added, worded, removed. */
export function TextsEditor() {
  const { control, register, formState, getValues } = useSettings();
  const { fields, append, remove } = useFieldArray({ control, name: "texts" });
  const [kind, setKind] = useState<Kind>("advice");
  const [typed, setTyped] = useState("");
  const [error, setError] = useState<string>();
  const [said, setSaid] = useState("");
  const box = useRef<HTMLInputElement>(null);
  const { label, does } = SETTING_NOTES.texts;
  const listWords = listError(formState.errors.texts);

  function add() {
    const language = readTag(typed);
    const shape = settingTexts.element.shape.language;
    const problem =
      typed.trim() === ""
        ? "required"
        : language === null || !shape.safeParse(language).success
          ? "invalid"
          : getValues("texts").some((one) => one.kind === kind && one.language === language)
            ? "repeated"
            : undefined;
    setError(problem);
    if (problem !== undefined || language === null) {
      box.current?.focus();
      return;
    }
    append({ kind, language, text: "" });
    setTyped("");
    setSaid(`${textKindWords[kind]} in ${languageName(language)} added; write it above.`);
  }

  function drop(index: number) {
    const one = getValues(`texts.${index}`);
    setSaid(`${textKindWords[one.kind]} in ${languageName(one.language)} removed.`);
    remove(index);
    box.current?.focus();
  }

  return (
    <fieldset>
      <legend className="text-sm font-bold">{label}</legend>
      <p className="mb-3 text-sm text-ink-2">{does}</p>
      {listWords ? (
        <p className="mb-2 text-sm text-coral">
          <span className="font-bold">Check: </span>
          {listWords}
        </p>
      ) : null}
      <div className="space-y-4">
        {fields.map((field, index) => {
          const name = `${textKindWords[field.kind]} in ${languageName(field.language)}`;
          const errors = formState.errors.texts?.[index];
          return (
            <div key={field.id}>
              <TextareaField
                label={
                  <>
                    {name} <span className="font-normal text-ink-2">{field.language}</span>
                  </>
                }
                rows={4}
                lang={field.language}
                dir="auto"
                error={fieldWords(errors?.text?.message ?? errors?.language?.message)}
                {...register(`texts.${index}.text`)}
              />
              <Button variant="plain" size="small" className="-ms-2" onClick={() => drop(index)}>
                Remove <span className="sr-only">{name}</span>
              </Button>
            </div>
          );
        })}
      </div>
      <div className="mt-4 grid gap-2 border-t border-rule pt-3 sm:grid-cols-[9rem_minmax(0,1fr)_auto]">
        <SelectField
          label="Kind of text"
          options={kinds}
          value={kind}
          onChange={(event) => {
            setKind(event.target.value as Kind);
            setError(undefined);
          }}
        />
        <TextField
          ref={box}
          label="Language"
          hint="Its tag, such as en or ar."
          spellCheck={false}
          value={typed}
          error={fieldWords(error)}
          onChange={(event) => {
            setTyped(event.target.value);
            setError(undefined);
          }}
          onKeyDown={(event) => {
            if (event.key !== "Enter") return;
            // Enter would send the whole form.
            event.preventDefault();
            add();
          }}
        />
        <Button className="self-start sm:mt-6" onClick={add}>
          Add a language
        </Button>
      </div>
      <p role="status" className="sr-only">
        {said}
      </p>
    </fieldset>
  );
}
