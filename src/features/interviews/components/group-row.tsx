import { useId } from "react";
import { useFormState, useWatch } from "react-hook-form";
import { addDays } from "../../../lib/calendar-day.ts";
import { isBlankGroup } from "../form/interview-values.ts";
import { readCount } from "../form/read-box.ts";
import { dayNotice } from "../form/row-notices.ts";
import { settingChoices } from "../form/words.ts";
import { ChoiceBox } from "./choice-box.tsx";
import { useFormSurroundings } from "./form-context.ts";
import { placeListId } from "./place-lists.tsx";
import { RowBox } from "./row-box.tsx";
import { RowTools } from "./row-tools.tsx";
import { TouchChips } from "./touch-chips.tsx";
import { useExposureBoxes, useInterviewForm } from "./use-exposure-boxes.ts";

const heads = {
  setting: "Setting",
  place: "Place or occasion",
  firstExposure: "First day",
  lastExposure: "Last day",
  count: "How many",
} as const;
type BoxName = keyof typeof heads;

const spans: Record<BoxName, string> = {
  setting: "",
  place: "col-span-2 lg:col-span-1",
  firstExposure: "col-span-2 lg:col-span-1",
  lastExposure: "col-span-2 lg:col-span-1",
  count: "col-span-1",
};

export type GroupRowProps = {
  row: number;
  onRemove: () => void;
  onCarry: (() => void) | undefined;
};

/** One group of people who cannot be named. */
export function GroupRow({ row, onRemove, onCarry }: GroupRowProps) {
  const { person, today } = useFormSurroundings();
  const form = useInterviewForm();
  const values = useWatch({ control: form.control, name: `groupExposures.${row}` });
  const { errors } = useFormState({ control: form.control, name: `groupExposures.${row}` });
  const boxes = useExposureBoxes("groupExposures", row);
  const noticeId = useId();
  const rowErrors = errors.groupExposures?.[row];
  const notice = isBlankGroup(values) ? null : dayNotice(values, person.windows, today);

  const frame = (box: BoxName) => ({
    place: { list: "groupExposures" as const, row, box },
    label: heads[box],
    error: rowErrors?.[box]?.message,
    className: spans[box],
    labelAlways: true,
  });
  const dayFrame = (box: "firstExposure" | "lastExposure") => ({
    ...frame(box),
    noticeId: notice ? noticeId : undefined,
    placeholder: box === "lastExposure" && values.firstExposure ? "= same day" : "YYYY-MM-DD",
    chips: (
      <TouchChips
        boxLabel={heads[box]}
        calendar
        onChoose={(value) => boxes.set(box, value)}
        chips={
          box === "lastExposure" && values.firstExposure
            ? [{ label: "same day", value: values.firstExposure }]
            : [
                { label: "today", value: today },
                { label: "yesterday", value: addDays(today, -1) },
              ]
        }
      />
    ),
  });

  return (
    <fieldset className="min-w-0 border-b border-rule py-2 lg:py-1.5">
      <legend className="sr-only">Group {row + 1}</legend>
      <div className="grid grid-cols-2 gap-2 lg:grid-cols-[8.5rem_minmax(9rem,1fr)_8rem_8rem_13rem_auto]">
        <ChoiceBox
          {...frame("setting")}
          choices={settingChoices}
          onChoose={(value) => boxes.set("setting", value)}
          {...boxes.register("setting")}
        />
        <RowBox {...frame("place")} list={placeListId(values.setting)} {...boxes.registerPlace()} />
        <RowBox {...dayFrame("firstExposure")} {...boxes.registerDay("firstExposure")} />
        <RowBox {...dayFrame("lastExposure")} {...boxes.registerDay("lastExposure")} />
        <div className="min-w-0">
          <RowBox
            {...frame("count")}
            placeholder="12, 10-15, 12 ±3, u"
            {...boxes.register("count")}
          />
          <p className="mt-0.5 text-sm text-ink-2">{countReading(values.count)}</p>
        </div>
        <p aria-hidden="true" className="order-first self-center font-bold text-ink-2 lg:hidden">
          Group {row + 1}
        </p>
        <div className="order-first lg:order-none lg:pt-5">
          <RowTools row={row} noun="group" onCarry={onCarry} onRemove={onRemove} />
        </div>
      </div>
      {notice ? (
        <p id={noticeId} className="mt-1 text-sm text-ochre">
          <span className="font-bold">Look again: </span>
          {notice}
        </p>
      ) : null}
    </fieldset>
  );
}

function countReading(text: string): string {
  const count = readCount(text);
  if (count.kind === "exact") return count.min === 1 ? "one person" : `${count.min} people`;
  if (count.kind === "between") return `between ${count.min} and ${count.max} people`;
  return count.kind === "unknown" ? "number not known" : "write 12, 10-15, 12 ±3 or u";
}
