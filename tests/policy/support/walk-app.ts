import type { Express } from "express";

interface Layer {
  name: string;
  route?: { path: string; methods?: Record<string, boolean>; stack: { method?: string }[] };
  handle?: { stack?: unknown[] };
}

/** `METHOD /path` of everything the live application answers by a path of its own. */
export function liveRoutes(app: Express): string[] {
  const stack = (app as unknown as { router: { stack: Layer[] } }).router.stack;
  return stack.flatMap((layer) => {
    // A router mounted whole would hide what is in it.
    if (layer.handle?.stack && !layer.route) return [`router ${layer.name}`];
    if (!layer.route) return [];
    const methods = new Set(layer.route.stack.map((one) => (one.method ?? "all").toUpperCase()));
    return [...methods].map((method) => `${method} ${layer.route?.path}`);
  });
}
