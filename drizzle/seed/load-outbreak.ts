import { randomUUID } from "node:crypto";
import { newStudyNumber } from "../../server/features/people/study-number.ts";
import { householdToken, placeName } from "../../server/identity/records.ts";
import { ageBandOf, isCase } from "../../shared/vocabulary.ts";
import type { Outbreak } from "./generator/types.ts";
import { insertRows } from "./insert-rows.ts";
import { loadChecks } from "./load-checks.ts";
import { loadIdentity } from "./load-identity.ts";
import { loadInterviews } from "./load-interviews.ts";
import type { LoadTarget } from "./load-target.ts";

/**
 * Loads a generated outbreak into an empty investigation with its true entry times, as an
 * administrator. Runs inside the caller's transaction.
 */
export async function loadOutbreak(target: LoadTarget, outbreak: Outbreak): Promise<void> {
  const { client, keys, investigationId, accounts } = target;
  const account = (tracer: string | null) => (tracer ? (accounts.get(tracer) ?? null) : null);
  const inv = { investigation_id: investigationId };
  const personId = outbreak.people.map(() => randomUUID());
  const placeId = outbreak.places.map(() => randomUUID());
  const idOf = (index: number) => personId[index] as string;
  const placeOf = (index: number | null) => (index === null ? null : (placeId[index] ?? null));

  await insertRows(
    client,
    "core.place",
    {
      id: "uuid",
      investigation_id: "uuid",
      number: "integer",
      name: "text",
      setting: "text",
      area: "text",
      recorded_at: "timestamptz",
    },
    outbreak.places.map((place, index) => ({
      ...inv,
      id: placeId[index],
      number: index + 1,
      name: place.setting === "household" ? null : place.name,
      setting: place.setting,
      area: place.area,
      recorded_at: place.recordedAt,
    })),
  );
  await insertRows(
    client,
    "identity.place",
    { place_id: "uuid", investigation_id: "uuid", name_cipher: "bytea", name_token: "bytea" },
    outbreak.places.flatMap((place, index) =>
      place.setting === "household"
        ? [
            {
              ...inv,
              place_id: placeId[index],
              name_cipher: placeName
                .seal(keys, placeId[index] as string, place.name)
                .toString("base64"),
              name_token: householdToken(keys, place.name).toString("base64"),
            },
          ]
        : [],
    ),
  );

  const current = new Map<number, { classification: string; wasContact: boolean }>();
  for (const entry of outbreak.classifications) {
    const before = current.get(entry.personId);
    current.set(entry.personId, {
      classification: entry.classification,
      wasContact: before?.wasContact === true || before?.classification === "contact",
    });
  }
  const numbers = new Set<string>();
  while (numbers.size < outbreak.people.length) numbers.add(newStudyNumber());
  const studyNumbers = [...numbers];
  await insertRows(
    client,
    "core.person",
    {
      id: "uuid",
      investigation_id: "uuid",
      study_number: "text",
      sex: "text",
      age_band: "text",
      area: "text",
      occupation: "text",
      household_id: "uuid",
      classification: "text",
      onset_date: "text",
      report_date: "text",
      isolation_date: "text",
      outcome: "text",
      outcome_date: "text",
      became_case: "boolean",
      assigned_account_id: "uuid",
      source: "text",
      recorded_at: "timestamptz",
      recorded_by: "uuid",
      updated_at: "timestamptz",
      version: "integer",
      case_definition_version: "integer",
    },
    outbreak.people.map((person, index) => {
      const now = current.get(index);
      return {
        ...inv,
        id: idOf(index),
        study_number: studyNumbers[index],
        sex: person.sex,
        age_band: ageBandOf(person.birthDate, outbreak.story.lastDay),
        area: person.area,
        occupation: person.occupation,
        household_id: placeOf(person.householdPlaceId),
        classification: now?.classification ?? null,
        onset_date: person.onsetDate,
        report_date: person.reportDate,
        isolation_date: person.isolationDate,
        outcome: person.outcome,
        outcome_date: person.outcomeDate,
        became_case: isCase(now?.classification ?? null) && now?.wasContact === true,
        assigned_account_id: account(person.assignedTracer),
        source: person.source,
        recorded_at: person.recordedAt,
        recorded_by: account(person.enteredBy),
        updated_at: person.recordedAt,
        version: 1,
        case_definition_version: target.caseDefinitionVersion ?? 1,
      };
    }),
  );
  await loadIdentity(target, outbreak, idOf);
  await insertRows(
    client,
    "core.classification",
    {
      id: "uuid",
      investigation_id: "uuid",
      person_id: "uuid",
      classification: "text",
      case_definition_version: "integer",
      recorded_at: "timestamptz",
    },
    outbreak.classifications.map((entry) => ({
      ...inv,
      id: randomUUID(),
      person_id: idOf(entry.personId),
      classification: entry.classification,
      case_definition_version: target.caseDefinitionVersion ?? 1,
      recorded_at: entry.recordedAt,
    })),
  );
  await insertRows(
    client,
    "core.test_result",
    {
      id: "uuid",
      investigation_id: "uuid",
      person_id: "uuid",
      specimen_date: "text",
      kind: "text",
      result: "text",
      result_date: "text",
      version: "integer",
      recorded_at: "timestamptz",
    },
    outbreak.tests.map((test) => ({
      ...inv,
      id: randomUUID(),
      person_id: idOf(test.personId),
      specimen_date: test.specimenDate,
      kind: test.kind,
      result: test.result,
      result_date: test.resultDate,
      version: 1,
      recorded_at: test.recordedAt,
    })),
  );
  await loadInterviews(target, outbreak, idOf, placeOf);
  await loadChecks(target, outbreak, idOf);
}
