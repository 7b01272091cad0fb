import { TextField } from "../../../components/fields/text-field.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { fieldWords } from "../../../lib/form-errors.ts";
import { useSettings } from "../form/settings-desk.ts";

export type SymptomItemProps = {
  index: number;
  count: number;
  code: string;
  /** Its label as it stands, for the names of the buttons. */
  name: string;
  onMove: (from: number, to: number, button: "up" | "down") => void;
  onRemove: (index: number) => void;
};

/** One symptom of the list: its place, its label, and what can be done with it. */
export function SymptomItem({ index, count, code, name, onMove, onRemove }: SymptomItemProps) {
  const { register, formState } = useSettings();
  return (
    <li className="flex items-start gap-2 border-b border-rule py-1.5">
      <span className="w-5 shrink-0 pt-1.5 text-end text-sm text-ink-2" aria-hidden="true">
        {index + 1}
      </span>
      <TextField
        label={`Symptom ${index + 1}`}
        hideLabel
        className="flex-1"
        data-focus={`${code} label`}
        error={fieldWords(formState.errors.symptoms?.[index]?.label?.message)}
        {...register(`symptoms.${index}.label`)}
      />
      <span className="flex shrink-0 gap-1 pt-1">
        <Button
          size="small"
          data-focus={`${code} up`}
          disabled={index === 0}
          onClick={() => onMove(index, index - 1, "up")}
        >
          <span aria-hidden="true">↑</span>
          <span className="sr-only">Move {name} up</span>
        </Button>
        <Button
          size="small"
          data-focus={`${code} down`}
          disabled={index === count - 1}
          onClick={() => onMove(index, index + 1, "down")}
        >
          <span aria-hidden="true">↓</span>
          <span className="sr-only">Move {name} down</span>
        </Button>
        <Button size="small" disabled={count === 1} onClick={() => onRemove(index)}>
          Remove <span className="sr-only">{name}</span>
        </Button>
      </span>
    </li>
  );
}
