import { Socket } from "node:net";
import { afterEach, beforeEach } from "vitest";

// Two promises every test keeps without saying so: nothing leaves this machine, and nothing
// complains on the console. A complaint that is expected is caught with vi.spyOn(console, …).

const LOOPBACK = /^(127(\.\d{1,3}){3}|::1|localhost)$/;

let offences: string[] = [];

function hostOf(args: unknown[]): string | undefined {
  const first: unknown = Array.isArray(args[0]) ? args[0][0] : args[0];
  if (typeof first === "object" && first !== null) {
    const options = first as { host?: unknown; path?: unknown };
    if (typeof options.path === "string") return undefined;
    return typeof options.host === "string" ? options.host : "localhost";
  }
  if (typeof first === "string" && !/^\d+$/.test(first)) return undefined;
  return typeof args[1] === "string" ? args[1] : "localhost";
}

const connect = Socket.prototype.connect;
Socket.prototype.connect = function guarded(this: Socket, ...args: unknown[]) {
  const host = hostOf(args);
  if (host !== undefined && !LOOPBACK.test(host)) {
    offences.push(`connection to ${host}`);
    throw new Error(`a test may connect to this machine only, not to ${host}`);
  }
  return Reflect.apply(connect, this, args);
} as typeof connect;

for (const level of ["error", "warn"] as const) {
  const original = console[level];
  console[level] = (...args: unknown[]) => {
    offences.push(`console.${level}: ${args.map(String).join(" ").slice(0, 400)}`);
    Reflect.apply(original, console, args);
  };
}

beforeEach(() => {
  offences = [];
});

afterEach(() => {
  if (offences.length === 0) return;
  const list = offences.join("\n");
  offences = [];
  throw new Error(`the test caused:\n${list}`);
});
