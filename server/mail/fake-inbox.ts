import type { AddressInfo } from "node:net";
import { SMTPServer } from "smtp-server";
import type { Letter } from "../../shared/contracts/accounts.ts";
import { now } from "../clock.ts";

const KEPT = 200;
const LONGEST = 64 * 1024;

/** A mail server of this process's own, on loopback, that delivers to a list in memory. */
export interface FakeInbox {
  port: number;
  /** Letters, the newest first. */
  letters(): Letter[];
  close(): Promise<void>;
}

function decoded(body: string, encoding: string): string {
  if (encoding === "base64") return Buffer.from(body, "base64").toString("utf8");
  if (encoding !== "quoted-printable") return body;
  const bytes = body
    .replace(/=\n/g, "")
    .replace(/=([0-9A-F]{2})/gi, (_all, hex: string) =>
      String.fromCharCode(Number.parseInt(hex, 16)),
    );
  return Buffer.from(bytes, "latin1").toString("utf8");
}

/** Subject and text of a mail as our own transport writes it: one part, plain text. */
function readMail(raw: string): { subject: string; text: string } {
  const [head = "", ...rest] = raw.replaceAll("\r\n", "\n").split("\n\n");
  const unfolded = head.replace(/\n[ \t]+/g, " ");
  const header = (name: string) =>
    new RegExp(`^${name}:[ ]*(.*)$`, "im").exec(unfolded)?.[1]?.trim() ?? "";
  const encoding = header("content-transfer-encoding").toLowerCase();
  return { subject: header("subject"), text: decoded(rest.join("\n\n"), encoding) };
}

/** Starts it on a free port. It takes mail from this machine only and sends none on. */
export async function startFakeInbox(): Promise<FakeInbox> {
  const kept: Letter[] = [];
  let count = 0;
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ["AUTH", "STARTTLS"],
    disableReverseLookup: true,
    size: LONGEST,
    maxClients: 20,
    logger: false,
    onData(stream, session, done) {
      const parts: Buffer[] = [];
      let length = 0;
      stream.on("data", (part: Buffer) => {
        length += part.length;
        if (length <= LONGEST) parts.push(part);
      });
      stream.on("end", () => {
        const mail = readMail(Buffer.concat(parts).toString("utf8"));
        count += 1;
        const to = session.envelope.rcptTo.map((one) => one.address).join(", ");
        kept.unshift({ id: count, at: now().toISOString(), to, ...mail });
        kept.length = Math.min(kept.length, KEPT);
        done();
      });
    },
  });
  // A client that breaks off is its own affair.
  server.on("error", () => {});
  await new Promise<void>((resolve, reject) => {
    server.server.once("error", reject);
    server.listen(0, "127.0.0.1", () => resolve());
  });
  return {
    port: (server.server.address() as AddressInfo).port,
    letters: () => [...kept],
    close: () => new Promise((resolve) => server.close(() => resolve())),
  };
}
