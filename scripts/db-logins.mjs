// npm run --silent db:logins: the connection strings of the four application roles as one JSON
// object, for checks with each role's own login. Starts nothing.
import { readFileSync } from "node:fs";
import { join } from "node:path";
import { PlainError, runScript, say } from "./lib/plain.mjs";
import { runningCluster } from "./lib/postgres.mjs";
import { dataFolder } from "./lib/project.mjs";

const ROLES = ["tracer", "supervisor", "epidemiologist", "officer"];

function readLogins(data) {
  const file = join(data, "secrets.json");
  try {
    return JSON.parse(readFileSync(file, "utf8")).logins ?? {};
  } catch (error) {
    if (error.code === "ENOENT") throw new PlainError(`${file} is missing; run npm start first`);
    if (error instanceof SyntaxError) throw new PlainError(`${file} is damaged`);
    throw new PlainError(`${file} cannot be read (${error.code})`);
  }
}

async function serverUrl(data) {
  const given = process.env.DATABASE_URL;
  if (given) {
    if (!URL.canParse(given)) throw new PlainError("DATABASE_URL must be a postgres:// address");
    return given;
  }
  const cluster = await runningCluster(data).catch((error) => {
    if (error.code !== "EACCES") throw error;
    throw new PlainError(`${data} belongs to another user`);
  });
  if (!cluster) throw new PlainError("the database does not run; run npm start first");
  return cluster.url;
}

await runScript(async () => {
  const data = dataFolder(process.env);
  const base = await serverUrl(data);
  const logins = readLogins(data);
  const urls = ROLES.map((role) => {
    if (!logins[role]) throw new PlainError(`no login of ${role} is kept in ${data}`);
    const url = new URL(base);
    url.username = `strandline_${role}`;
    url.password = encodeURIComponent(logins[role]);
    return [role, url.href];
  });
  say(JSON.stringify(Object.fromEntries(urls), null, 2));
});
