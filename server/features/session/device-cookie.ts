import { createHmac, randomBytes, timingSafeEqual } from "node:crypto";
import type { Request, Response } from "express";
import { setCookieLater } from "../../http/late-cookie.ts";
import type { Services } from "../../services.ts";

const DAYS = 180;
/** Colleagues who share a machine; the ones who signed in last are kept. */
const ACCOUNTS = 4;

type Kit = Pick<Services, "env" | "secrets">;

const nameOf = (env: Kit["env"]) =>
  env.secureCookie ? "__Host-strandline-device" : "strandline-device";

function sign(secret: string, id: string, email: string): string {
  return createHmac("sha256", secret)
    .update(`device\n${id}\n${email.toLowerCase()}`)
    .digest("base64url");
}

function isSigned(secrets: Kit["secrets"], id: string, email: string, signature: string): boolean {
  const given = Buffer.from(signature);
  return secrets.sessionSecrets.some((secret) => {
    const wanted = Buffer.from(sign(secret, id, email));
    return given.length === wanted.length && timingSafeEqual(given, wanted);
  });
}

/** The pairs of id and signature in the cookie; whatever does not look like one is left out. */
function marksOf(request: Request, env: Kit["env"]): string[] {
  const header = request.get("cookie") ?? "";
  const start = `${nameOf(env)}=`;
  const found = header.split(/; */).find((one) => one.startsWith(start));
  return (found?.slice(start.length) ?? "")
    .split("~")
    .filter((one) => /^[\w-]{22}\.[\w-]{43}$/.test(one))
    .slice(0, ACCOUNTS);
}

/** Id of this device if it signed in to the account before, else null. It proves nothing else. */
export function knownDevice(request: Request, { env, secrets }: Kit, email: string): string | null {
  for (const mark of marksOf(request, env)) {
    const [id = "", signature = ""] = mark.split(".");
    if (isSigned(secrets, id, email, signature)) return id;
  }
  return null;
}

/** Remembers in a signed cookie that this device signed in to the account. */
export function rememberDevice(
  request: Request,
  response: Response,
  { env, secrets }: Kit,
  email: string,
): void {
  if (knownDevice(request, { env, secrets }, email)) return;
  const id = randomBytes(16).toString("base64url");
  const mark = `${id}.${sign(secrets.sessionSecrets[0] as string, id, email)}`;
  const marks = [mark, ...marksOf(request, env)].slice(0, ACCOUNTS);
  const flags = `Max-Age=${DAYS * 86_400}; Path=/; HttpOnly; SameSite=Strict`;
  const secure = env.secureCookie ? "; Secure" : "";
  setCookieLater(response, `${nameOf(env)}=${marks.join("~")}; ${flags}${secure}`);
}
