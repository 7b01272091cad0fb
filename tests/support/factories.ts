import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import { withTx } from "../../server/db/with-tx.ts";
import { insertInvestigation } from "../../server/features/investigations/store.ts";
import { hashPassword } from "../../server/features/session/password.ts";
import {
  type InvestigationInput,
  investigationInput,
} from "../../shared/contracts/investigations.ts";
import type { Role } from "../../shared/roles.ts";
import { type TestApp, TestClient } from "./app.ts";

export const PASSWORD = "long enough for a test";
// Hashing is slow on purpose, so one hash serves every account of a test process.
const passwordHash = hashPassword(PASSWORD);

let counter = 0;

/** Makes an account; all share one password. */
export async function buildAccount(
  app: TestApp,
  overrides: { email?: string; demo?: boolean; displayName?: string } = {},
): Promise<{ id: string; email: string }> {
  const id = randomUUID();
  counter += 1;
  const email = overrides.email ?? `person${counter}-${id.slice(0, 8)}@test.example`;
  await app.pools.auth.query(
    "insert into auth.account (id, email, display_name, password_hash, demo) values ($1, $2, $3, $4, $5)",
    [
      id,
      email,
      overrides.displayName ?? `Account ${counter}`,
      await passwordHash,
      overrides.demo ?? false,
    ],
  );
  return { id, email };
}

/** Opens an investigation without members. */
export async function buildInvestigation(
  app: TestApp,
  overrides: Partial<InvestigationInput> = {},
): Promise<string> {
  const owner = await buildAccount(app);
  const parsed = investigationInput.parse({ name: "Test investigation", ...overrides });
  const input = { ...parsed, invented: overrides.invented ?? true };
  return withTx({ pool: app.pools.auth, nonce: null }, (tx) =>
    insertInvestigation(tx, app.keys, input, owner.id, []),
  );
}

/** Gives an account a role. */
export async function buildMember(
  app: TestApp,
  investigationId: string,
  accountId: string,
  role: Role,
): Promise<string> {
  const id = randomUUID();
  await withTx({ pool: app.pools.auth, nonce: null }, (tx) =>
    tx.execute(
      sql`insert into core.member (id, investigation_id, account_id, role)
          values (${id}, ${investigationId}, ${accountId}, ${role})`,
    ),
  );
  return id;
}

/** A signed-in client acting in a role of an investigation, with its base path. */
export interface Member {
  client: TestClient;
  accountId: string;
  email: string;
  memberId: string;
  base: string;
  investigationId: string;
}

/** Makes an account with one role and signs it in. */
export async function signInAs(app: TestApp, role: Role, investigationId: string): Promise<Member> {
  const account = await buildAccount(app);
  const memberId = await buildMember(app, investigationId, account.id, role);
  const client = new TestClient(app);
  const answer = await client.signIn(account.email, PASSWORD);
  if (answer.status !== 200) throw new Error(`sign-in answered ${answer.status}`);
  return {
    client,
    accountId: account.id,
    email: account.email,
    memberId,
    base: `/api/investigations/${investigationId}`,
    investigationId,
  };
}

/** One signed-in client per role in the same investigation. */
export async function signInEveryone(
  app: TestApp,
  investigationId: string,
): Promise<Record<Role, Member>> {
  const one = (role: Role) => signInAs(app, role, investigationId);
  return {
    tracer: await one("tracer"),
    supervisor: await one("supervisor"),
    epidemiologist: await one("epidemiologist"),
    officer: await one("officer"),
  };
}
