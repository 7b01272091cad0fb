import { parseArgs } from "node:util";
import type { SeedOptions } from "../../drizzle/seed/seed-investigation.ts";
import { dayIn, now, shiftDay } from "../../server/clock.ts";
import { isCalendarDay, LIMITS, text } from "../../shared/contracts/common.ts";

export const USAGE = `usage: npm run seed -- --people N --investigation NAME [options]

Loads an invented outbreak into a new investigation, marked invented. Equal options give equal
people, contacts and reports.

  --people N             people on record to aim for, ${300} to ${200_000}
  --investigation NAME   name of the new investigation; one that is taken is refused
  --seed N               another story for another number (default 1)
  --days N               length of the story in days, 28 to 120 (default 35)
  --last-day YYYY-MM-DD  last day of the story, before today (default yesterday)
  --teams N              teams that hold the people, 0 to 50 (default 0: the tracers hold them)
  --member E-MAIL        account that gets every role there (default: the demo accounts, each its own)
  --help                 prints this`;

const NUMBERS = {
  people: [300, 200_000],
  seed: [0, Number.MAX_SAFE_INTEGER],
  days: [28, 120],
  teams: [0, 50],
} as const;

function whole(name: keyof typeof NUMBERS, given: string): number {
  const [least, most] = NUMBERS[name];
  const value = Number(given);
  if (!/^\d{1,16}$/.test(given) || !Number.isSafeInteger(value) || value < least || value > most) {
    const range = name === "seed" ? "0 or more" : `${least} to ${most}`;
    throw new Error(`--${name}: must be a whole number, ${range}`);
  }
  return value;
}

function lastDayOf(given: string | undefined): string {
  const today = dayIn("UTC", now());
  if (given === undefined) return shiftDay(today, -1);
  if (!isCalendarDay(given)) throw new Error("--last-day: must be a calendar day, YYYY-MM-DD");
  if (given >= today) throw new Error("--last-day: must be before today");
  return given;
}

/**
 * The options of the command; null when help was asked for.
 * @throws Error whose message is one line for the caller
 */
export function readArguments(args: readonly string[]): SeedOptions | null {
  const one = { type: "string", multiple: true } as const;
  const { values } = parseArgs({
    args: [...args],
    options: {
      people: one,
      investigation: one,
      seed: one,
      days: one,
      "last-day": one,
      teams: one,
      member: one,
      help: { type: "boolean" },
    },
    strict: true,
    allowPositionals: false,
  });
  if (values.help) return null;
  const single = (name: Exclude<keyof typeof values, "help">): string | undefined => {
    const given = values[name];
    if (given && given.length > 1) throw new Error(`--${name}: given more than once`);
    return given?.[0];
  };
  const people = single("people");
  if (people === undefined) throw new Error("--people: is needed");
  const name = text(LIMITS.name, 1).safeParse(single("investigation"));
  if (!name.success) {
    throw new Error(`--investigation: a name of 1 to ${LIMITS.name} characters is needed`);
  }
  const member = single("member");
  if (member === "") throw new Error("--member: must not be empty");
  return {
    people: whole("people", people),
    name: name.data,
    seed: whole("seed", single("seed") ?? "1"),
    days: whole("days", single("days") ?? "35"),
    lastDay: lastDayOf(single("last-day")),
    teams: whole("teams", single("teams") ?? "0"),
    member: member ?? null,
  };
}
