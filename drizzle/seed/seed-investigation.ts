import { randomUUID } from "node:crypto";
import pg from "pg";
import type { KeyRing } from "../../server/identity/keys.ts";
import { ROLES, type Role } from "../../shared/roles.ts";
import { generateOutbreak } from "./generator/generate-outbreak.ts";
import { loadOutbreak } from "./load-outbreak.ts";
import { openInvented, STORY_COUNTRY, STORY_SETTINGS } from "./open-invented.ts";

/** A known reason why nothing was loaded, in one line. */
export class SeedRefused extends Error {}

export interface SeedOptions {
  /** Name of the new investigation. */
  name: string;
  people: number;
  seed: number;
  days: number;
  /** Last day of the story, YYYY-MM-DD, in UTC; before today. */
  lastDay: string;
  /** Teams that hold the people; 0: tracers hold them. */
  teams: number;
  /** E-mail of the account that holds all roles there; null: the demo accounts, each its own. */
  member: string | null;
}

interface Tracer {
  accountId: string | null;
  teamId: string | undefined;
}

/** Who works in the new investigation: one account in every role, or the demo's accounts. */
async function findMembers(
  client: pg.ClientBase,
  email: string | null,
): Promise<{ accountId: string; role: Role }[]> {
  if (email !== null) {
    const found = await client.query<{ id: string }>(
      "select id from auth.account where lower(email) = lower($1) and disabled_at is null",
      [email],
    );
    const account = found.rows[0];
    if (!account) throw new SeedRefused("--member: there is no account with this e-mail");
    return ROLES.map((role) => ({ accountId: account.id, role }));
  }
  const found = await client.query<{ account_id: string; role: Role }>(
    `select m.account_id, m.role from core.member m
     join auth.account a on a.id = m.account_id and a.demo and a.disabled_at is null
     where m.investigation_id = (select value::uuid from auth.meta where key = 'demo')
       and m.ended_at is null
     order by m.role, a.email`,
  );
  if (found.rows.length === 0) {
    throw new SeedRefused("there are no demo accounts here; name an account with --member E-MAIL");
  }
  return found.rows.map((row) => ({ accountId: row.account_id, role: row.role }));
}

async function refuseKnownName(client: pg.ClientBase, name: string): Promise<void> {
  const found = await client.query(
    "select 1 from core.investigation where lower(name) = lower($1) limit 1",
    [name],
  );
  if (found.rowCount) {
    throw new SeedRefused("there is an investigation of this name already; choose another name");
  }
}

/**
 * Generates an invented outbreak and loads it into a new investigation marked invented, in one
 * transaction: all of it or nothing. No other investigation is touched.
 *
 * @param databaseUrl connection string of an administrator
 * @param say prints one line of progress
 * @returns id of the investigation and what was loaded
 * @throws SeedRefused with one line; RangeError when the story cannot be told with the numbers
 */
export async function seedInvestigation(
  databaseUrl: string,
  keys: KeyRing,
  options: SeedOptions,
  say: (line: string) => void,
): Promise<{ id: string; people: number; pairs: number }> {
  const client = new pg.Client({ connectionString: databaseUrl });
  client.on("error", () => {});
  await client.connect();
  try {
    await client.query("begin");
    // Two at once with one name: the second waits and then finds the first one's.
    await client.query("select pg_advisory_xact_lock(72032)");
    await refuseKnownName(client, options.name);
    const members = await findMembers(client, options.member);
    const hands = members.filter((one) => one.role === "tracer");
    const teams = Array.from({ length: options.teams }, (_none, index) => ({
      id: randomUUID(),
      name: `Team ${index + 1}`,
    }));
    // Who is spoken of as a tracer in the story: a team, or else a tracer's account.
    const tracers = new Map<string, Tracer>();
    const count = teams.length || Math.max(1, hands.length);
    for (let index = 0; index < count; index += 1) {
      tracers.set(`tracer-${index}`, {
        accountId: hands[index % Math.max(1, hands.length)]?.accountId ?? null,
        teamId: teams[index]?.id,
      });
    }
    const began = performance.now();
    say(`Inventing ${options.people} people …`);
    const outbreak = generateOutbreak({
      seed: options.seed,
      people: options.people,
      days: options.days,
      lastDay: options.lastDay,
      tracers: [...tracers.keys()],
      ...STORY_SETTINGS,
    });
    const handTeam = new Map(hands.map((one, at) => [one, teams[at % Math.max(1, teams.length)]]));
    const opened = await openInvented(client, keys, {
      name: options.name,
      populationAtRisk: outbreak.story.populationAtRisk,
      openedBy: members.find((one) => one.role === "supervisor")?.accountId ?? null,
      members: members.map((one) => ({ ...one, teamId: handTeam.get(one)?.id })),
      teams,
    });
    let pairs = 0;
    const own = new Map<string, string>();
    const ofTeam = new Map<string, string>();
    for (const [name, { accountId, teamId }] of tracers) {
      if (accountId) own.set(name, accountId);
      if (teamId) ofTeam.set(name, teamId);
    }
    await loadOutbreak(
      {
        client,
        keys: opened.keys,
        investigationId: opened.id,
        accounts: own,
        teams: ofTeam,
        country: STORY_COUNTRY,
        progress(part, rows) {
          if (part === "contact pairs") pairs = rows;
          say(`  ${rows} ${part} (${Math.round((performance.now() - began) / 1000)} s)`);
        },
      },
      outbreak,
    );
    await client.query("commit");
    say("Gathering statistics for the database …");
    await client.query("analyze");
    return { id: opened.id, people: outbreak.people.length, pairs };
  } catch (error) {
    await client.query("rollback").catch(() => {});
    throw error;
  } finally {
    await client.end();
  }
}
