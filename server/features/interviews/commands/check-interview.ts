import type { InterviewInput } from "../../../../shared/contracts/interviews.ts";
import type { FieldError } from "../../../../shared/errors.ts";
import { MISSING } from "../../../../shared/vocabulary.ts";
import { looksLikePhone } from "../../../identity/tokens.ts";

const isMissing = (value: string | null) => (MISSING as readonly (string | null)[]).includes(value);

interface Exposed {
  firstExposure: string | null;
  lastExposure: string | null;
}

/** A day of which something is known: whole or partial, not a word for "missing". */
const told = (value: string | null): value is string => value !== null && !isMissing(value);

function checkDays(row: Exposed, path: string, today: string): FieldError[] {
  const errors: FieldError[] = [];
  for (const key of ["firstExposure", "lastExposure"] as const) {
    const value = row[key];
    // A month is in the future when the whole of it is.
    if (told(value) && value > today.slice(0, value.length)) {
      errors.push({ path: `${path}.${key}`, code: "in_future" });
    }
  }
  const { firstExposure: first, lastExposure: last } = row;
  if (told(first) && told(last)) {
    const length = Math.min(first.length, last.length);
    if (last.slice(0, length) < first.slice(0, length)) {
      errors.push({ path: `${path}.lastExposure`, code: "last_before_first" });
    }
  }
  return errors;
}

/** What the record says about the ids that an interview names. */
export interface KnownIds {
  /** People in the acting person's scope. */
  people: ReadonlySet<string>;
  places: ReadonlySet<string>;
}

/**
 * What an interview's contract cannot see: the calendar, telephone numbers and what is on record.
 *
 * @param today local day in the investigation's zone
 * @param at the current instant
 * @returns errors with full paths; empty when the interview may be stored
 */
export function checkInterview(
  input: InterviewInput,
  known: KnownIds,
  today: string,
  at: Date,
): FieldError[] {
  const errors: FieldError[] = [];
  if (input.heldAt !== null && new Date(input.heldAt) > at) {
    errors.push({ path: "heldAt", code: "in_future" });
  }
  input.contacts.forEach((contact, row) => {
    const path = `contacts.${row}`;
    if (contact.personId === input.personId) {
      errors.push({ path: `${path}.personId`, code: "self_contact" });
    } else if (contact.personId && !known.people.has(contact.personId)) {
      errors.push({ path: `${path}.personId`, code: "not_known" });
    }
    if (!contact.personId) {
      const { name, phone } = contact;
      if (phone !== null && !isMissing(phone) && !looksLikePhone(phone)) {
        errors.push({ path: `${path}.phone`, code: "not_a_phone" });
      }
      // Somebody neither named nor to be called belongs to the group exposures, not to the graph.
      const nameless = name === null || isMissing(name);
      if (nameless && (phone === null || isMissing(phone))) {
        errors.push({ path: `${path}.name`, code: "required" });
      }
    }
    if (contact.placeId && !known.places.has(contact.placeId)) {
      errors.push({ path: `${path}.placeId`, code: "not_known" });
    }
    errors.push(...checkDays(contact, path, today));
  });
  input.groupExposures.forEach((group, row) => {
    errors.push(...checkDays(group, `groupExposures.${row}`, today));
  });
  return errors;
}
