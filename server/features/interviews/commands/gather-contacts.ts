import { randomUUID } from "node:crypto";
import type { ContactInput } from "../../../../shared/contracts/interviews.ts";
import { nameParts, normalPhone } from "../../../identity/tokens.ts";

/** Somebody named for the first time. */
export interface NewContact {
  id: string;
  name: string | null;
  phone: string | null;
}

/** Who an interview names: each row's person, and those who are new. */
export interface NamedContacts {
  /** Person of each contact row, in the order of the form. */
  personIds: string[];
  fresh: NewContact[];
}

/** Same name and same number in one form: the same person met twice. Null when one is lacking. */
function sameness(contact: ContactInput, country: string): string | null {
  const phone = contact.phone === null ? null : normalPhone(contact.phone, country);
  const parts = contact.name === null ? [] : nameParts(contact.name);
  if (phone === null || parts.length === 0) return null;
  return `${phone}|${parts.join(" ")}`;
}

/**
 * Gives every contact row its person. Rows with the same `personId` are one person, and so are new
 * rows that agree in both name and telephone number: such rows become several exposures of one pair.
 *
 * @param country country code by which national telephone numbers are read
 */
export function gatherContacts(contacts: readonly ContactInput[], country: string): NamedContacts {
  const fresh: NewContact[] = [];
  const seen = new Map<string, string>();
  const personIds = contacts.map((contact) => {
    if (contact.personId) return contact.personId;
    const same = sameness(contact, country);
    const known = same === null ? undefined : seen.get(same);
    if (known) return known;
    const id = randomUUID();
    fresh.push({ id, name: contact.name, phone: contact.phone });
    if (same !== null) seen.set(same, id);
    return id;
  });
  return { personIds, fresh };
}
