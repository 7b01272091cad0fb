import { expect, inject, it } from "vitest";
import { EnvError } from "../../server/config/env.ts";
import { migrate } from "../../server/db/migrate.ts";
import { loginUrl } from "../../server/db/pools.ts";
import { TEST_PASSWORDS } from "../support/database.ts";

const withPart = (part: "port" | "username" | "pathname", value: string) => {
  const url = new URL(inject("adminUrl"));
  url[part] = value;
  return url.href;
};

/** What a boot against this address says. */
async function refusal(url: string): Promise<string> {
  const error = await migrate(url, TEST_PASSWORDS).then(
    () => null,
    (thrown: unknown) => thrown,
  );
  expect(error).toBeInstanceOf(EnvError);
  return (error as Error).message;
}

it.each([
  ["nothing listens there", () => withPart("port", "1"), "no PostgreSQL answers at 127.0.0.1:1 ("],
  [
    "the database is not there",
    () => withPart("pathname", "/not_there"),
    "the database that DATABASE_URL names does not exist",
  ],
  [
    "the user is not known",
    () => withPart("username", "not_there"),
    "the database refuses the user or the password of DATABASE_URL",
  ],
  [
    "the user may not make logins",
    () => loginUrl(inject("adminUrl"), "tracer", TEST_PASSWORDS.tracer),
    "the user of DATABASE_URL may not make logins and schemas in its database",
  ],
])("says in one line that %s, and not with which password", async (_what, url, words) => {
  const said = await refusal(url());
  expect(said).toContain(words);
  expect(said).not.toMatch(/\n|postgres:\/\//);
});
