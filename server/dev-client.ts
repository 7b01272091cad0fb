import type { Handler } from "express";

/** Vite's development server as middleware; loaded in development only. */
export async function devClient(): Promise<{ middleware: Handler; close: () => Promise<void> }> {
  const { createServer } = await import("vite");
  const vite = await createServer({ server: { middlewareMode: true }, appType: "spa" });
  return { middleware: vite.middlewares as unknown as Handler, close: () => vite.close() };
}
