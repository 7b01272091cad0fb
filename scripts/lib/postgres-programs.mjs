// The PostgreSQL programs of this machine.
import { existsSync, readdirSync } from "node:fs";
import { delimiter, join } from "node:path";
import { installDebianPackages } from "./packages.mjs";
import { PlainError } from "./plain.mjs";
import { runCaptured } from "./processes.mjs";

const DEBIAN_ROOT = "/usr/lib/postgresql";
const OLDEST_MAJOR = 15;

/** Every folder with a server of its own, newest first: [{major, bin}]. */
async function listServers() {
  const servers = [];
  if (existsSync(DEBIAN_ROOT)) {
    for (const name of readdirSync(DEBIAN_ROOT)) {
      const bin = join(DEBIAN_ROOT, name, "bin");
      if (/^\d+$/.test(name)) servers.push({ major: Number(name), bin });
    }
  }
  for (const bin of (process.env.PATH ?? "").split(delimiter)) {
    if (!bin || servers.some((s) => s.bin === bin) || !existsSync(join(bin, "postgres"))) continue;
    const { output } = await runCaptured(join(bin, "postgres"), ["--version"]);
    const major = Number(/ (\d+)/.exec(output)?.[1]);
    if (major) servers.push({ major, bin });
  }
  return servers
    .filter((s) => existsSync(join(s.bin, "initdb")) && existsSync(join(s.bin, "postgres")))
    .sort((a, b) => b.major - a.major);
}

/**
 * The folder of PostgreSQL's programs, installed from Debian's packages when there is none.
 * @param major version an existing cluster was made with; undefined takes the newest
 */
export async function ensurePostgres(major) {
  const fits = (s) => (major === undefined ? s.major >= OLDEST_MAJOR : s.major === major);
  const found = (await listServers()).find(fits);
  if (found) return found;
  const name = major === undefined ? "postgresql" : `postgresql-${major}`;
  await installDebianPackages([name], "PostgreSQL");
  const installed = (await listServers()).find(fits);
  if (!installed) {
    throw new PlainError(`PostgreSQL ${major ?? OLDEST_MAJOR} was installed but is not found`);
  }
  return installed;
}
