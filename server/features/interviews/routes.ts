import { z } from "zod";
import {
  draftAnswer,
  draftInput,
  interviewInput,
  interviewList,
  interviewReceipt,
  interviewsQuery,
} from "../../../shared/contracts/interviews.ts";
import type { EventName } from "../../../shared/events.ts";
import { recordEvent } from "../../audit/record-event.ts";
import type { Tx } from "../../db/with-tx.ts";
import { HttpProblem } from "../../http/problem.ts";
import { type Actor, type AnyRoute, defineRoute } from "../../http/route.ts";
import { submitInterview } from "./commands/submit-interview.ts";
import { keepDraft, readDraft } from "./drafts.ts";
import { INTERVIEWERS } from "./policy.ts";
import { presentDraft, presentInterview } from "./present.ts";
import { listInterviews } from "./queries.ts";
import { mayInterview } from "./store.ts";

const params = z.object({ id: z.uuid() });
const personParams = z.object({ id: z.uuid(), personId: z.uuid() });

/** Drafts hold what was said about people, so saving and opening them is on record. */
async function recordDraft(tx: Tx, actor: Actor, action: EventName, personId: string) {
  await recordEvent(tx, {
    action,
    accountId: actor.accountId,
    role: actor.role,
    investigationId: actor.investigationId,
    personIds: [personId],
    fields: ["interviewDraft"],
  });
}

/** Interviews and attempts, and the drafts kept while they are typed. */
export const interviewRoutes: AnyRoute[] = [
  defineRoute({
    method: "post",
    path: "/api/investigations/:id/interviews",
    summary: "Submit an interview, or an attempt at one, with the contacts it named",
    policy: INTERVIEWERS,
    params,
    body: interviewInput,
    output: interviewReceipt,
    creates: true,
    run: ({ tx, actor, services, body }) => submitInterview(tx, actor, services.keys, body),
  }),
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/interviews",
    summary: "Interviews and attempts, the latest held first",
    policy: INTERVIEWERS,
    params,
    query: interviewsQuery,
    output: interviewList,
    async run({ tx, actor, query }) {
      const { rows, total } = await listInterviews(tx, actor, query);
      await recordEvent(tx, {
        action: "interviews.listed",
        accountId: actor.accountId,
        role: actor.role,
        investigationId: actor.investigationId,
        personIds: [...new Set(rows.map((row) => row.personId))],
        counts: { interviews: rows.length },
      });
      const items = rows.map(presentInterview);
      return { items, total, page: query.page, pageSize: query.pageSize };
    },
  }),
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/people/:personId/interview-draft",
    summary: "What the acting person typed about an interview and has not submitted",
    policy: INTERVIEWERS,
    params: personParams,
    output: draftAnswer,
    async run({ tx, actor, services, params: { personId } }) {
      if (!(await mayInterview(tx, personId))) throw new HttpProblem("not_found");
      const keys = await services.keys.of(tx, actor.investigationId);
      const draft = await readDraft(tx, keys, actor, personId);
      if (draft) await recordDraft(tx, actor, "interview.draft_opened", personId);
      return presentDraft(draft);
    },
  }),
  defineRoute({
    method: "put",
    path: "/api/investigations/:id/people/:personId/interview-draft",
    summary: "Keep what is typed; 409 when another page saved or submitted meanwhile",
    policy: INTERVIEWERS,
    params: personParams,
    body: draftInput,
    output: draftAnswer,
    async run({ tx, actor, services, params: { personId }, body }) {
      if (!(await mayInterview(tx, personId))) throw new HttpProblem("not_found");
      const keys = await services.keys.of(tx, actor.investigationId);
      await keepDraft(tx, keys, actor, personId, body);
      await recordDraft(tx, actor, "interview.drafted", personId);
      return presentDraft(await readDraft(tx, keys, actor, personId));
    },
  }),
];
