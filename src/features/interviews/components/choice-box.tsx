import { type ComponentProps, type KeyboardEvent, useId } from "react";
import type { Choice } from "../form/words.ts";
import { BoxFrame, boxAttributes, type RowBoxFrame } from "./row-box.tsx";

export type ChoiceBoxProps = RowBoxFrame &
  Omit<ComponentProps<"select">, "id" | "className" | "children"> & {
    choices: readonly Choice[];
    /** Given the value that a first letter chose. */
    onChoose: (value: string) => void;
  };

/**
 * The next choice that begins with a letter, going round from the present one; undefined when none
 * does. Browsers differ in how a closed list takes letters, so we do it ourselves.
 */
export function choiceByLetter(
  choices: readonly Choice[],
  current: string,
  letter: string,
): string | undefined {
  const starting = choices.filter(({ label }) => label.toLowerCase().startsWith(letter));
  const at = starting.findIndex(({ value }) => value === current);
  return (starting[at + 1] ?? starting[0])?.value;
}

/** One choice of a row: the browser's own list, chosen by its first letter, emptied by Backspace. */
export function ChoiceBox({
  place,
  label,
  meaning,
  error,
  noticeId,
  className,
  labelAlways,
  chips,
  choices,
  onChoose,
  ...select
}: ChoiceBoxProps) {
  const id = useId();
  const frame = { place, label, meaning, error, noticeId, className, labelAlways, chips };

  function onKeyDown(event: KeyboardEvent<HTMLSelectElement>) {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    const key = event.key ?? "";
    if (key === "Backspace" || key === "Delete") {
      event.preventDefault();
      onChoose("");
      return;
    }
    if (!/^[a-z]$/i.test(key)) return;
    const chosen = choiceByLetter(choices, event.currentTarget.value, key.toLowerCase());
    if (chosen === undefined) return;
    event.preventDefault();
    onChoose(chosen);
  }

  return (
    <BoxFrame id={id} frame={frame}>
      <select {...select} {...boxAttributes(id, frame)} onKeyDown={onKeyDown}>
        <option value="">not asked</option>
        {choices.map(({ value, label: words }) => (
          <option key={value} value={value}>
            {words}
          </option>
        ))}
      </select>
    </BoxFrame>
  );
}
