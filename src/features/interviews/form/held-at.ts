import { TZDate } from "@date-fns/tz";

const pattern = /^(\d{4})-(\d{2})-(\d{2})[ T](\d{1,2}):(\d{2})$/;
const two = (value: number) => String(value).padStart(2, "0");

/** Wall time of an instant in a zone, as the box shows it: "2026-05-27 14:30". */
export function wallTime(instant: string | number, zone: string): string {
  const at = new TZDate(new Date(instant).getTime(), zone);
  const day = `${at.getFullYear()}-${two(at.getMonth() + 1)}-${two(at.getDate())}`;
  return `${day} ${two(at.getHours())}:${two(at.getMinutes())}`;
}

/**
 * Instant of a wall time in a zone; null when it cannot be read or does not exist there (the hour
 * that a change to summer time leaves out).
 */
export function instantOf(text: string, zone: string): string | null {
  const match = pattern.exec(text.trim());
  if (!match) return null;
  const [year, month, day, hour, minute] = match.slice(1).map(Number) as [
    number,
    number,
    number,
    number,
    number,
  ];
  const at = new TZDate(year, month - 1, day, hour, minute, zone);
  const written = `${match[1]}-${match[2]}-${match[3]} ${two(hour)}:${match[5]}`;
  if (Number.isNaN(at.getTime()) || wallTime(at.getTime(), zone) !== written) return null;
  return new Date(at.getTime()).toISOString();
}
