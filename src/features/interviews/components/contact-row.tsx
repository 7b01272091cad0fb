import { memo, useId } from "react";
import { useFormState, useWatch } from "react-hook-form";
import type { Match } from "../../../../shared/contracts/people.ts";
import { addDays } from "../../../lib/calendar-day.ts";
import { isBlankContact, type KnownPerson } from "../form/interview-values.ts";
import { readFigure } from "../form/read-box.ts";
import { dayNotice } from "../form/row-notices.ts";
import { settingChoices, yesNoChoices } from "../form/words.ts";
import { ChoiceBox } from "./choice-box.tsx";
import { useFormSurroundings } from "./form-context.ts";
import { MatchList } from "./match-list.tsx";
import { placeListId } from "./place-lists.tsx";
import { RowBox } from "./row-box.tsx";
import { contactColumns, contactHeads, contactMeanings, contactSpans } from "./row-grid.ts";
import { RowTools } from "./row-tools.tsx";
import { TiedPerson } from "./tied-person.tsx";
import { TouchChips } from "./touch-chips.tsx";
import { useExposureBoxes, useInterviewForm } from "./use-exposure-boxes.ts";
import { useMatches } from "./use-matches.ts";

type BoxName = keyof typeof contactHeads;

export type ContactRowProps = {
  row: number;
  /** The cursor is in this row: matches are looked for, and nothing is called missing yet. */
  active: boolean;
  onRemove: (row: number) => void;
  onCarry: (row: number) => void;
  /** Puts the cursor into a box of this row once it is drawn. */
  onFocusBox: (row: number, box: string) => void;
};

const noAnswerChips = [
  { label: "unknown", value: "unknown" },
  { label: "refused", value: "refused" },
];

/** One contact: boxes in a line, what deserves a second look and people on record below. */
export const ContactRow = memo(function ContactRow(props: ContactRowProps) {
  const { row, active, onFocusBox } = props;
  const { investigationId, person, today } = useFormSurroundings();
  const form = useInterviewForm();
  const values = useWatch({ control: form.control, name: `contacts.${row}` });
  const { errors } = useFormState({ control: form.control, name: `contacts.${row}` });
  const boxes = useExposureBoxes("contacts", row);
  const noticeId = useId();
  const matches = useMatches(
    investigationId,
    values.name,
    values.phone,
    active && values.known === null,
  ).filter((match) => match.personId !== person.id);

  const rowErrors = errors.contacts?.[row];
  const found = dayNotice(values, person.windows, today);
  const notice = isBlankContact(values) || (active && !values.firstExposure) ? null : found;

  const frame = (box: BoxName) => ({
    place: { list: "contacts" as const, row, box },
    label: contactHeads[box],
    meaning: contactMeanings[box],
    error: rowErrors?.[box]?.message,
    className: contactSpans[box],
  });
  const dayFrame = (box: "firstExposure" | "lastExposure") => ({
    ...frame(box),
    noticeId: notice ? noticeId : undefined,
    placeholder: box === "lastExposure" && values.firstExposure ? "= same day" : "YYYY-MM-DD",
    chips: (
      <TouchChips
        boxLabel={contactHeads[box]}
        calendar
        onChoose={(value) => boxes.set(box, value)}
        chips={[
          ...(box === "lastExposure" && values.firstExposure
            ? [{ label: "same day", value: values.firstExposure }]
            : [
                { label: "today", value: today },
                { label: "yesterday", value: addDays(today, -1) },
              ]),
          ...noAnswerChips,
        ]}
      />
    ),
  });
  const figureFrame = (box: "minutes" | "distanceM") => ({
    ...frame(box),
    inputMode: "decimal" as const,
    chips: (
      <TouchChips
        boxLabel={contactHeads[box]}
        chips={noAnswerChips}
        onChoose={(value) => boxes.set(box, value)}
      />
    ),
    ...form.register(`contacts.${row}.${box}`, {
      onBlur: () => boxes.set(box, readFigure(boxes.text(box))),
    }),
  });

  function tie(match: Match) {
    const { personId, studyNumber, name, ageBand, area } = match;
    const known: KnownPerson = { personId, studyNumber, name, ageBand, area };
    form.setValue(`contacts.${row}.known`, known, { shouldDirty: true });
    onFocusBox(row, "setting");
  }
  function untie() {
    form.setValue(`contacts.${row}.known`, null, { shouldDirty: true });
    onFocusBox(row, "name");
  }
  const toMatches = (event: React.KeyboardEvent<HTMLElement>) => {
    if (event.key !== "ArrowDown" || event.altKey) return;
    const first = event.currentTarget
      .closest("fieldset")
      ?.querySelector<HTMLElement>("[data-matches] button");
    if (!first) return;
    event.preventDefault();
    first.focus();
  };

  return (
    <fieldset className="min-w-0 border-b border-rule py-2 lg:py-1.5" data-contact-row={row}>
      <legend className="sr-only">Contact {row + 1}</legend>
      <div className={`grid ${contactColumns}`}>
        <div
          aria-hidden="true"
          className="order-first self-center font-bold text-ink-2 lg:col-span-6
            min-[85rem]:col-span-1 min-[85rem]:self-start min-[85rem]:pt-1.5 min-[85rem]:font-normal"
        >
          <span className="min-[85rem]:hidden">Contact </span>
          {row + 1}
        </div>
        {values.known ? (
          <TiedPerson
            row={row}
            known={values.known}
            error={rowErrors?.known?.message ?? rowErrors?.name?.message}
            onUntie={untie}
          />
        ) : (
          <>
            <RowBox {...frame("name")} onKeyDown={toMatches} {...boxes.register("name")} />
            <RowBox
              {...frame("phone")}
              type="tel"
              onKeyDown={toMatches}
              {...boxes.register("phone")}
            />
            {matches.length > 0 ? (
              // Right under the name where rows are stacked, under the whole line elsewhere.
              <div
                className="col-span-2 lg:order-last lg:col-span-12 min-[85rem]:col-start-2
                  min-[85rem]:-col-end-1"
              >
                <MatchList
                  matches={matches}
                  taken={takenPeople(form.getValues("contacts"), row)}
                  onChoose={tie}
                  onLeave={() => onFocusBox(row, "name")}
                />
              </div>
            ) : null}
          </>
        )}
        <ChoiceBox
          {...frame("setting")}
          choices={settingChoices}
          onChoose={(value) => boxes.set("setting", value)}
          {...boxes.register("setting")}
        />
        <RowBox {...frame("place")} list={placeListId(values.setting)} {...boxes.registerPlace()} />
        <RowBox {...dayFrame("firstExposure")} {...boxes.registerDay("firstExposure")} />
        <RowBox {...dayFrame("lastExposure")} {...boxes.registerDay("lastExposure")} />
        <RowBox {...figureFrame("minutes")} />
        <RowBox {...figureFrame("distanceM")} />
        {(["physical", "indoors"] as const).map((box) => (
          <ChoiceBox
            key={box}
            {...frame(box)}
            choices={yesNoChoices}
            onChoose={(value) => boxes.set(box, value)}
            {...boxes.register(box)}
          />
        ))}
        <RowBox {...frame("relation")} {...boxes.register("relation")} />
        <RowTools
          row={row}
          noun="contact"
          onCarry={row > 0 ? () => props.onCarry(row) : undefined}
          onRemove={() => props.onRemove(row)}
        />
      </div>
      {notice ? (
        <p id={noticeId} className="mt-1 text-sm text-ochre min-[85rem]:ps-[1.875rem]">
          <span className="font-bold">Look again: </span>
          {notice}
        </p>
      ) : null}
    </fieldset>
  );
});

/** People that other rows are tied to already: a second row with them is a second exposure. */
function takenPeople(rows: readonly { known: KnownPerson | null }[], row: number) {
  const taken = new Map<string, string>();
  rows.forEach(({ known }, index) => {
    if (known && index !== row)
      taken.set(known.personId, `also row ${index + 1}: a further exposure`);
  });
  return taken;
}
