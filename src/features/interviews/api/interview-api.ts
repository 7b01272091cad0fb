import {
  type Draft,
  draftAnswer,
  type InterviewInput,
  interviewReceipt,
} from "../../../../shared/contracts/interviews.ts";
import { type Match, matchAnswer, type PersonPage } from "../../../../shared/contracts/people.ts";
import { type Place, placeList } from "../../../../shared/contracts/places.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import type { DraftBody } from "../form/draft-body.ts";

const draftPath = (investigationId: string, personId: string) =>
  inInvestigation(investigationId, `people/${personId}/interview-draft`);

/** The person to be interviewed, with windows and earlier attempts. */
export function getPerson(investigationId: string, personId: string): Promise<PersonPage> {
  return api.get<PersonPage>(inInvestigation(investigationId, `people/${personId}`));
}

/** The acting person's draft about somebody; version 0 and no body when there is none. */
export function getDraft(investigationId: string, personId: string): Promise<Draft> {
  return api.get<Draft>(draftPath(investigationId, personId), { schema: draftAnswer });
}

/** Saves the draft over the given version. */
export function putDraft(
  investigationId: string,
  personId: string,
  version: number,
  body: DraftBody,
): Promise<Pick<Draft, "version" | "updatedAt">> {
  return api.put(draftPath(investigationId, personId), { body: { version, body } });
}

/** Records the interview; the same key never makes a second one. */
export function postInterview(
  investigationId: string,
  input: InterviewInput,
  idempotencyKey: string,
): Promise<{ id: string; graphVersion: number }> {
  return api.post(inInvestigation(investigationId, "interviews"), {
    body: input,
    idempotencyKey,
    schema: interviewReceipt,
  });
}

/** People on record, within the acting person's sight, who may be the one being typed. */
export async function findMatches(
  investigationId: string,
  typed: { name?: string; phone?: string },
  signal: AbortSignal,
): Promise<Match[]> {
  const answer = await api.post(inInvestigation(investigationId, "people/matches"), {
    body: typed,
    schema: matchAnswer,
    signal,
  });
  return answer.items;
}

/** Places on record. `q` is part of a facility's name: never ask it with a household's. */
export async function getPlaces(investigationId: string, q?: string): Promise<Place[]> {
  const answer = await api.get(inInvestigation(investigationId, "places"), {
    query: { q, pageSize: 200 },
    schema: placeList,
  });
  return answer.items;
}
