import type { Request, Response } from "express";
import { z } from "zod";
import { ROLES } from "../../shared/roles.ts";
import { definePlainRoute, type PlainRoute } from "../http/route.ts";
import { type SignedIn, signedInOf, whoIsAsking } from "../http/sign-in.ts";
import type { Services } from "../services.ts";
import type { LiveMessage } from "./live-hub.ts";

/** How often a stream says it is alive, and asks whether its session still holds. */
const PULSE_MS = 20_000;
/** Streams of one account; opening one more ends the oldest. */
const MOST_STREAMS = 12;

/** A stream is no activity: it must not move the idle end of its session. */
function markBackground(request: Request): void {
  if (!request.session || request.session.background) return;
  Object.defineProperty(request.session, "background", { value: true, enumerable: false });
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

const openStreams = new Map<string, Set<() => void>>();

/** Enters a stream of an account; returns what takes it out again. */
function enter(accountId: string, end: () => void): () => void {
  const streams = openStreams.get(accountId) ?? new Set();
  openStreams.set(accountId, streams.add(end));
  const [oldest] = streams;
  if (streams.size > MOST_STREAMS) oldest?.();
  return () => {
    streams.delete(end);
    if (streams.size === 0 && openStreams.get(accountId) === streams) openStreams.delete(accountId);
  };
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
  const tell = (message: LiveMessage) => {
    // A tracer sees a few people only: what changed elsewhere carries no id for them.
    const id = who.actingRole === "tracer" ? null : message.id;
    write(`data: ${JSON.stringify({ ...message, id })}\n\n`);
  };
  const end = () => {
    response.end();
  };
  const pulse = setInterval(() => {
    stillHolds(request, services, who)
      .then((holds) => {
        if (holds) write(": still here\n\n");
        else end();
      })
      // Without the database nobody can say so; the browser asks again by itself.
      .catch(end);
  }, PULSE_MS);
  const leaveHub = services.hub.subscribe(who.investigationId ?? "", { tell, end });
  const leaveAccount = enter(who.accountId, end);
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
