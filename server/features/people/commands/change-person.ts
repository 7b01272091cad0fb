import { randomUUID } from "node:crypto";
import { type SQL, sql } from "drizzle-orm";
import type { PersonPatch } from "../../../../shared/contracts/people.ts";
import { ageBandOf, isCase } from "../../../../shared/vocabulary.ts";
import { recordEvent } from "../../../audit/record-event.ts";
import { dayIn, now } from "../../../clock.ts";
import type { Tx } from "../../../db/with-tx.ts";
import { announce, recordGraphChange } from "../../../events/record-graph-change.ts";
import { HttpProblem, invalid } from "../../../http/problem.ts";
import type { Actor } from "../../../http/route.ts";
import type { KeyRing } from "../../../identity/keys.ts";
import { IDENTITY_KEYS, type Identity, putPeople, refToken } from "../../../identity/records.ts";
import type { InvestigationRow } from "../../investigations/store.ts";
import { placeFor } from "../../places/store.ts";
import { checkPerson } from "../check-person.ts";
import type { CorePerson } from "../queries.ts";
import { refTaken } from "./register-person.ts";

const COLUMNS: Partial<Record<keyof PersonPatch, string>> = {
  sex: "sex",
  area: "area",
  occupation: "occupation",
  classification: "classification",
  onsetDate: "onset_date",
  reportDate: "report_date",
  isolationDate: "isolation_date",
  outcome: "outcome",
  outcomeDate: "outcome_date",
  assignedTo: "assigned_account_id",
};

async function checkAssignee(tx: Tx, actor: Actor, accountId: string | null): Promise<void> {
  if (actor.role === "tracer") {
    // A tracer takes; giving back and handing over go through the supervisor.
    if (accountId !== actor.accountId) throw invalid({ path: "assignedTo", code: "not_known" });
    return;
  }
  if (accountId === null) return;
  const found = await tx.execute(
    sql`select 1 from views.member where account_id = ${accountId} and role = 'tracer' and live`,
  );
  if (found.rows.length === 0) throw invalid({ path: "assignedTo", code: "not_known" });
}

/**
 * Changes a person: only the keys present. Keeps the history of classifications with the version of
 * the case definition in force.
 *
 * @throws HttpProblem stale_version when somebody changed the person meanwhile; invalid with paths
 */
export async function changePerson(
  tx: Tx,
  ring: KeyRing,
  actor: Actor,
  settings: InvestigationRow,
  person: CorePerson,
  patch: PersonPatch,
): Promise<void> {
  const today = dayIn(settings.timeZone, now());
  checkPerson(patch, today);
  const keys = await ring.of(tx, actor.investigationId);
  if (patch.ref && (await refTaken(tx, refToken(keys, patch.ref), person.id))) {
    throw invalid({ path: "ref", code: "ref_taken" });
  }
  if (patch.assignedTo !== undefined) await checkAssignee(tx, actor, patch.assignedTo);
  const values = { ...patch };
  if (patch.diedDate !== undefined) {
    values.outcome = patch.diedDate === null ? (patch.outcome ?? null) : "died";
    values.outcomeDate = patch.diedDate ?? patch.outcomeDate ?? null;
  }
  const sets: SQL[] = [sql`version = version + 1`, sql`updated_at = now()`];
  for (const [key, column] of Object.entries(COLUMNS)) {
    const value = values[key as keyof PersonPatch];
    if (value !== undefined) sets.push(sql`${sql.identifier(column)} = ${value}`);
  }
  if (patch.birthDate !== undefined)
    sets.push(sql`age_band = ${ageBandOf(patch.birthDate, today)}`);
  if (patch.household !== undefined) {
    const telling = { name: patch.household ?? "", setting: "household" };
    const householdId = patch.household ? await placeFor(tx, keys, actor, telling) : null;
    sets.push(sql`household_id = ${householdId}`);
  }
  const reclassified =
    patch.classification !== undefined && patch.classification !== person.classification;
  if (reclassified) {
    sets.push(sql`case_definition_version = ${settings.caseDefinitionVersion}`);
    if (person.classification === "contact" && isCase(patch.classification ?? null)) {
      sets.push(sql`became_case = true`);
      // Whoever finds the case goes on with it: an unassigned one would leave their sight by name.
      if (actor.role === "tracer" && !person.assignedTo && patch.assignedTo === undefined) {
        sets.push(sql`assigned_account_id = ${actor.accountId}`);
      }
    }
  }
  const done = await tx.execute(
    sql`update core.person set ${sql.join(sets, sql`, `)}
        where id = ${person.id} and version = ${patch.version} and withdrawn_at is null`,
  );
  if (done.rowCount !== 1) throw new HttpProblem("stale_version");
  if (reclassified && patch.classification) {
    await tx.execute(
      sql`insert into core.classification (id, investigation_id, person_id, classification,
            case_definition_version, recorded_by)
          values (${randomUUID()}, ${actor.investigationId}, ${person.id}, ${patch.classification},
            ${settings.caseDefinitionVersion}, ${actor.accountId})`,
    );
  }
  const identity: Identity = {};
  for (const key of IDENTITY_KEYS) {
    const value = patch[key];
    if (value !== undefined) identity[key] = value;
  }
  if (Object.keys(identity).length > 0) {
    await putPeople(tx, keys, [{ personId: person.id, identity }], settings.countryCode);
  }
  // Clusters stand on the onsets of cases, so such a change makes a new version of the record.
  const redated = patch.onsetDate !== undefined && isCase(person.classification);
  if (reclassified || redated) {
    await recordGraphChange(tx, actor, [{ kind: "classification", personA: person.id }], person.id);
  }
  await announce(tx, "people", person.id);
  await recordEvent(tx, {
    action: "person.changed",
    accountId: actor.accountId,
    role: actor.role,
    investigationId: actor.investigationId,
    personIds: [person.id],
    fields: Object.keys(patch).filter((key) => key !== "version"),
  });
}
