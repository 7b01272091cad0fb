import { readFileSync } from "node:fs";

/** Resident memory of a process now and at its most, MB (2^20 bytes); from Linux's /proc. */
export function residentMemory(pid: number): { now: number; most: number } {
  const status = readFileSync(`/proc/${pid}/status`, "utf8");
  const read = (key: string) =>
    Math.round(Number(new RegExp(`^${key}:\\s+(\\d+) kB`, "m").exec(status)?.[1] ?? 0) / 1024);
  return { now: read("VmRSS"), most: read("VmHWM") };
}
