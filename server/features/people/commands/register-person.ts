import { sql } from "drizzle-orm";
import type { PersonRegistration } from "../../../../shared/contracts/people.ts";
import { ageBandOf } from "../../../../shared/vocabulary.ts";
import { recordEvent } from "../../../audit/record-event.ts";
import { dayIn, now } from "../../../clock.ts";
import type { Tx } from "../../../db/with-tx.ts";
import { type GraphChange, recordGraphChange } from "../../../events/record-graph-change.ts";
import { invalid } from "../../../http/problem.ts";
import type { Actor } from "../../../http/route.ts";
import type { KeyRing } from "../../../identity/keys.ts";
import {
  flagHiddenMatches,
  IDENTITY_KEYS,
  type Identity,
  putPeople,
  refToken,
} from "../../../identity/records.ts";
import type { InvestigationRow } from "../../investigations/store.ts";
import { placeFor } from "../../places/store.ts";
import { checkPerson } from "../check-person.ts";
import { insertHeldInterviews, insertPeople, insertTests } from "../store.ts";

/** True when another person of the investigation has this reference. */
export async function refTaken(tx: Tx, token: Buffer, except: string | null): Promise<boolean> {
  const found = await tx.execute<{ taken: boolean }>(
    sql`select identity.ref_taken(${token}::bytea, ${except}::uuid) as taken`,
  );
  return found.rows[0]?.taken === true;
}

/**
 * Registers a person: core and identity apart, household found or made, first classification and
 * test, one graph change and one event. A tracer's new person is assigned to that tracer.
 *
 * @throws HttpProblem invalid with paths of the form's fields
 */
export async function registerPerson(
  tx: Tx,
  ring: KeyRing,
  actor: Actor,
  settings: InvestigationRow,
  input: PersonRegistration,
): Promise<{ id: string; studyNumber: string; version: number }> {
  const today = dayIn(settings.timeZone, now());
  checkPerson(input, today);
  const keys = await ring.of(tx, actor.investigationId);
  if (input.ref && (await refTaken(tx, refToken(keys, input.ref), null))) {
    throw invalid({ path: "ref", code: "ref_taken" });
  }
  const householdId = input.household
    ? await placeFor(tx, keys, actor, {
        name: input.household,
        setting: "household",
        area: input.area,
      })
    : null;
  const [person] = await insertPeople(
    tx,
    actor,
    [
      {
        sex: input.sex,
        ageBand: ageBandOf(input.birthDate, today),
        area: input.area,
        occupation: input.occupation,
        householdId,
        classification: input.classification,
        onsetDate: input.onsetDate,
        reportDate: input.reportDate,
        interviewDate: input.interviewDate,
        interviewed: input.interviewed,
        interviewState: input.interviewed === "yes" ? "complete" : null,
        isolationDate: input.isolationDate,
        outcome: input.diedDate ? "died" : input.outcome,
        outcomeDate: input.diedDate ?? input.outcomeDate,
        assignedAccountId: actor.role === "tracer" ? actor.accountId : null,
        source: "form",
      },
    ],
    settings.caseDefinitionVersion,
  );
  if (!person) throw new Error("no person was recorded");
  const identity: Identity = {};
  for (const key of IDENTITY_KEYS) identity[key] = input[key] ?? null;
  await putPeople(tx, keys, [{ personId: person.id, identity }], settings.countryCode);
  const typed = { name: input.name, phone: input.phone };
  await flagHiddenMatches(tx, keys, [{ personId: person.id, ...typed }], settings.countryCode);
  if (input.specimenDate || input.result || input.resultDate) {
    await insertTests(tx, actor, [
      {
        personId: person.id,
        specimenDate: input.specimenDate,
        kind: null,
        result: input.result,
        resultDate: input.resultDate,
      },
    ]);
  }
  const changes: GraphChange[] = [{ kind: "person", personA: person.id }];
  if (input.interviewed === "yes") {
    const held = { personId: person.id, day: input.interviewDate };
    await insertHeldInterviews(tx, actor, "form", settings.timeZone, [held]);
    changes.push({ kind: "interview", personA: person.id });
  }
  await recordGraphChange(tx, actor, changes, person.id);
  await recordEvent(tx, {
    action: "person.registered",
    accountId: actor.accountId,
    role: actor.role,
    investigationId: actor.investigationId,
    personIds: [person.id],
    fields: Object.entries(input).flatMap(([key, value]) => (value === null ? [] : [key])),
  });
  return { ...person, version: 1 };
}
