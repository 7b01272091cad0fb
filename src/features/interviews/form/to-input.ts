import { instantOf } from "./held-at.ts";
import { type InterviewValues, isBlankContact, isBlankGroup } from "./interview-values.ts";
import { figureValue, readCount, readDay } from "./read-box.ts";

/** What the form needs to know to be sent. */
export interface SendContext {
  personId: string;
  zone: string;
  /** The investigation's day. */
  today: string;
  /** Id of a place on record by what stands in a place box and the setting beside it. */
  placeIdOf: (place: string, setting: string) => string | undefined;
}

/** What is sent, and which row of the form each sent row was: blank rows are left out. */
export interface Sendable {
  body: Record<string, unknown>;
  contactRows: number[];
  groupRows: number[];
}

/** Makes the request body of an interview from what the boxes hold; nothing is checked here. */
export function toSendable(values: InterviewValues, context: SendContext): Sendable {
  const contactRows: number[] = [];
  const groupRows: number[] = [];
  const day = (text: string, before?: string) => readDay(text, context.today, before);
  const contacts = values.contacts.flatMap((row, index) => {
    if (isBlankContact(row)) return [];
    contactRows.push(index);
    const first = day(row.firstExposure);
    const placeId = row.place ? context.placeIdOf(row.place, row.setting) : undefined;
    return [
      {
        personId: row.known?.personId ?? null,
        // A tied row is the person on record; what was typed before is not told a second time.
        name: row.known ? null : row.name,
        phone: row.known ? null : row.phone,
        setting: row.setting,
        placeId: placeId ?? null,
        place: placeId ? null : row.place,
        firstExposure: first,
        lastExposure: day(row.lastExposure, first),
        minutes: figureValue(row.minutes),
        distanceM: figureValue(row.distanceM),
        physical: row.physical,
        indoors: row.indoors,
        relation: row.relation,
      },
    ];
  });
  const groupExposures = values.groupExposures.flatMap((row, index) => {
    if (isBlankGroup(row)) return [];
    groupRows.push(index);
    const count = readCount(row.count);
    const first = day(row.firstExposure);
    return [
      {
        setting: row.setting,
        place: row.place,
        firstExposure: first,
        lastExposure: day(row.lastExposure, first),
        countMin: count.kind === "invalid" ? row.count : count.min,
        countMax: count.kind === "invalid" ? null : count.max,
      },
    ];
  });
  const heldAt = values.heldAt.trim() === "" ? null : values.heldAt;
  const body = {
    personId: context.personId,
    outcome: values.outcome,
    channel: values.channel,
    // What cannot be read is passed on as it is, so that the contract names the error.
    heldAt: heldAt === null ? null : (instantOf(heldAt, context.zone) ?? heldAt),
    contacts,
    groupExposures,
  };
  return { body, contactRows, groupRows };
}

const contactBoxes: Readonly<Record<string, string>> = { personId: "known", placeId: "place" };
const groupBoxes: Readonly<Record<string, string>> = { countMin: "count", countMax: "count" };

/** Path of a box of the form for a path of the request ("contacts.0.phone" → "contacts.2.phone"). */
export function boxPath(path: string, sent: Pick<Sendable, "contactRows" | "groupRows">): string {
  const [list, index, key = "", ...rest] = path.split(".");
  const contacts = list === "contacts";
  if (!contacts && list !== "groupExposures") return path;
  const row = (contacts ? sent.contactRows : sent.groupRows)[Number(index)];
  if (row === undefined) return list;
  const box = (contacts ? contactBoxes : groupBoxes)[key] ?? key;
  return [list, row, box, ...rest].filter((part) => part !== "").join(".");
}
