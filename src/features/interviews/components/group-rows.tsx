import { useLayoutEffect, useRef } from "react";
import { useFieldArray } from "react-hook-form";
import { LIMITS } from "../../../../shared/contracts/common.ts";
import { Section } from "../../../components/layouts/section.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { blankGroup, carriedKeys, groupKeys, isBlankGroup } from "../form/interview-values.ts";
import { GroupRow } from "./group-row.tsx";
import { createRowKeys, focusBox } from "./row-keys.ts";
import { useInterviewForm } from "./use-exposure-boxes.ts";

export type GroupRowsProps = { onStep: () => void };

/** People whom the case met and cannot name: kept as numbers, apart from the graph. */
export function GroupRows({ onStep }: GroupRowsProps) {
  const form = useInterviewForm();
  const { fields, append, remove } = useFieldArray({
    control: form.control,
    name: "groupExposures",
  });
  const root = useRef<HTMLDivElement>(null);
  const addButton = useRef<HTMLButtonElement>(null);
  const wanted = useRef<number | "button" | null>(null);

  useLayoutEffect(() => {
    if (wanted.current === null || !root.current) return;
    if (wanted.current === "button") addButton.current?.focus();
    else if (!focusBox(root.current, "groupExposures", wanted.current, "setting")) return;
    wanted.current = null;
  });

  function openNext() {
    const rows = form.getValues("groupExposures");
    const last = rows.at(-1);
    if (last && isBlankGroup(last)) {
      if (root.current) focusBox(root.current, "groupExposures", rows.length - 1, "setting");
      return;
    }
    if (rows.length >= LIMITS.groupExposures) return;
    wanted.current = rows.length;
    append(blankGroup(), { shouldFocus: false });
    onStep();
  }

  function takeAway(row: number) {
    wanted.current = fields.length === 1 ? "button" : Math.max(0, row - 1);
    remove(row);
    onStep();
  }

  function carry(row: number) {
    if (row === 0) return;
    const above = form.getValues(`groupExposures.${row - 1}`);
    for (const key of carriedKeys) {
      form.setValue(`groupExposures.${row}.${key}`, above[key], { shouldDirty: true });
    }
  }

  const onKeyDown = createRowKeys({
    list: "groupExposures",
    boxes: groupKeys,
    rows: () => form.getValues("groupExposures").length,
    isBlank: (row) => isBlankGroup(form.getValues(`groupExposures.${row}`)),
    openNext,
    remove: takeAway,
    carry,
  });

  return (
    <Section
      title="People who cannot be named"
      subLine="a bus, a queue, a service: counted apart, no contact pairs"
    >
      {/* biome-ignore lint/a11y/noStaticElementInteractions: keys move between the boxes inside; every box is a control of its own. */}
      <div ref={root} onKeyDown={onKeyDown}>
        {fields.map((field, row) => (
          <GroupRow
            key={field.id}
            row={row}
            onRemove={() => takeAway(row)}
            onCarry={row > 0 ? () => carry(row) : undefined}
          />
        ))}
      </div>
      <Button
        ref={addButton}
        className="mt-2"
        onClick={openNext}
        disabled={fields.length >= LIMITS.groupExposures}
      >
        Add a group
      </Button>
    </Section>
  );
}
