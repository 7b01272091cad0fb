import { type SQL, sql } from "drizzle-orm";
import {
  ASSIGN_LIMITS,
  type AssignAnswer,
  type Assignees,
  type AssignInput,
} from "../../../../shared/contracts/people-filters.ts";
import { recordEvent } from "../../../audit/record-event.ts";
import type { Tx } from "../../../db/with-tx.ts";
import { announce } from "../../../events/record-graph-change.ts";
import { HttpProblem, invalid } from "../../../http/problem.ts";
import type { Actor } from "../../../http/route.ts";
import type { InvestigationKeys } from "../../../identity/keys.ts";
import { listCondition } from "../list.ts";

interface Target {
  account: string | null;
  team: string | null;
}

/** To whom people can be assigned: who traces here, and the teams. A tracer takes for themselves. */
export async function assignees(tx: Tx, actor: Actor): Promise<Assignees> {
  if (actor.role === "tracer") return { members: [], teams: [] };
  const members = await tx.execute<Assignees["members"][number] & Record<string, unknown>>(
    sql`select account_id as "accountId", display_name as "displayName", team from views.member
        where role = 'tracer' and ended_at is null order by lower(display_name), account_id`,
  );
  const teams = await tx.execute<Assignees["teams"][number] & Record<string, unknown>>(
    sql`select id, name from core.team order by lower(name), id`,
  );
  return { members: members.rows, teams: teams.rows };
}

/** Checks the one they go to; the rules are those of assigning one person. */
async function targetOf(tx: Tx, actor: Actor, to: AssignInput["to"]): Promise<Target> {
  if (actor.role === "tracer") {
    // A tracer takes; giving back and handing over go through the supervisor.
    if (to.kind !== "member") throw invalid({ path: "to.kind", code: "not_in_list" });
    if (to.accountId !== actor.accountId)
      throw invalid({ path: "to.accountId", code: "not_known" });
    return { account: actor.accountId, team: null };
  }
  if (to.kind === "nobody") return { account: null, team: null };
  const { members, teams } = await assignees(tx, actor);
  if (to.kind === "team") {
    if (!teams.some((one) => one.id === to.teamId)) {
      throw invalid({ path: "to.teamId", code: "not_known" });
    }
    return { account: null, team: to.teamId };
  }
  if (!members.some((one) => one.accountId === to.accountId)) {
    throw invalid({ path: "to.accountId", code: "not_known" });
  }
  return { account: to.accountId, team: null };
}

interface Seen {
  id: string;
  version: number;
}

/** Everybody a filter finds now; refused when that is not the number the acting person saw. */
async function everybody(
  tx: Tx,
  actor: Actor,
  where: SQL,
  expected: number | undefined,
): Promise<Seen[]> {
  const found = await tx.execute<Seen & Record<string, unknown>>(
    sql`select p.id, p.version from core.person p where ${where} limit ${ASSIGN_LIMITS.filter + 1}`,
  );
  if (found.rows.length > ASSIGN_LIMITS.filter) throw invalid({ path: "filter", code: "too_many" });
  // Nobody is assigned unseen: the list has to be looked at again first.
  if (found.rows.length !== expected) throw new HttpProblem("stale_version");
  if (actor.role !== "tracer") return found.rows;
  return mayName(tx, found.rows);
}

/** A tracer changes those whose identity is theirs, as one at a time; the rest is out of their hands. */
async function mayName(tx: Tx, people: readonly Seen[]): Promise<Seen[]> {
  const ids = sql`${sql.param(`{${people.map((one) => one.id).join(",")}}`)}::uuid[]`;
  const named = await tx.execute<{ id: string }>(
    sql`select unnest(core.ctx_named_of(${ids})) as id`,
  );
  const mine = new Set(named.rows.map((row) => row.id));
  return people.filter((one) => mine.has(one.id));
}

/**
 * Assigns several people to a member, a team or nobody, in one transaction. Who was changed by
 * somebody else since they were seen, or is out of sight, stays as they are and is listed.
 *
 * @throws HttpProblem invalid with paths; stale_version when a filter no longer finds as many
 */
export async function assignPeople(
  tx: Tx,
  keys: InvestigationKeys | null,
  actor: Actor,
  input: AssignInput,
  country: string,
): Promise<AssignAnswer> {
  const { account, team } = await targetOf(tx, actor, input.to);
  const asked: Seen[] = input.filter
    ? await everybody(
        tx,
        actor,
        await listCondition(tx, keys, actor, input.filter, country),
        input.expected,
      )
    : [...new Map((input.people ?? []).map((one) => [one.id, one])).values()];
  const able = actor.role === "tracer" ? await mayName(tx, asked) : asked;
  const done = await tx.execute<{ id: string; changed: boolean }>(
    sql`with asked as (
          select a.id, a.version from jsonb_to_recordset(${JSON.stringify(able)}::jsonb)
            as a (id uuid, version integer)),
        same as (
          select p.id from core.person p join asked a on a.id = p.id and a.version = p.version
          where p.withdrawn_at is null
            and p.assigned_account_id is not distinct from ${account}::uuid
            and p.assigned_team_id is not distinct from ${team}::uuid),
        changed as (
          update core.person p set assigned_account_id = ${account}::uuid,
            assigned_team_id = ${team}::uuid, version = p.version + 1, updated_at = now()
          from asked a
          where a.id = p.id and a.version = p.version and p.withdrawn_at is null
            and (p.assigned_account_id is distinct from ${account}::uuid
              or p.assigned_team_id is distinct from ${team}::uuid)
          returning p.id)
        select id, true as changed from changed union all select id, false from same`,
  );
  const changed = done.rows.filter((row) => row.changed).map((row) => row.id);
  const met = new Set(done.rows.map((row) => row.id));
  const skipped = asked.map((one) => one.id).filter((id) => !met.has(id));
  const unchanged = met.size - changed.length;
  await recordEvent(tx, {
    action: "people.assigned",
    accountId: actor.accountId,
    role: actor.role,
    investigationId: actor.investigationId,
    personIds: changed,
    fields: [`to:${input.to.kind}`],
    counts: { changed: changed.length, unchanged, skipped: skipped.length },
  });
  if (changed.length > 0) await announce(tx, "people", null);
  return { changed: changed.length, unchanged, skipped };
}
