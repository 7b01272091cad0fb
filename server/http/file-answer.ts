import { Readable } from "node:stream";
import { pipeline } from "node:stream/promises";
import type { Request, Response } from "express";
import type { Logger } from "pino";
import { z } from "zod";
import { safeError } from "./translate-error.ts";

/** A file as a route hands it over. `read` is called once, after the route's transaction. */
export interface FileAnswer {
  /** Fixed ASCII name; nothing typed. */
  name: string;
  type: "text/csv; charset=utf-8" | "application/json; charset=utf-8";
  /** Length in bytes, said before the first one: what ends early is then seen to have failed. */
  bytes: number;
  read(): AsyncIterable<Buffer>;
}

/** The `output` of a route that sends a file. */
export const fileAnswer = z.custom<FileAnswer>(
  (value) =>
    typeof value === "object" &&
    value !== null &&
    /^[\w.-]{1,80}$/.test(String((value as FileAnswer).name)) &&
    typeof (value as FileAnswer).read === "function",
);

/**
 * Sends a file as an attachment, part by part, no faster than it is taken. When a part cannot be
 * read the connection is cut, so that the download fails in sight of whoever waits for it; an end
 * that looked whole would be a file with people missing.
 */
export async function sendFile(
  request: Request,
  response: Response,
  file: FileAnswer,
  log: Pick<Logger, "error">,
): Promise<void> {
  response.status(200);
  response.setHeader("Content-Type", file.type);
  response.setHeader("Content-Length", file.bytes);
  response.setHeader("Content-Disposition", `attachment; filename="${file.name}"`);
  response.setHeader("Cache-Control", "no-store");
  response.setHeader("X-Content-Type-Options", "nosniff");
  if (request.method === "HEAD") {
    response.end();
    return;
  }
  try {
    await pipeline(Readable.from(file.read()), response);
  } catch (error) {
    response.destroy();
    // Whoever stops a download is no failure of ours.
    if ((error as NodeJS.ErrnoException).code === "ERR_STREAM_PREMATURE_CLOSE") return;
    log.error({ event: "download broke off", error: safeError(error) });
  }
}
