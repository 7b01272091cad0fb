import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import type { InterviewInput } from "../../../../shared/contracts/interviews.ts";
import { recordEvent } from "../../../audit/record-event.ts";
import { dayIn, now } from "../../../clock.ts";
import type { Tx } from "../../../db/with-tx.ts";
import {
  announce,
  type GraphChange,
  recordGraphChange,
} from "../../../events/record-graph-change.ts";
import { HttpProblem } from "../../../http/problem.ts";
import type { Actor } from "../../../http/route.ts";
import type { InvestigationKeys, KeyRing } from "../../../identity/keys.ts";
import { flagHiddenMatches, putPeople } from "../../../identity/records.ts";
import { type InvestigationRow, loadInvestigation } from "../../investigations/store.ts";
import { insertPeople } from "../../people/store.ts";
import { placeFor } from "../../places/store.ts";
import { endsDraft } from "../policy.ts";
import {
  type Interviewee,
  insertExposures,
  insertGroupExposures,
  insertInterview,
  knownIds,
  lockInterviewee,
  markContacts,
  pairsFor,
  refreshInterviewCopies,
  setInterviewVersion,
} from "../store.ts";
import { checkInterview } from "./check-interview.ts";
import { gatherContacts, type NewContact } from "./gather-contacts.ts";

/** The transaction of a submission with who acts and where. */
interface Desk {
  tx: Tx;
  actor: Actor;
  keys: InvestigationKeys;
  investigation: InvestigationRow;
}

/** Ids as the database writes them, so that they compare as text. */
function lowerIds(input: InterviewInput): InterviewInput {
  return {
    ...input,
    personId: input.personId.toLowerCase(),
    contacts: input.contacts.map((contact) => ({
      ...contact,
      personId: contact.personId?.toLowerCase() ?? null,
      placeId: contact.placeId?.toLowerCase() ?? null,
    })),
  };
}

/** Finds or makes each place of a form once, however many rows name it. */
function placeFinder(desk: Desk, household: string | null) {
  const found = new Map<string, Promise<string>>();
  return async (row: { setting: string | null; place: string | null; placeId?: string | null }) => {
    if (row.placeId) return row.placeId;
    if (row.place === null) return row.setting === "household" ? household : null;
    const telling = { name: row.place, setting: row.setting };
    const key = `${row.setting}|${row.place.toLowerCase()}`;
    const known = found.get(key) ?? placeFor(desk.tx, desk.keys, desk.actor, telling);
    found.set(key, known);
    return known;
  };
}

/**
 * Puts people named for the first time on record, identity apart from core. One who may be on
 * record already outside the acting person's scope goes to the supervisor's list without a word.
 */
async function registerContacts(desk: Desk, fresh: readonly NewContact[]): Promise<void> {
  const { tx, actor, keys, investigation } = desk;
  await insertPeople(
    tx,
    actor,
    fresh.map(({ id }) => ({ id, classification: "contact", source: "interview" as const })),
    investigation.caseDefinitionVersion,
  );
  const country = investigation.countryCode;
  const identities = fresh.map(({ id, name, phone }) => ({
    personId: id,
    identity: { name, phone },
  }));
  await putPeople(tx, keys, identities, country);
  const typed = fresh.map(({ id, name, phone }) => ({ personId: id, name, phone }));
  await flagHiddenMatches(tx, keys, typed, country);
}

/** Fields that a submission fills, by name: what the access record keeps instead of values. */
function fieldNames(input: InterviewInput): string[] {
  const names = new Set<string>(["outcome"]);
  if (input.channel !== null) names.add("channel");
  for (const contact of input.contacts) {
    for (const [key, value] of Object.entries(contact)) {
      if (value !== null && value !== undefined) names.add(`contacts.${key}`);
    }
  }
  if (input.groupExposures.length > 0) names.add("groupExposures");
  return [...names];
}

/** Checks the form against the calendar and the record, all errors at once. */
async function refuseInvalid(tx: Tx, input: InterviewInput, today: string, at: Date) {
  const people = input.contacts.flatMap((contact) => contact.personId ?? []);
  const places = input.contacts.flatMap((contact) => contact.placeId ?? []);
  const errors = checkInterview(input, await knownIds(tx, people, places), today, at);
  if (errors.length > 0) throw new HttpProblem("invalid", { errors });
}

/** Stores pairs, exposures and group exposures; returns what changed in the graph. */
async function storeExposures(
  desk: Desk,
  interviewId: string,
  interviewee: Interviewee,
  input: InterviewInput,
  personIds: readonly string[],
): Promise<GraphChange[]> {
  const { tx, actor } = desk;
  const placeOf = placeFinder(desk, interviewee.householdId);
  const pairs = await pairsFor(tx, interviewee.id, [...new Set(personIds)]);
  const exposures = [];
  for (const [row, contact] of input.contacts.entries()) {
    const pair = pairs.get(personIds[row] ?? "");
    if (!pair) throw new Error("a contact was left without a pair");
    exposures.push({ ...contact, pairId: pair.pairId, placeId: await placeOf(contact) });
  }
  await insertExposures(tx, actor, interviewId, interviewee.id, exposures);
  const groups = [];
  for (const group of input.groupExposures) {
    groups.push({ ...group, placeId: await placeOf(group) });
  }
  await insertGroupExposures(tx, actor, interviewId, interviewee.id, groups);
  return [...pairs].flatMap(([other, { made }]) => {
    const ends = { personA: interviewee.id, personB: other };
    const told: GraphChange = { kind: "exposure", ...ends };
    return made ? [{ kind: "pair", ...ends }, told] : [told];
  });
}

/**
 * Stores an interview, or an attempt at one, in the transaction it is given: the people it names for
 * the first time, contact pairs with their exposures, group exposures, the person's copies, the
 * graph version and one access event.
 *
 * @param input as the contract gives it
 * @returns the interview's id and the graph version it made
 * @throws HttpProblem not_found when the person is not the acting person's to interview; invalid
 *   with full paths for future days, unreadable telephone numbers, unknown people and places, and
 *   a person named as their own contact
 */
export async function submitInterview(
  tx: Tx,
  actor: Actor,
  keyRing: KeyRing,
  input: InterviewInput,
): Promise<{ id: string; graphVersion: number }> {
  const form = lowerIds(input);
  const interviewee = await lockInterviewee(tx, form.personId);
  if (!interviewee) throw new HttpProblem("not_found");
  const investigation = await loadInvestigation(tx, actor.investigationId);
  const at = now();
  await refuseInvalid(tx, form, dayIn(investigation.timeZone, at), at);

  const keys = await keyRing.of(tx, actor.investigationId);
  const desk = { tx, actor, keys, investigation };
  const { personIds, fresh } = gatherContacts(form.contacts, investigation.countryCode);
  await registerContacts(desk, fresh);

  const id = randomUUID();
  const heldAt = form.heldAt === null ? at : new Date(form.heldAt);
  await insertInterview(tx, actor, {
    id,
    personId: interviewee.id,
    outcome: form.outcome,
    channel: form.channel,
    heldAt: heldAt.toISOString(),
    day: dayIn(investigation.timeZone, heldAt),
  });
  const told = await storeExposures(desk, id, interviewee, form, personIds);
  await refreshInterviewCopies(tx, interviewee.id);
  const onRecord = form.contacts.flatMap((contact) => contact.personId ?? []);
  const marked = await markContacts(tx, actor, onRecord, investigation.caseDefinitionVersion);
  if (endsDraft(form.outcome, form.contacts.length + form.groupExposures.length)) {
    await tx.execute(sql`select identity.drop_draft(${interviewee.id}::uuid)`);
  }

  const changes: GraphChange[] = [
    ...fresh.map((one): GraphChange => ({ kind: "person", personA: one.id })),
    ...told,
    ...marked.map((personA): GraphChange => ({ kind: "classification", personA })),
    { kind: "interview", personA: interviewee.id },
  ];
  const graphVersion = await recordGraphChange(tx, actor, changes, id);
  await setInterviewVersion(tx, id, graphVersion);
  await announce(tx, "interviews", id);
  await recordEvent(tx, {
    action: "interview.submitted",
    accountId: actor.accountId,
    role: actor.role,
    investigationId: actor.investigationId,
    personIds: [interviewee.id, ...new Set(personIds)],
    fields: fieldNames(form),
    counts: {
      contacts: form.contacts.length,
      newPeople: fresh.length,
      groupExposures: form.groupExposures.length,
    },
  });
  return { id, graphVersion };
}
