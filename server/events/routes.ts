import type { Request, Response } from "express";
import { z } from "zod";
import { ROLES } from "../../shared/roles.ts";
import { definePlainRoute, type PlainRoute } from "../http/route.ts";
import { type SignedIn, signedInOf, whoIsAsking } from "../http/sign-in.ts";
import type { Services } from "../services.ts";
import type { LiveMessage } from "./live-hub.ts";
import { enterStream } from "./open-streams.ts";

/** How often a stream says it is alive, and asks whether its session still holds. */
const PULSE_MS = 20_000;

/** A stream is no activity: it must not move the idle end of its session. */
function markBackground(request: Request): void {
  if (!request.session || request.session.background) return;
  Object.defineProperty(request.session, "background", { value: true, enumerable: false });
}

/** True when the role that a stream acts in has a last day. */
async function hasLastDay(services: Services, who: SignedIn): Promise<boolean> {
  const found = await services.pools.auth.query(
    `select 1 from core.member where account_id = $1 and investigation_id = $2 and role = $3
       and ended_at is null and ends_on is not null`,
    [who.accountId, who.investigationId, who.actingRole],
  );
  return found.rows.length > 0;
}

/** True while the stream's session, account and membership are what they were. */
async function stillHolds(request: Request, services: Services, was: SignedIn): Promise<boolean> {
  const reloaded = await new Promise<boolean>((resolve) => {
    request.session.reload((error: unknown) => resolve(!error));
  });
  if (!reloaded) return false;
  markBackground(request);
  const who = await whoIsAsking(request, services.pools.auth);
  return (
    who !== null &&
    who.accountId === was.accountId &&
    who.actingRole === was.actingRole &&
    who.investigationId === was.investigationId
  );
}

function stream(request: Request, response: Response, services: Services): void {
  const who = signedInOf(request);
  markBackground(request);
  response.status(200).set({
    "Content-Type": "text/event-stream",
    "Cache-Control": "no-store, no-transform",
    "X-Accel-Buffering": "no",
  });
  response.flushHeaders();
  response.write("retry: 2000\n\n");

  const write = (text: string) => {
    if (!response.writableEnded) response.write(text);
  };
  const end = () => {
    response.end();
  };
  // Until it is known, and wherever a day may end the role meanwhile, each message is asked about.
  let mayEnd = true;
  const check = (text: string) =>
    stillHolds(request, services, who)
      .then(async (holds) => {
        mayEnd = holds && (await hasLastDay(services, who));
        if (holds) write(text);
        else end();
      })
      // Without the database nobody can say so; the browser asks again by itself.
      .catch(end);
  const tell = (message: LiveMessage) => {
    // A tracer sees a few people only: what changed elsewhere carries no id for them.
    const id = who.actingRole === "tracer" ? null : message.id;
    const text = `data: ${JSON.stringify({ ...message, id })}\n\n`;
    // Whoever is no member any more hears no further word; a zone that is changed moves last days.
    if (mayEnd || message.topic === "members" || message.topic === "settings") void check(text);
    else write(text);
  };
  const pulse = setInterval(() => void check(": still here\n\n"), PULSE_MS);
  const leaveHub = services.hub.subscribe(who.investigationId ?? "", { tell, end });
  const leaveAccount = enterStream(who.accountId, { end, check: () => check("") });
  void check(": here\n\n");
  response.on("close", () => {
    clearInterval(pulse);
    leaveHub();
    leaveAccount();
  });
}

/** The live stream of an investigation: `{topic, id, version}`, never anything of a record. */
export function liveRoutes(): PlainRoute[] {
  return [
    definePlainRoute({
      method: "get",
      path: "/api/investigations/:id/live",
      summary: "Stream of what changed (text/event-stream): topic, id and graph version only",
      access: ROLES,
      params: z.object({ id: z.uuid() }),
      output: z.string(),
      async handle(request, response, services) {
        stream(request, response, services);
        return undefined;
      },
    }),
  ];
}
