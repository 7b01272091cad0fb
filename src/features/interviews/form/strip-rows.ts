import type { PersonPage } from "../../../../shared/contracts/people.ts";
import type { DayStripRow } from "../../../components/day-strip/day-strip-row.ts";
import { addDays, daysBetween } from "../../../lib/calendar-day.ts";
import { type InterviewValues, isBlankContact, isBlankGroup } from "./interview-values.ts";
import { countWords, readCount } from "./read-box.ts";
import { exposureDays } from "./row-notices.ts";
import { settingWord } from "./words.ts";

type Subject = Pick<PersonPage, "windows" | "onsetDate" | "specimenDate">;

const longestLabel = 24;
const mostDays = 42;
const daysWithoutWindows = 21;

/** Rows for the two windows of a case, with the day that they are counted from. */
export function windowRows(subject: Subject): DayStripRow[] {
  const { infectious, source } = subject.windows;
  const onset = infectious?.basis === "onset" ? subject.onsetDate : null;
  const reference = onset
    ? { day: onset, label: "onset" }
    : infectious && subject.specimenDate
      ? { day: subject.specimenDate, label: "specimen" }
      : undefined;
  return [
    {
      id: "source",
      type: "window",
      window: "source",
      label: "source window",
      from: source?.from ?? null,
      to: source?.to ?? null,
      unknown: "not known: no onset day on record",
    },
    {
      id: "infectious",
      type: "window",
      window: "infectious",
      label: "infectious window",
      from: infectious?.from ?? null,
      to: infectious?.to ?? null,
      unknown: "not known: no onset day, no positive test on record",
      ...(reference ? { reference } : {}),
    },
  ];
}

function shortened(text: string): string {
  return text.length > longestLabel ? `${text.slice(0, longestLabel - 1)}…` : text;
}

/**
 * The contacts typed so far by exposure day, the latest row first so that it stands right under the
 * windows; then people not named, dashed and with their number.
 */
export function exposureRows(values: Pick<InterviewValues, "contacts" | "groupExposures">) {
  const contacts = values.contacts.flatMap((row, index): DayStripRow[] => {
    if (isBlankContact(row)) return [];
    const days = exposureDays(row.firstExposure, row.lastExposure);
    const who = row.known?.studyNumber ?? (row.name.trim() || `row ${index + 1}`);
    const bars = days
      ? [
          {
            from: days.from,
            to: days.to,
            partial: days.partial,
            setting: settingWord(row.setting),
            household: row.setting === "household",
          },
        ]
      : [];
    return [{ id: `contact-${index}`, type: "exposure", label: shortened(who), bars }];
  });
  const groups = values.groupExposures.flatMap((row, index): DayStripRow[] => {
    const days = exposureDays(row.firstExposure, row.lastExposure);
    if (isBlankGroup(row) || !days) return [];
    return [
      {
        id: `group-${index}`,
        type: "group",
        label: shortened(row.place.trim() || `group ${index + 1}, not named`),
        from: days.from,
        to: days.to,
        count: countWords(readCount(row.count)),
      },
    ];
  });
  return [...contacts.reverse(), ...groups];
}

/** First and last day of the scale: both windows and today in sight, exposures as far as fits. */
export function stripScale(
  subject: Subject,
  rows: readonly DayStripRow[],
  today: string,
): { from: string; to: string } {
  const { infectious, source } = subject.windows;
  const fixed = [today, infectious?.from, infectious?.to, source?.from, source?.to].flatMap(
    (day) => day ?? [],
  );
  if (!infectious && !source) fixed.push(addDays(today, -daysWithoutWindows));
  let from = fixed.reduce((a, b) => (b < a ? b : a));
  let to = fixed.reduce((a, b) => (b > a ? b : a));
  for (const row of rows) {
    const days = row.type === "exposure" ? row.bars : row.type === "group" ? [row] : [];
    for (const one of days) {
      if (one.from < from && (daysBetween(one.from, to) ?? mostDays) < mostDays) from = one.from;
      if (one.to > to && (daysBetween(from, one.to) ?? mostDays) < mostDays) to = one.to;
    }
  }
  return { from: addDays(from, -1), to: addDays(to, 1) };
}
