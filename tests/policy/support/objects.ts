import { randomUUID } from "node:crypto";
import type { World } from "./world.ts";

/** A check of a person, whoever may see it. */
export async function checkOf(world: World, personId: string): Promise<string> {
  const made = await world.admin.query(
    `insert into core.follow_check (id, investigation_id, person_id, day, outcome)
     select gen_random_uuid(), investigation_id, id, '2026-03-04', 'seen' from core.person
     where id = $1 returning id`,
    [personId],
  );
  return made.rows[0].id;
}

/** A team without members, past the routes. */
export async function teamIn(world: World, investigationId: string): Promise<string> {
  const id = randomUUID();
  await world.admin.query(
    "insert into core.team (id, investigation_id, name) values ($1, $2, $3)",
    [id, investigationId, `Team ${id.slice(0, 8)}`],
  );
  return id;
}

/** Another person held by whoever holds the held one. */
export async function likeHeld(world: World): Promise<string> {
  const made = await world.admin.query(
    `insert into core.person (id, investigation_id, study_number, classification,
       assigned_account_id, recorded_by)
     select gen_random_uuid(), investigation_id, left(gen_random_uuid()::text, 8), 'contact',
       assigned_account_id, recorded_by from core.person where id = $1 returning id`,
    [world.people.held],
  );
  return made.rows[0].id;
}

/** An end of a person's follow-up. */
export async function endOf(world: World, personId: string): Promise<string> {
  const made = await world.admin.query(
    `insert into core.follow_end (id, investigation_id, person_id, reason, day)
     select gen_random_uuid(), investigation_id, id, 'moved', '2099-03-04' from core.person
     where id = $1 returning id`,
    [personId],
  );
  return made.rows[0].id;
}

/** An invitation that nobody took up, past the routes. */
export async function openInvitation(world: World, investigationId: string): Promise<string> {
  const id = randomUUID();
  await world.admin.query(
    `insert into auth.invitation (id, token_hash, kind, email, investigation_id, role, expires_at)
     values ($1, $2, 'invitation', 'open@body.example', $3, 'tracer', now() + interval '1 hour')`,
    [id, randomUUID(), investigationId],
  );
  return id;
}

/** A saved filter of an account, past the routes. */
export async function savedFilterOf(
  world: World,
  investigationId: string,
  accountId: string,
): Promise<string> {
  const id = randomUUID();
  await world.admin.query(
    `insert into core.saved_filter (id, investigation_id, account_id, name, filter)
     values ($1, $2, $3, $4, '{}')`,
    [id, investigationId, accountId, randomUUID()],
  );
  return id;
}
