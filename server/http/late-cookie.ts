import type { NextFunction, Request, Response } from "express";

/**
 * Sends cookies set with `setCookieLater` behind the session's own: it stands first in the answer,
 * as it always did. Mounted before the session, whose step then runs closer to the handler.
 */
export function lateCookies(_request: Request, response: Response, next: NextFunction): void {
  const writeHead = response.writeHead;
  response.writeHead = function withLateCookies(...args: unknown[]) {
    const late = response.locals.lateCookie as string | undefined;
    if (late) response.appendHeader("Set-Cookie", late);
    response.writeHead = writeHead;
    return Reflect.apply(writeHead, response, args) as Response;
  } as typeof writeHead;
  next();
}

/** A cookie of this answer, sent after the session's. */
export function setCookieLater(response: Response, cookie: string): void {
  response.locals.lateCookie = cookie;
}
