import { z } from "zod";
import { MISSING } from "../vocabulary.ts";

/** Limits shared by forms, routes and files. */
export const LIMITS = {
  name: 120,
  shortText: 120,
  address: 240,
  note: 10_000,
  email: 254,
  phone: 40,
  ref: 120,
  contacts: 200,
  groupExposures: 50,
  pageSize: 200,
  fileBytes: 50 * 1024 * 1024,
  passwordMin: 15,
  passwordMax: 256,
} as const;

/** Builds the zod issue whose message is one of our field error codes. */
const code = (message: string) => ({ error: message });

// Bidirectional controls can make one name look like another; they are dropped, not refused.
const BIDI = /[\u202A-\u202E\u2066-\u2069]/g;
// biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what is refused
const CONTROL = /[\u0000-\u0008\u000B\u000C\u000E-\u001F\u007F]/;

/** Trimmed, NFC-normalised text without control characters, at most `max` characters. */
export function text(max: number, min = 0) {
  return z
    .string(code("not_text"))
    .max(max * 2, code("too_long"))
    .refine((value) => value.isWellFormed(), code("not_text"))
    .refine((value) => !CONTROL.test(value), code("bad_character"))
    .transform((value) => value.replace(BIDI, "").normalize("NFC").trim())
    .refine((value) => value.length <= max, code("too_long"))
    .refine((value) => value.length >= min, code(min > 1 ? "too_short" : "required"));
}

/** Text that may be left out; blank becomes null, which means "not asked". */
export function optionalText(max: number) {
  return text(max)
    .transform((value) => (value === "" ? null : value))
    .nullable()
    .default(null);
}

/** True for a real calendar day between 1900 and 2100 (`YYYY-MM-DD`). */
export function isCalendarDay(value: string): boolean {
  const match = /^(\d{4})-(\d{2})-(\d{2})$/.exec(value);
  if (!match) return false;
  const [year, month, day] = match.slice(1).map(Number) as [number, number, number];
  if (year < 1900 || year > 2100 || month < 1 || month > 12 || day < 1) return false;
  return day <= new Date(Date.UTC(year, month, 0)).getUTCDate();
}

/** True for `YYYY-MM-DD` or `YYYY-MM` between 1900 and 2100. */
export function isPartialDay(value: string): boolean {
  return isCalendarDay(value) || (/^\d{4}-\d{2}$/.test(value) && isCalendarDay(`${value}-01`));
}

/** A whole day. */
export const day = z.string(code("not_a_day")).refine(isCalendarDay, code("not_a_day"));

const blankToNull = (value: unknown) =>
  typeof value === "string" && value.trim() === "" ? null : value;

/** A date that may be partial, the words `unknown` or `refused`, or null for "not asked". */
export const partialDay = z.preprocess(
  blankToNull,
  z
    .string(code("not_a_day"))
    .refine(
      (value) => (MISSING as readonly string[]).includes(value) || isPartialDay(value),
      code("not_a_day"),
    )
    .nullable()
    .default(null),
);

/** One of a list, or null for "not asked". */
export function choice<const T extends readonly [string, ...string[]]>(values: T) {
  return z.preprocess(blankToNull, z.enum(values, code("not_in_list")).nullable().default(null));
}

/** One of a list, `unknown`, `refused`, or null for "not asked". */
export function choiceOrMissing<const T extends readonly [string, ...string[]]>(values: T) {
  return z.preprocess(
    blankToNull,
    z
      .union([z.enum(values), z.enum(MISSING)], code("not_in_list"))
      .nullable()
      .default(null),
  );
}

/** A number within bounds, `unknown`, `refused`, or null for "not asked". */
export function numberOrMissing(min: number, max: number, whole: boolean) {
  const number = z
    .number(code("not_a_number"))
    .min(min, code("too_small"))
    .max(max, code("too_big"));
  return z.preprocess(
    blankToNull,
    z
      .union([whole ? number.int(code("not_a_whole_number")) : number, z.enum(MISSING)], {
        error: (issue) =>
          typeof issue.input === "number" && whole ? "not_a_whole_number" : "not_a_number",
      })
      .nullable()
      .default(null),
  );
}

/** Yes, no, `unknown`, `refused`, or null. Accepts `true` and `false`. */
export const yesNo = z.preprocess(
  (value) => (value === true ? "yes" : value === false ? "no" : blankToNull(value)),
  z
    .enum(["yes", "no", ...MISSING], code("not_in_list"))
    .nullable()
    .default(null),
);

export const uuid = z.uuid(code("not_an_id"));
export const instant = z.iso.datetime({ offset: true, error: "not_an_instant" });
export const rowVersion = z.number(code("not_a_number")).int().min(1);

/** An e-mail address, lower-cased; blank is null; `unknown` and `refused` are kept. */
export const emailField = z.preprocess(
  blankToNull,
  text(LIMITS.email)
    .transform((value) => value.toLowerCase())
    .refine(
      (value) =>
        (MISSING as readonly string[]).includes(value) || z.email().safeParse(value).success,
      code("not_an_email"),
    )
    .nullable()
    .default(null),
);

/** Query of a list. */
export const listQuery = z.strictObject({
  page: z.coerce
    .number<string>(code("not_a_number"))
    .int(code("not_a_whole_number"))
    .min(1, code("too_small"))
    .max(1_000_000, code("too_big"))
    .default(1),
  pageSize: z.coerce
    .number<string>(code("not_a_number"))
    .int(code("not_a_whole_number"))
    .min(1, code("too_small"))
    .max(LIMITS.pageSize, code("too_big"))
    .default(50),
  sort: z.string().max(60, code("too_long")).optional(),
  q: text(LIMITS.name).optional(),
});
export type ListQuery = z.output<typeof listQuery>;

/** Shape of every list answer. */
export function listOf<T extends z.ZodType>(item: T) {
  return z.strictObject({
    items: z.array(item),
    total: z.int().min(0),
    page: z.int().min(1),
    pageSize: z.int().min(1),
  });
}

/** What a create answers with: ids and versions only, so that it may be stored and replayed. */
export const receipt = z.strictObject({ id: uuid, version: z.int().optional() });
