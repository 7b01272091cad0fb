import type { PersonPage, PersonPair } from "../../../shared/contracts/people.ts";
import { isCase } from "../../../shared/vocabulary.ts";
import type { DayStripRow, ExposureRow } from "../../components/day-strip/day-strip-row.ts";
import { addDays, dayFromNumber, dayNumber, daysBetween } from "../../lib/calendar-day.ts";
import { dueState } from "../../lib/due-state.ts";
import { settingWords, wordFor } from "../../lib/words.ts";
import { personMarkOf } from "./person-mark-of.ts";

const mostPairs = 24;
const longestDays = 120;

/** First and last day a stored date can mean; null when it is not known at all. */
export function dayRange(
  value: string | null,
): { from: string; to: string; partial: boolean } | null {
  if (!value) return null;
  if (dayNumber(value) !== null) return { from: value, to: value, partial: false };
  const first = /^\d{4}-\d{2}$/.test(value) ? dayNumber(`${value}-01`) : null;
  if (first === null) return null;
  const [year, month] = value.split("-").map(Number) as [number, number];
  const last = new Date(Date.UTC(year, month, 0)).getUTCDate();
  return { from: dayFromNumber(first), to: dayFromNumber(first + last - 1), partial: true };
}

function barOf(exposure: {
  firstExposure: string | null;
  lastExposure: string | null;
  setting: string | null;
}): ExposureRow["bars"][number] | null {
  const first = dayRange(exposure.firstExposure) ?? dayRange(exposure.lastExposure);
  const last = dayRange(exposure.lastExposure) ?? first;
  if (!first || !last) return null;
  return {
    from: first.from,
    to: last.to < first.from ? first.to : last.to,
    setting: exposure.setting ? wordFor(settingWords, exposure.setting) : "setting not asked",
    household: exposure.setting === "household",
    // One day known and the other not is no certain length either.
    partial: first.partial || last.partial || !exposure.firstExposure || !exposure.lastExposure,
  };
}

function pairRow(pair: PersonPair): ExposureRow | null {
  const bars = pair.exposures.flatMap((exposure) => barOf(exposure) ?? []);
  if (bars.length === 0) return null;
  const mark = personMarkOf(pair);
  const settings = [...new Set(bars.map((bar) => bar.setting))].join(", ");
  return {
    type: "exposure",
    id: pair.pairId,
    label: `${pair.name ?? pair.studyNumber} · ${settings}`,
    ...(mark ? { mark } : {}),
    bars,
  };
}

function windowRows(person: PersonPage): DayStripRow[] {
  const { source, infectious } = person.windows;
  const known = isCase(person.classification);
  if (!known && !source && !infectious) return [];
  const onset = dayRange(person.onsetDate);
  const reference =
    infectious?.basis === "onset" && onset && !onset.partial
      ? { day: onset.from, label: "onset" }
      : null;
  return [
    {
      type: "window",
      id: "source",
      label: "source window",
      window: "source",
      from: source?.from ?? null,
      to: source?.to ?? null,
      unknown: "not known without a day of onset",
    },
    {
      type: "window",
      id: "infectious",
      label: "infectious window",
      window: "infectious",
      from: infectious?.from ?? null,
      to: infectious?.to ?? null,
      unknown: "not known without a day of onset or a positive test",
      ...(reference ? { reference } : {}),
    },
  ];
}

/** Due days with what is known of each; of a contact who became a case, up to the last check. */
function dueRow(person: PersonPage, today: string): DayStripRow[] {
  const { monitoring } = person;
  if (!monitoring) return [];
  const outcomes = new Map(monitoring.outcomes.map(({ day, outcome }) => [day, outcome]));
  const over = monitoring.state === "became_case" || monitoring.state === "not_a_contact";
  const last = [...outcomes.keys()].sort().at(-1) ?? "";
  const days = monitoring.dueDays.filter((day) => !over || day <= last);
  if (days.length === 0) return [];
  const nth = daysBetween(monitoring.dayZero, today) ?? 0;
  const running = !over && nth > 0 && nth <= monitoring.dueDays.length;
  return [
    {
      type: "due",
      id: "due",
      label: running ? `day ${nth} of ${monitoring.dueDays.length}` : "due days",
      days: days.map((day) => ({
        day,
        state: dueState(day, outcomes.get(day), today, monitoring.expectedFrom),
      })),
    },
  ];
}

/** "12", "10–15", "at least 10", "unknown number". */
export function countWords(min: number | null, max: number | null): string {
  if (min === null && max === null) return "unknown number";
  if (min === null) return `at most ${max}`;
  if (max === null) return `at least ${min}`;
  return min === max ? String(min) : `${min}–${max}`;
}

function groupRows(person: PersonPage): DayStripRow[] {
  return person.groupExposures.flatMap((group): DayStripRow[] => {
    const bar = barOf(group);
    if (!bar) return [];
    const where = group.place ?? bar.setting;
    return [
      {
        type: "group",
        id: group.id,
        label: `not named, ${where}`,
        from: bar.from,
        to: bar.to,
        count: countWords(group.countMin, group.countMax),
      },
    ];
  });
}

function daysOf(row: DayStripRow): string[] {
  switch (row.type) {
    case "window":
      return [row.from, row.to, row.reference?.day ?? null].flatMap((day) => day ?? []);
    case "exposure":
      return row.bars.flatMap((bar) => [bar.from, bar.to]);
    case "group":
      return [row.from, row.to];
    case "due":
      return row.days.map((one) => one.day);
    case "onsets":
      return row.counts.map((one) => one.day);
  }
}

/** Rows and scale of a person's day strip; null when nothing has a day. */
export function personStrip(person: PersonPage, today: string) {
  const pairs = person.pairs.flatMap((pair) => pairRow(pair) ?? []);
  const rows = [
    ...windowRows(person),
    ...dueRow(person, today),
    ...pairs.slice(0, mostPairs),
    ...groupRows(person),
  ];
  const days = [...rows.flatMap(daysOf), today].sort();
  const first = days[0];
  const last = days.at(-1);
  if (rows.length === 0 || !first || !last) return null;
  const to = addDays(last, 2);
  const earliest = addDays(to, -longestDays);
  const from = addDays(first, -2);
  return {
    rows,
    from: from < earliest ? earliest : from,
    to,
    leftOut: Math.max(0, pairs.length - mostPairs),
  };
}
