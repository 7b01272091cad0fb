import { z } from "zod";
import {
  blankContact,
  blankInterview,
  type ContactValues,
  contactTextKeys,
  type GroupValues,
  groupKeys,
  type InterviewValues,
  isBlankContact,
  isBlankGroup,
} from "./interview-values.ts";

/** What a draft on the server holds: the form, and the key under which it will be sent. */
export interface DraftBody {
  form: InterviewValues;
  /** One key for this interview, kept with the draft so that a reload cannot send it twice. */
  submitKey: string;
}

const box = z.string().max(2_000).catch("");
const texts = <K extends string>(keys: readonly K[]) =>
  Object.fromEntries(keys.map((key) => [key, box])) as Record<K, typeof box>;

const known = z
  .object({
    personId: z.uuid(),
    studyNumber: z.string(),
    name: z.string().nullable().catch(null),
    ageBand: z.string().nullable().catch(null),
    area: z.string().nullable().catch(null),
  })
  .nullable()
  .catch(null);

const contact = z.object({ known, ...texts(contactTextKeys) });
const group = z.object(texts(groupKeys));
const body = z.object({
  submitKey: z.uuid(),
  form: z.object({
    outcome: box,
    channel: box,
    heldAt: box,
    contacts: z.array(contact).catch([]),
    groupExposures: z.array(group).catch([]),
  }),
});

/** Reads a stored draft; what an older form knew and this one does not is left out. Null: no draft. */
export function readDraft(stored: unknown): DraftBody | null {
  const parsed = body.safeParse(stored);
  if (!parsed.success) return null;
  const { form, submitKey } = parsed.data;
  const contacts: ContactValues[] = form.contacts;
  const groupExposures: GroupValues[] = form.groupExposures;
  return {
    submitKey,
    form: {
      ...form,
      contacts: contacts.length > 0 ? contacts : [blankContact()],
      groupExposures,
    },
  };
}

/** True when a form holds something a tracer typed; the prefilled time alone is nothing. */
export function holdsSomething(form: InterviewValues): boolean {
  return (
    form.outcome !== "" ||
    form.channel !== "" ||
    form.contacts.some((row) => !isBlankContact(row)) ||
    form.groupExposures.some((row) => !isBlankGroup(row))
  );
}

/** A fresh form with a key of its own. */
export function freshDraft(heldAt: string): DraftBody {
  return { form: blankInterview(heldAt), submitKey: crypto.randomUUID() };
}

/** "3 contacts and 1 group", for the choice between two versions. */
export function draftSize(draft: DraftBody): { contacts: number; groups: number } {
  return {
    contacts: draft.form.contacts.filter((row) => !isBlankContact(row)).length,
    groups: draft.form.groupExposures.filter((row) => !isBlankGroup(row)).length,
  };
}
